import { incompleteBeta } from './incompleteBeta';
import { logGamma } from './logGamma';
import { normalCdf } from './normalDistribution';
import { quantileOf } from './quantile';

/** What a weight adds to a probability below this is nothing. */
const NEGLIGIBLE = 1e-18;

/**
 * P(T ≤ t) of the non-central t distribution: T = (Z + δ) / √(χ²_ν / ν). Noncentrality 0 is Student's t. Summed as
 * Lenth's algorithm AS 243 (Applied Statistics 38, 1989) has it, from the largest weight outwards. Throws RangeError
 * unless the degrees of freedom are above 0 and everything is finite.
 */
export function noncentralTCdf(t: number, degreesOfFreedom: number, noncentrality: number): number {
  if (!(degreesOfFreedom > 0 && Number.isFinite(degreesOfFreedom))) {
    throw new RangeError(`${degreesOfFreedom} degrees of freedom are none to compute with.`);
  }
  if (!Number.isFinite(noncentrality) || Number.isNaN(t)) {
    throw new RangeError(`The non-central t is not defined for t ${t} and noncentrality ${noncentrality}.`);
  }
  if (t < 0) return 1 - noncentralTCdf(-t, degreesOfFreedom, -noncentrality);
  const x = (t * t) / (degreesOfFreedom + t * t);
  const half = degreesOfFreedom / 2;
  const lambda = (noncentrality * noncentrality) / 2;
  /** p_j and q_j beside their incomplete beta functions, and how much they can weigh at all. */
  const termAt = (j: number) => {
    const logPower = lambda === 0 ? (j === 0 ? 0 : -Infinity) : j * Math.log(lambda) - lambda;
    const p = Math.exp(logPower - logGamma(j + 1));
    const q = (noncentrality / Math.SQRT2) * Math.exp(logPower - logGamma(j + 1.5));
    const sum = p * incompleteBeta(x, j + 0.5, half) + q * incompleteBeta(x, j + 1, half);
    return { sum, weight: p + Math.abs(q) };
  };
  const heaviest = Math.floor(lambda);
  let sum = 0;
  for (let j = heaviest, more = true; more; j++) {
    const term = termAt(j);
    sum += term.sum;
    more = term.weight > NEGLIGIBLE;
  }
  for (let j = heaviest - 1, more = true; more && j >= 0; j--) {
    const term = termAt(j);
    sum += term.sum;
    more = term.weight > NEGLIGIBLE;
  }
  return Math.min(1, Math.max(0, normalCdf(-noncentrality) + sum / 2));
}

/** The t at which P(T ≤ t) reaches a probability between 0 and 1. Throws RangeError as `noncentralTCdf` does. */
export function noncentralTQuantile(probability: number, degreesOfFreedom: number, noncentrality: number): number {
  return quantileOf((t) => noncentralTCdf(t, degreesOfFreedom, noncentrality), probability);
}
