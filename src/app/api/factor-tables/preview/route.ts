import { handle } from '@/http/handle';
import * as operations from '@/schemas/tables';
import { previewFactorTable } from '@/services/factorTableFile';

export const POST = handle(operations.previewFactorTable, ({ actor, body }) => previewFactorTable(actor, body));
