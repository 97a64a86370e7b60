import { fromUtf16, fromWindows1252, isUtf8, utf16Guess } from './encodings';

/** The bytes of a text file, brought to UTF-8 without byte-order mark and without NUL padding. Line ends stay as they are. */
export interface CleanBytes {
  bytes: Uint8Array;
  /** e.g. `ascii`, `utf-8 with BOM`, `utf-16le with BOM`, `windows-1252`, `ascii with NUL bytes (1442)` */
  encoding: string;
  /** `LF`, `CRLF`, `CR`, `none`, or `mixed: 1045 CRLF, 1 LF` */
  lineEnds: string;
  nulBytes: number;
  /** Lines in the file; an unterminated last line counts. */
  lines: number;
  endsWithLineEnd: boolean;
  /** Share of control characters at the start of the file: above 0.1 it is no text. */
  controlShare: number;
}

export interface DecodedText {
  /** Line ends are `\n` only, so line n of this text is line n of the file. */
  text: string;
  encoding: string;
  lineEnds: string;
  nulBytes: number;
}

const CHUNK = 1 << 20;

function withoutNul(bytes: Uint8Array): Uint8Array {
  const kept = new Uint8Array(bytes.length);
  let n = 0;
  for (let i = 0; i < bytes.length; i++) if (bytes[i] !== 0) kept[n++] = bytes[i]!;
  return kept.subarray(0, n);
}

function startsWith(bytes: Uint8Array, ...mark: number[]): boolean {
  return mark.every((byte, i) => bytes[i] === byte);
}

/** Position after the line end at `at`; `\r\r\n`, which text-mode copying makes, is one line end. */
export function afterLineEnd(bytes: Uint8Array, at: number): number {
  if (bytes[at] === 10) return at + 1;
  if (bytes[at + 1] === 10) return at + 2;
  if (bytes[at + 1] === 13 && bytes[at + 2] === 10) return at + 3;
  return at + 1;
}

function describeLineEnds(crlf: number, lf: number, cr: number): string {
  const kinds = [
    ['CRLF', crlf],
    ['LF', lf],
    ['CR', cr],
  ].filter(([, count]) => count !== 0);
  if (kinds.length === 0) return 'none';
  if (kinds.length === 1) return String(kinds[0]![0]);
  return `mixed: ${kinds.map(([name, count]) => `${count} ${name}`).join(', ')}`;
}

interface Seen {
  high: number;
  crlf: number;
  lf: number;
  cr: number;
  control: number;
}

const HEAD = 65_536;

/** Counts line ends and, at the start of the file, control characters. Returns where it stopped, past a whole line end. */
function lookAt(bytes: Uint8Array, from: number, to: number, seen: Seen): number {
  let { high, crlf, lf, cr, control } = seen;
  const offset = bytes.byteOffset;
  const words = new Int32Array(bytes.buffer, 0, bytes.buffer.byteLength >> 2);
  const stop = (offset + to) >> 2;
  let at = from;
  while (at < to) {
    if (((offset + at) & 3) === 0) {
      // Four bytes at once while none of them is below 32 ("hasless", S. E. Anderson, Bit Twiddling Hacks).
      let w = (offset + at) >> 2;
      for (; w < stop; w++) {
        const word = words[w]!;
        if (((word - 0x20202020) & ~word & 0x80808080) !== 0) break;
        if ((word & 0x80808080) !== 0) high |= 0x80;
      }
      at = w * 4 - offset;
      if (at >= to) break;
    }
    const byte = bytes[at]!;
    high |= byte;
    if (byte < 32) {
      if (byte === 10) lf++;
      else if (byte === 13) {
        const next = afterLineEnd(bytes, at);
        if (bytes[next - 1] === 10) crlf++;
        else cr++;
        at = next;
        continue;
      } else if (at < HEAD && byte !== 9 && byte !== 12) control++;
    }
    at++;
  }
  Object.assign(seen, { high, crlf, lf, cr, control });
  return at;
}

/** Byte level of recognition. Yields about every megabyte so that a server can serve others meanwhile. */
export function* cleanSteps(raw: Uint8Array): Generator<void, CleanBytes> {
  let bytes = raw;
  let encoding = '';
  let nulBytes = 0;
  const unmarked = startsWith(raw, 0xff, 0xfe) || startsWith(raw, 0xfe, 0xff) ? null : utf16Guess(raw);
  if (startsWith(raw, 0xff, 0xfe)) {
    bytes = yield* fromUtf16(raw, 'utf-16le');
    encoding = 'utf-16le with BOM';
  } else if (startsWith(raw, 0xfe, 0xff)) {
    bytes = yield* fromUtf16(raw, 'utf-16be');
    encoding = 'utf-16be with BOM';
  } else if (unmarked) {
    bytes = yield* fromUtf16(raw, unmarked);
    encoding = unmarked;
  } else if (startsWith(raw, 0xef, 0xbb, 0xbf)) {
    bytes = raw.subarray(3);
    encoding = 'utf-8 with BOM';
  }
  if (bytes.includes(0)) {
    const before = bytes.length;
    bytes = withoutNul(bytes);
    nulBytes = before - bytes.length;
    yield;
  }

  const seen: Seen = { high: 0, crlf: 0, lf: 0, cr: 0, control: 0 };
  for (let at = 0; at < bytes.length;) {
    at = lookAt(bytes, at, Math.min(at + CHUNK, bytes.length), seen);
    yield;
  }
  const { high, crlf, lf, cr, control } = seen;
  const head = Math.min(bytes.length, HEAD);

  if (high & 0x80 && !encoding.startsWith('utf-16') && !(yield* isUtf8(bytes))) {
    bytes = yield* fromWindows1252(bytes);
    encoding = 'windows-1252';
  }
  encoding ||= high & 0x80 ? 'utf-8' : 'ascii';
  const last = bytes[bytes.length - 1];
  const endsWithLineEnd = last === 10 || last === 13;
  return {
    bytes,
    encoding: nulBytes > 0 ? `${encoding} with NUL bytes (${nulBytes})` : encoding,
    lineEnds: describeLineEnds(crlf, lf, cr),
    nulBytes,
    lines: crlf + lf + cr + (bytes.length > 0 && !endsWithLineEnd ? 1 : 0),
    endsWithLineEnd,
    controlShare: head === 0 ? 0 : control / head,
  };
}

/** Runs a stepwise piece of work to its end. */
export function runThrough<T>(steps: Generator<unknown, T>): T {
  for (;;) {
    const step = steps.next();
    if (step.done) return step.value;
  }
}

/** The whole file as text, for readers that want lines: line n of the text is line n of the file. */
export function decode(raw: Uint8Array): DecodedText {
  const clean = runThrough(cleanSteps(raw));
  const text = new TextDecoder('utf-8', { ignoreBOM: true }).decode(clean.bytes).replace(/\r?\r\n|\r/g, '\n');
  return { text, encoding: clean.encoding, lineEnds: clean.lineEnds, nulBytes: clean.nulBytes };
}
