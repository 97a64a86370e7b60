import { brotliCompressSync, brotliDecompress, constants, gunzip } from 'node:zlib';
import { promisify } from 'node:util';

const unbrotli = promisify(brotliDecompress);
const expand = promisify(gunzip);

/** Bytes of the file in one part: even where nothing compresses, the part with its mark stays below PART_BYTES. */
const SLICE_BYTES = 480 * 1024;

/** The first byte of a part. A file written before there were marks is one gzip stream, which begins with 0x1f. */
const PLAIN = 0;
const BROTLI = 1;
const GZIP_BEGINS = 0x1f;

/**
 * A file as parts, each compressed for itself so that no step is long and any part can be opened alone. Brotli's
 * fastest quality: on columns of figures it is as small as gzip's level 6 in an eighth of the time.
 */
export function* packFile(bytes: Uint8Array): Generator<void, Uint8Array<ArrayBuffer>[]> {
  const parts: Uint8Array<ArrayBuffer>[] = [];
  for (let at = 0; at < bytes.length; at += SLICE_BYTES) {
    const slice = bytes.subarray(at, at + SLICE_BYTES);
    const packed = brotliCompressSync(slice, {
      params: { [constants.BROTLI_PARAM_QUALITY]: 1, [constants.BROTLI_PARAM_SIZE_HINT]: slice.length },
    });
    const smaller = packed.length < slice.length;
    const part = new Uint8Array(1 + (smaller ? packed : slice).length);
    part[0] = smaller ? BROTLI : PLAIN;
    part.set(smaller ? packed : slice, 1);
    parts.push(part);
    yield;
  }
  return parts;
}

/** The file that the parts hold; it is taken apart on other threads than the caller's. Throws on parts that are broken. */
export async function unpackFile(parts: readonly Uint8Array[]): Promise<Buffer<ArrayBuffer>> {
  const [first] = parts;
  if (first?.[0] === GZIP_BEGINS) return Buffer.from(await expand(Buffer.concat(parts)));
  const slices: Uint8Array[] = [];
  for (const part of parts) {
    const held = part.subarray(1);
    slices.push(part[0] === BROTLI ? await unbrotli(held) : held);
  }
  return Buffer.concat(slices);
}
