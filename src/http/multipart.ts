import { createHash } from 'node:crypto';
import { Readable, Writable } from 'node:stream';
import type { ReadableStream as NodeStream } from 'node:stream/web';
import formidable, { errors } from 'formidable';
import { Invalid, Throttled, TooLarge } from '@/errors';

export const MAX_FILE_BYTES = 100 * 1024 * 1024;

export interface ReceivedForm {
  name: string;
  /** How many bytes the file has. */
  length: number;
  /** Hex, of the file. */
  sha256: string;
  /** The form's other fields; the first of each name. */
  fields: Record<string, string>;
}

export interface ReceivedFile extends Omit<ReceivedForm, 'length'> {
  bytes: Uint8Array;
}

export interface FileLimit {
  maxBytes: number;
  /** Said of a file that is larger: how large it may be and what to do. */
  tooLarge: string;
}

export const SWEEP_FILE: FileLimit = {
  maxBytes: MAX_FILE_BYTES,
  tooLarge: 'A sweep file takes at most 100 MB. Export a shorter range or fewer traces.',
};

/** Each may hold 100 MB of memory; a bench that meets more waits a few seconds. */
export const MAX_UPLOADS_AT_ONCE = 4;
const RETRY_AFTER_S = 5;
let receiving = 0;

/**
 * Streams the one `file` of a multipart/form-data request into memory, at most `limit` (TooLarge as soon as there is more;
 * what still comes is thrown away, since a browser reads no answer before it has sent everything). Nothing touches a local disk, so any web process can serve the next request.
 * @throws {Throttled} when as many uploads as this process takes at once are under way
 */
export async function receiveFile(request: Request, limit: FileLimit = SWEEP_FILE): Promise<ReceivedFile> {
  if (receiving >= MAX_UPLOADS_AT_ONCE) {
    throw new Throttled(RETRY_AFTER_S, 'Several files are being received at this moment. Send this one again shortly.');
  }
  receiving += 1;
  try {
    const chunks: Buffer[] = [];
    const { length, ...form } = await receiveForm(request, limit, (chunk) => void chunks.push(chunk));
    return { ...form, bytes: Buffer.concat(chunks, length) };
  } finally {
    receiving -= 1;
  }
}

/** Takes the form in and hands the file on in pieces, the next one when `take` is done with the last. */
export async function receiveForm(
  request: Request,
  { maxBytes, tooLarge }: FileLimit,
  take: (chunk: Buffer) => Promise<void> | void,
): Promise<ReceivedForm> {
  const type = request.headers.get('content-type') ?? '';
  if (!/^multipart\/form-data\b/i.test(type) || !request.body) {
    throw new Invalid([{ pointer: '/file', message: 'is sent as multipart/form-data' }]);
  }
  if (Number(request.headers.get('content-length') ?? 0) > maxBytes + 1024 * 1024) throw new TooLarge(tooLarge);
  const hash = createHash('sha256');
  let length = 0;
  const form = formidable({
    maxFiles: 1,
    maxFields: 10,
    maxFieldsSize: 64 * 1024,
    maxFileSize: maxBytes,
    maxTotalFileSize: maxBytes,
    allowEmptyFiles: true,
    minFileSize: 0,
    fileWriteStreamHandler: () =>
      new Writable({
        write(chunk: Buffer, _encoding, done) {
          hash.update(chunk);
          length += chunk.length;
          Promise.resolve(take(chunk)).then(() => done(), done);
        },
      }),
  });
  // A file part without a Content-Type of its own is a file all the same (RFC 7578 4.4); formidable calls it a field.
  form.onPart = (part) => {
    if (part.originalFilename) part.mimetype ??= 'application/octet-stream';
    return form._handlePart(part);
  };
  const stream = Object.assign(Readable.fromWeb(request.body as NodeStream), {
    // formidable takes a body without a stated length for none, unless it is said to come in chunks
    headers: { 'transfer-encoding': 'chunked', ...Object.fromEntries(request.headers) },
    method: request.method,
    url: request.url,
  });
  try {
    const [fields, files] = await form.parse(stream as never);
    const file = files.file?.[0];
    if (!file) throw new Invalid([{ pointer: '/file', message: 'is missing' }]);
    if (length === 0) throw new Invalid([{ pointer: '/file', message: 'is empty' }]);
    const name = safeName(file.originalFilename ?? 'sweep');
    return { name, length, sha256: hash.digest('hex'), fields: firstOf(fields) };
  } catch (error) {
    const code = (error as { code?: number }).code;
    if (code === errors.biggerThanMaxFileSize || code === errors.biggerThanTotalMaxFileSize)
      throw new TooLarge(tooLarge);
    if (error instanceof Invalid) throw error;
    throw new Invalid([{ pointer: '/file', message: 'could not be received whole; send it again' }]);
  }
}

function firstOf(fields: Partial<Record<string, string[]>>): Record<string, string> {
  const first: Record<string, string> = {};
  for (const [name, values] of Object.entries(fields)) if (values?.[0] !== undefined) first[name] = values[0];
  return first;
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
