import { logGamma } from './logGamma';

const TERMS = 10_000;
const SMALLEST = 1e-300;

/**
 * The regularised incomplete beta function I_x(a, b) for a, b > 0 and x from 0 to 1. Continued fraction 8.17.22 of
 * the NIST Digital Library of Mathematical Functions by Lentz's method; above its mean by I_x(a, b) = 1 − I_1−x(b, a).
 * Throws RangeError on anything outside.
 */
export function incompleteBeta(x: number, a: number, b: number): number {
  if (!(x >= 0 && x <= 1)) throw new RangeError(`The incomplete beta function takes 0 to 1, not ${x}.`);
  if (!(a > 0 && b > 0)) throw new RangeError(`The incomplete beta function takes a and b above 0, not ${a} and ${b}.`);
  if (x === 0 || x === 1) return x;
  const front = Math.exp(logGamma(a + b) - logGamma(a) - logGamma(b) + a * Math.log(x) + b * Math.log1p(-x));
  // The fraction converges fast below this and slowly above.
  if (x < (a + 1) / (a + b + 2)) return (front * fraction(x, a, b)) / a;
  return 1 - (front * fraction(1 - x, b, a)) / b;
}

function fraction(x: number, a: number, b: number): number {
  const away = (value: number) => (Math.abs(value) < SMALLEST ? SMALLEST : value);
  let c = 1;
  let d = 1 / away(1 - ((a + b) * x) / (a + 1));
  let result = d;
  for (let m = 1; m <= TERMS; m++) {
    const even = (m * (b - m) * x) / ((a + 2 * m - 1) * (a + 2 * m));
    d = 1 / away(1 + even * d);
    c = away(1 + even / c);
    result *= d * c;
    const odd = (-(a + m) * (a + b + m) * x) / ((a + 2 * m) * (a + 2 * m + 1));
    d = 1 / away(1 + odd * d);
    c = away(1 + odd / c);
    result *= d * c;
    if (Math.abs(d * c - 1) < Number.EPSILON) return result;
  }
  throw new RangeError(`The incomplete beta function does not settle at ${x} for ${a} and ${b}.`);
}
