import { handle } from '@/http/handle';
import { fileHeaders } from '@/http/securityHeaders';
import * as operations from '@/schemas/sweep';
import { downloadSweepFile } from '@/services/sweeps';

export const GET = handle(operations.downloadSweepFile, async ({ actor, params }) => {
  const file = await downloadSweepFile(actor, params.id);
  return new Response(new Uint8Array(file.bytes), { headers: fileHeaders(file.name) });
});
