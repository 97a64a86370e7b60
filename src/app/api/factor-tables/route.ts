import { handle } from '@/http/handle';
import * as operations from '@/schemas/tables';
import { enterFactorTables } from '@/services/enterFactorTables';
import { listFactorTables } from '@/services/factorTables';

export const GET = handle(operations.listFactorTables, ({ actor, query }) => listFactorTables(actor, query));
export const POST = handle(operations.enterFactorTables, ({ actor, body }) => enterFactorTables(actor, body));
