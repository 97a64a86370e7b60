import sharp, { type Sharp } from 'sharp';
import { Invalid, Throttled } from '@/errors';
import { receiveFile, type FileLimit } from './multipart';

const PHOTO: FileLimit = {
  maxBytes: 25 * 1024 * 1024,
  tooLarge: 'A photograph takes at most 25 MB. Send it in a smaller size.',
};
const WHOLE_PX = 2400;
const SMALL_PX = 480;
/** A small file may unfold to a very large picture. A phone's largest is about 200 megapixels, at 4 bytes each in memory. */
const MOST_PIXELS = 120_000_000;
const LONGEST_S = 20;
/** Decoding runs on libvips' own threads; two at once leave the rest of the machine to everybody else. */
const AT_ONCE = 2;
const MOST_WAITING = 6;

sharp.cache(false);
sharp.concurrency(1);

export interface Picture {
  bytes: Buffer;
  width: number;
  height: number;
}

/** A photograph as it is kept: upright, JPEG, without metadata; and the same small. */
export interface ReceivedPhoto {
  /** Hex, of the file as it was sent. */
  sha256: string;
  sentBytes: number;
  fields: Record<string, string>;
  whole: Picture;
  small: Picture;
}

type Kind = 'jpeg' | 'png' | 'webp';

/** What a file is by its first bytes; its name and stated type say nothing. */
export function pictureKind(bytes: Uint8Array): Kind | 'heic' | null {
  const text = (from: number, to: number) => String.fromCharCode(...bytes.subarray(from, to));
  if (bytes[0] === 0xff && bytes[1] === 0xd8 && bytes[2] === 0xff) return 'jpeg';
  if (text(0, 8) === '\x89PNG\r\n\x1a\n') return 'png';
  if (text(0, 4) === 'RIFF' && text(8, 12) === 'WEBP') return 'webp';
  if (text(4, 8) === 'ftyp' && /^(heic|heix|hevc|hevx|heim|heis|mif1|msf1|avif)$/.test(text(8, 12))) return 'heic';
  return null;
}

const refuse = (message: string) => new Invalid([{ pointer: '/file', message }]);

/** @throws {Invalid} for what is no picture we take, one that is broken or too large to unfold */
function sourceOf(bytes: Uint8Array): { kind: Kind; source: Sharp } {
  const kind = pictureKind(bytes);
  if (kind === 'heic') {
    throw refuse('is HEIC or AVIF, which this server cannot open; set the phone’s camera to JPEG, or send it as JPEG');
  }
  if (kind === null) throw refuse('is no JPEG, PNG or WebP picture');
  const options = { limitInputPixels: MOST_PIXELS, sequentialRead: true, failOn: 'error', pages: 1 } as const;
  return { kind, source: sharp(bytes, options).timeout({ seconds: LONGEST_S }) };
}

/**
 * Decodes, turns upright as EXIF says, fits and encodes anew as JPEG in sRGB; nothing that the camera wrote beside the
 * picture (place, time, device, its own thumbnail) comes along.
 */
export async function preparePhoto(bytes: Uint8Array): Promise<{ whole: Picture; small: Picture }> {
  const { kind, source } = sourceOf(bytes);
  try {
    const { format } = await source.metadata();
    if (format !== kind) throw refuse('is not what its first bytes say');
    const whole = await encode(source.autoOrient(), WHOLE_PX, 84);
    return { whole, small: await encode(sharp(whole.bytes), SMALL_PX, 78) };
  } catch (error) {
    if (error instanceof Invalid) throw error;
    const words = error instanceof Error ? error.message : '';
    if (/pixel limit/i.test(words)) throw refuse('unfolds to more than 120 megapixels; send it in a smaller size');
    if (/timeout/i.test(words)) throw refuse('took too long to open; send it in a smaller size');
    throw refuse('could not be opened: it is broken or not whole; take it or send it again');
  }
}

async function encode(picture: Sharp, px: number, quality: number): Promise<Picture> {
  const { data, info } = await picture
    .resize(px, px, { fit: 'inside', withoutEnlargement: true })
    .flatten({ background: '#ffffff' })
    .jpeg({ quality, mozjpeg: false })
    .toBuffer({ resolveWithObject: true });
  return { bytes: data, width: info.width, height: info.height };
}

let working = 0;
const waiting: (() => void)[] = [];

async function inTurn<T>(work: () => Promise<T>): Promise<T> {
  if (working >= AT_ONCE) {
    if (waiting.length >= MOST_WAITING) {
      throw new Throttled(5, 'Several photographs are being opened at this moment. Send this one again shortly.');
    }
    await new Promise<void>((resolve) => waiting.push(resolve));
  } else working += 1;
  try {
    return await work();
  } finally {
    const next = waiting.shift();
    if (next) next();
    else working -= 1;
  }
}

/** Takes in one photograph (`file`, at most 25 MB) with the fields beside it. @throws {TooLarge} @throws {Throttled} */
export async function receivePhoto(request: Request): Promise<ReceivedPhoto> {
  const { bytes, sha256, fields } = await receiveFile(request, PHOTO);
  const prepared = await inTurn(() => preparePhoto(bytes));
  return { sha256, sentBytes: bytes.length, fields, ...prepared };
}
