import { noncentralTQuantile } from './noncentralT';
import { normalQuantile } from './normalDistribution';

/** From here on the series below is exact to 1e-11 and the distribution function no longer is. */
const SERIES_FROM = 1e4;

/**
 * Quantile of Student's t. From 10 000 degrees of freedom on by its expansion about the normal quantile (Abramowitz
 * and Stegun 26.7.5); infinitely many are the normal distribution. Throws RangeError on a probability outside 0 to 1
 * and on degrees of freedom that are not above 0.
 */
export function studentTQuantile(probability: number, degreesOfFreedom: number): number {
  if (!(degreesOfFreedom >= SERIES_FROM)) return noncentralTQuantile(probability, degreesOfFreedom, 0);
  const z = normalQuantile(probability);
  const first = (z ** 3 + z) / 4;
  const second = (5 * z ** 5 + 16 * z ** 3 + 3 * z) / 96;
  return z + (first + second / degreesOfFreedom) / degreesOfFreedom;
}
