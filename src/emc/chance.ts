/**
 * Probability that at least `least` of independent things happen, each with its own probability (Poisson-binomial
 * upper tail). Summed without subtracting, so that a small tail keeps its digits. Throws RangeError on a probability
 * outside 0 to 1 and on a count that is no whole number. Source: definition, by recursion over the things.
 */
export function atLeastByChance(least: number, probabilities: readonly number[]): number {
  if (!Number.isInteger(least)) throw new RangeError(`${least} is no count.`);
  if (least <= 0) return 1;
  // exactly[k] for k below `least`; the last one gathers `least` and more.
  const exactly = new Float64Array(least + 1);
  exactly[0] = 1;
  for (const p of probabilities) {
    if (!(p >= 0 && p <= 1)) throw new RangeError(`${p} is no probability.`);
    exactly[least] = exactly[least]! + exactly[least - 1]! * p;
    for (let k = least - 1; k > 0; k--) exactly[k] = exactly[k]! * (1 - p) + exactly[k - 1]! * p;
    exactly[0] = exactly[0]! * (1 - p);
  }
  return exactly[least]!;
}
