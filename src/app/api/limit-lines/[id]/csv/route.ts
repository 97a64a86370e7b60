import { handle } from '@/http/handle';
import { fileHeaders } from '@/http/securityHeaders';
import * as operations from '@/schemas/tables';
import { downloadLimitLine } from '@/services/limitLines';

export const GET = handle(operations.downloadLimitLine, async ({ actor, params }) => {
  const { name, text } = await downloadLimitLine(actor, params.id);
  return new Response(text, { headers: fileHeaders(name, 'text/csv; charset=utf-8') });
});
