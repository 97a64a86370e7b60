import { handle } from '@/http/handle';
import * as operations from '@/schemas/tables';
import { readLimitLine } from '@/services/limitLines';

export const GET = handle(operations.readLimitLine, ({ actor, params }) => readLimitLine(actor, params.id));
