import { handle } from '@/http/handle';
import { pictureHeaders } from '@/http/securityHeaders';
import * as operations from '@/schemas/setup';
import { downloadPhoto } from '@/services/photos';

export const GET = handle(operations.downloadPhoto, async ({ actor, params, query, request }) => {
  const { contentType, etag, bytes } = await downloadPhoto(actor, params.id, query.size);
  const headers = pictureHeaders(contentType, etag);
  if (request.headers.get('if-none-match') === etag) return new Response(null, { status: 304, headers });
  return new Response(new Uint8Array(await bytes()), { headers });
});
