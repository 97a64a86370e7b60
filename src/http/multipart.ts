import { Readable, Writable } from 'node:stream';
import type { ReadableStream as NodeStream } from 'node:stream/web';
import formidable, { errors } from 'formidable';
import { Invalid, TooLarge } from '@/errors';

export const MAX_FILE_BYTES = 100 * 1024 * 1024;

export interface ReceivedFile {
  name: string;
  bytes: Uint8Array;
}

/**
 * Streams the one `file` of a multipart/form-data request into memory, at most 100 MB (TooLarge beyond that, the rest
 * is not read). Nothing touches a local disk, so any web process can serve the next request.
 */
export async function receiveFile(request: Request): Promise<ReceivedFile> {
  const type = request.headers.get('content-type') ?? '';
  if (!/^multipart\/form-data\b/i.test(type) || !request.body) {
    throw new Invalid([{ pointer: '/file', message: 'is sent as multipart/form-data' }]);
  }
  if (Number(request.headers.get('content-length') ?? 0) > MAX_FILE_BYTES + 1024 * 1024) throw tooLarge();
  const parts: Buffer[] = [];
  const form = formidable({
    maxFiles: 1,
    maxFields: 10,
    maxFieldsSize: 64 * 1024,
    maxFileSize: MAX_FILE_BYTES,
    maxTotalFileSize: MAX_FILE_BYTES,
    allowEmptyFiles: true,
    minFileSize: 0,
    fileWriteStreamHandler: () =>
      new Writable({
        write(chunk: Buffer, _encoding, done) {
          parts.push(chunk);
          done();
        },
      }),
  });
  const stream = Object.assign(Readable.fromWeb(request.body as NodeStream), {
    // formidable takes a body without a stated length for none, unless it is said to come in chunks
    headers: { 'transfer-encoding': 'chunked', ...Object.fromEntries(request.headers) },
    method: request.method,
    url: request.url,
  });
  try {
    const [, files] = await form.parse(stream as never);
    const file = files.file?.[0];
    if (!file) throw new Invalid([{ pointer: '/file', message: 'is missing' }]);
    if (file.size === 0) throw new Invalid([{ pointer: '/file', message: 'is empty' }]);
    return { name: safeName(file.originalFilename ?? 'sweep'), bytes: Buffer.concat(parts) };
  } catch (error) {
    const code = (error as { code?: number }).code;
    if (code === errors.biggerThanMaxFileSize || code === errors.biggerThanTotalMaxFileSize) throw tooLarge();
    if (error instanceof Invalid) throw error;
    throw new Invalid([{ pointer: '/file', message: 'could not be received whole; send it again' }]);
  }
}

function tooLarge(): TooLarge {
  return new TooLarge('A sweep file takes at most 100 MB. Export a shorter range or fewer traces.');
}

/** The last part of a path, without control characters, at most 200 characters. */
function safeName(name: string): string {
  const last = name.split(/[\\/]/).at(-1) ?? '';
  return (
    [...last]
      .filter((c) => c >= ' ' && c !== '\u007f')
      .join('')
      .trim()
      .slice(0, 200) || 'sweep'
  );
}
