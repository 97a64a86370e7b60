import { handle } from '@/http/handle';
import * as operations from '@/schemas/tables';
import { readFactorTable } from '@/services/factorTables';

export const GET = handle(operations.readFactorTable, ({ actor, params }) => readFactorTable(actor, params.id));
