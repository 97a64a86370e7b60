import { EXACT_POWERS } from './numbers';

const SPLITTER = 134_217_729; // 2^27 + 1 (Dekker 1971)
const bits = new Float64Array(1);
const words = new Uint32Array(bits.buffer);
const HIGH_WORD = new Uint8Array(new Uint32Array([1]).buffer)[0] === 1 ? 1 : 0;

/** Exact rounding error of a·b (Dekker, "A floating-point technique for extending the available precision", 1971). */
function productError(a: number, b: number, product: number): number {
  const aBig = a * SPLITTER;
  const aHigh = aBig - (aBig - a);
  const aLow = a - aHigh;
  const bBig = b * SPLITTER;
  const bHigh = bBig - (bBig - b);
  const bLow = b - bHigh;
  return aLow * bLow - (product - aHigh * bHigh - aLow * bHigh - aHigh * bLow);
}

/** Half the distance between a positive Float64 and the next; 0 for powers of two, whose neighbours are unevenly far. */
function halfUlp(value: number): number {
  bits[0] = value;
  const high = words[HIGH_WORD]!;
  if ((high & 0xfffff) === 0 && words[1 - HIGH_WORD] === 0) return 0;
  const exponent = (high >>> 20) - 53;
  if (exponent <= 0) return 0;
  words[HIGH_WORD] = exponent << 20;
  words[1 - HIGH_WORD] = 0;
  return bits[0]!;
}

/**
 * (front·10^digits + back) / 10^down, correctly rounded, for the 16 to 22 digits that some exporters write.
 *
 * The integer is held exactly as a sum of two Float64, divided, and the quotient's exact remainder compared with half
 * its last place. A remainder clearly inside proves the quotient to be what `Number()` gives; anything near is left to it.
 *
 * @param front exact integer below 2^53
 * @param back exact integer below 10^digits, `digits` at most 7
 * @param down 1 to 22
 * @returns NaN when the remainder does not prove it
 */
export function wideDecimal(front: number, back: number, digits: number, down: number): number {
  const scale = EXACT_POWERS[digits]!;
  const divisor = EXACT_POWERS[down]!;
  const high = front * scale;
  const low = productError(front, scale, high) + back;
  const first = high / divisor;
  const firstProduct = first * divisor;
  const rest = high - firstProduct - productError(first, divisor, firstProduct) + low;
  const quotient = first + rest / divisor;
  const product = quotient * divisor;
  const remainder = high - product - productError(quotient, divisor, product) + low;
  return Math.abs(remainder) < halfUlp(quotient) * divisor * 0.999 ? quotient : NaN;
}
