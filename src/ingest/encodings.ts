const CHUNK = 1 << 20;

/** Code points of 0x80 to 0x9F in Windows-1252 (WHATWG Encoding Standard, index windows-1252). */
const WINDOWS_1252 = [
  0x20ac, 0x81, 0x201a, 0x192, 0x201e, 0x2026, 0x2020, 0x2021, 0x2c6, 0x2030, 0x160, 0x2039, 0x152, 0x8d, 0x17d, 0x8f,
  0x90, 0x2018, 0x2019, 0x201c, 0x201d, 0x2022, 0x2013, 0x2014, 0x2dc, 0x2122, 0x161, 0x203a, 0x153, 0x9d, 0x17e, 0x178,
];

/** UTF-16 shows as NULs on one side of every pair; padding shows on both sides or seldom. */
export function utf16Guess(bytes: Uint8Array): 'utf-16le' | 'utf-16be' | null {
  const pairs = Math.min(bytes.length >> 1, 4096);
  if (pairs < 2) return null;
  let even = 0;
  let odd = 0;
  for (let i = 0; i < pairs * 2; i += 2) {
    if (bytes[i] === 0) even++;
    if (bytes[i + 1] === 0) odd++;
  }
  if (odd > 0.7 * pairs && even < 0.05 * pairs) return 'utf-16le';
  if (even > 0.7 * pairs && odd < 0.05 * pairs) return 'utf-16be';
  return null;
}

function join(parts: Uint8Array[]): Uint8Array {
  const whole = new Uint8Array(parts.reduce((sum, part) => sum + part.length, 0));
  let at = 0;
  for (const part of parts) {
    whole.set(part, at);
    at += part.length;
  }
  return whole;
}

export function* fromUtf16(bytes: Uint8Array, encoding: 'utf-16le' | 'utf-16be'): Generator<void, Uint8Array> {
  const decoder = new TextDecoder(encoding);
  const encoder = new TextEncoder();
  const parts: Uint8Array[] = [];
  for (let at = 0; at < bytes.length; at += CHUNK) {
    parts.push(encoder.encode(decoder.decode(bytes.subarray(at, at + CHUNK), { stream: at + CHUNK < bytes.length })));
    yield;
  }
  return join(parts);
}

export function* fromWindows1252(bytes: Uint8Array): Generator<void, Uint8Array> {
  const encoder = new TextEncoder();
  const parts: Uint8Array[] = [];
  const points: number[] = [];
  for (let at = 0; at < bytes.length; at += CHUNK) {
    const stop = Math.min(at + CHUNK, bytes.length);
    const pieces: string[] = [];
    for (let i = at; i < stop; i++) {
      const byte = bytes[i]!;
      points.push(byte >= 0x80 && byte <= 0x9f ? WINDOWS_1252[byte - 0x80]! : byte);
      if (points.length === 4096 || i + 1 === stop) pieces.push(String.fromCharCode(...points.splice(0)));
    }
    parts.push(encoder.encode(pieces.join('')));
    yield;
  }
  return join(parts);
}

export function* isUtf8(bytes: Uint8Array): Generator<void, boolean> {
  const decoder = new TextDecoder('utf-8', { fatal: true });
  try {
    for (let at = 0; at < bytes.length; at += CHUNK) {
      decoder.decode(bytes.subarray(at, at + CHUNK), { stream: at + CHUNK < bytes.length });
      yield;
    }
    return true;
  } catch {
    return false;
  }
}
