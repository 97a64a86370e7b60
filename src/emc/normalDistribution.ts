import { quantileOf } from './quantile';

/** From here on the continued fraction is the more exact of the two. */
const TAIL_FROM = 3;
/** Far more than the fraction needs at its near end. */
const TAIL_TERMS = 200;

/** Φ(x), the standard normal distribution function. Throws RangeError on NaN. */
export function normalCdf(x: number): number {
  if (Number.isNaN(x)) throw new RangeError('Φ is not defined for NaN.');
  if (Math.abs(x) < TAIL_FROM) return 0.5 + density(x) * series(x);
  return x > 0 ? 1 - tail(x) : tail(-x);
}

/** The x at which Φ reaches a probability. Throws RangeError outside 0 to 1, ends included. */
export function normalQuantile(probability: number): number {
  // By its lower half, where Φ keeps all of its digits.
  return probability > 0.5 ? -quantileOf(normalCdf, 1 - probability) : quantileOf(normalCdf, probability);
}

function density(x: number): number {
  return Math.exp((-x * x) / 2) / Math.sqrt(2 * Math.PI);
}

/** x + x³/3 + x⁵/(3·5) + … (Abramowitz and Stegun 26.2.11). */
function series(x: number): number {
  let term = x;
  let sum = x;
  for (let odd = 3; Math.abs(term) > Number.EPSILON * Math.abs(sum) * 1e-2; odd += 2) {
    term *= (x * x) / odd;
    sum += term;
  }
  return sum;
}

/** 1 − Φ(x) = φ(x) / (x + 1/(x + 2/(x + 3/(x + …)))) (Abramowitz and Stegun 26.2.14), from the inside out. */
function tail(x: number): number {
  if (density(x) === 0) return 0;
  let below = x;
  for (let k = TAIL_TERMS; k >= 1; k--) below = x + k / below;
  return density(x) / below;
}
