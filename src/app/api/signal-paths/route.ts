import { handle } from '@/http/handle';
import * as operations from '@/schemas/bench';
import { listPaths } from '@/services/signalPaths';

export const GET = handle(operations.listPaths, ({ actor, query }) => listPaths(actor, query));
