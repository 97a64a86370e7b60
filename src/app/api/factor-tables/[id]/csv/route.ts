import { handle } from '@/http/handle';
import { fileHeaders } from '@/http/securityHeaders';
import * as operations from '@/schemas/tables';
import { downloadFactorTable } from '@/services/factorTables';

export const GET = handle(operations.downloadFactorTable, async ({ actor, params }) => {
  const { name, text } = await downloadFactorTable(actor, params.id);
  return new Response(text, { headers: fileHeaders(name, 'text/csv; charset=utf-8') });
});
