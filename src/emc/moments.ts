/** Count, mean and standard deviation of a list of levels in dB. */
export interface Moments {
  n: number;
  /** Arithmetic mean of the dB figures, not of what they stand for; null for an empty list. */
  mean: number | null;
  /** With divisor n − 1; null for fewer than two. */
  deviation: number | null;
}

/**
 * Mean and standard deviation with divisor n − 1, of dB figures as they are (CISPR TR 16-4-3, statistics of series
 * production; JCGM 100:2008 4.2.2). Throws RangeError on a figure that is not finite.
 */
export function momentsOf(levels: readonly number[]): Moments {
  const n = levels.length;
  for (const level of levels) if (!Number.isFinite(level)) throw new RangeError(`A level of ${level} is none.`);
  if (n === 0) return { n, mean: null, deviation: null };
  // About the first, so that equal levels have exactly their own mean and no deviation.
  const from = levels[0]!;
  const mean = from + levels.reduce((sum, level) => sum + (level - from), 0) / n;
  if (n < 2) return { n, mean, deviation: null };
  return { n, mean, deviation: Math.sqrt(levels.reduce((sum, level) => sum + (level - mean) ** 2, 0) / (n - 1)) };
}
