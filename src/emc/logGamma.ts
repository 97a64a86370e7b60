/** Coefficients B₂ₖ / (2k(2k − 1)) of the asymptotic series, from the Bernoulli numbers. */
const STIRLING = [1 / 12, -1 / 360, 1 / 1260, -1 / 1680, 1 / 1188, -691 / 360360, 1 / 156];
/** From here on the first term left out is below 1e-17. */
const SERIES_FROM = 15;

/**
 * ln Γ(x) for x > 0. Stirling's series (Abramowitz and Stegun 6.1.41) from 15 on; below that x is moved up by
 * Γ(x) = Γ(x + 1) / x. Throws RangeError for zero, less, or what is not finite.
 */
export function logGamma(x: number): number {
  if (!(x > 0 && Number.isFinite(x))) throw new RangeError(`ln Γ is not defined here for ${x}.`);
  let at = x;
  let product = 1;
  for (; at < SERIES_FROM; at++) product *= at;
  let series = 0;
  for (let k = STIRLING.length - 1; k >= 0; k--) series = series / (at * at) + STIRLING[k]!;
  return (at - 0.5) * Math.log(at) - at + 0.5 * Math.log(2 * Math.PI) + series / at - Math.log(product);
}
