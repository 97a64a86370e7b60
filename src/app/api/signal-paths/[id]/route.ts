import { handle } from '@/http/handle';
import * as operations from '@/schemas/paths';
import { readPath } from '@/services/pathRecord';

export const GET = handle(operations.readPath, ({ actor, params, query }) => readPath(actor, params.id, query));
