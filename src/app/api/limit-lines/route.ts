import { handle } from '@/http/handle';
import * as operations from '@/schemas/tables';
import { enterLimitLineFile } from '@/services/enterLimitFile';
import { listLimitLines } from '@/services/limitLines';

export const GET = handle(operations.listLimitLines, ({ actor, query }) => listLimitLines(actor, query));
export const POST = handle(operations.enterLimitLine, ({ actor, body }) => enterLimitLineFile(actor, body));
