import { frequencyListFile } from '@/format/frequencyList';
import { handle } from '@/http/handle';
import { fileHeaders } from '@/http/securityHeaders';
import * as operations from '@/schemas/retest';
import { frequencyList } from '@/services/retests';

export const GET = handle(operations.downloadFrequencyList, async ({ actor, query: { format, ...filters } }) => {
  const { name, type, text } = frequencyListFile(await frequencyList(actor, filters), format);
  return new Response(text, { headers: fileHeaders(name, type) });
});
