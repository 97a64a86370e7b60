/**
 * The x at which a rising distribution function reaches a probability between 0 and 1, by halving a bracket until
 * the two ends are neighbours to 1e-15 of their size (or of 1 near zero). Throws RangeError on a probability outside.
 */
export function quantileOf(distribution: (x: number) => number, probability: number): number {
  if (!(probability > 0 && probability < 1)) {
    throw new RangeError(`A quantile is asked for between 0 and 1, not at ${probability}.`);
  }
  let lower = -1;
  let upper = 1;
  while (distribution(lower) > probability) lower *= 2;
  while (distribution(upper) < probability) upper *= 2;
  for (;;) {
    const middle = (lower + upper) / 2;
    if (upper - lower <= 1e-15 * Math.max(1, Math.abs(middle)) || middle === lower || middle === upper) return middle;
    const below = distribution(middle) - probability;
    if (below === 0) return middle;
    if (below < 0) lower = middle;
    else upper = middle;
  }
}
