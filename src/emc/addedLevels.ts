/**
 * The level of several signals whose powers add (noise, signals at unrelated phases): 10 log10 Σ 10^(L/10). In dB of
 * any one unit. Source: definition. Throws RangeError on an empty list or a level that is not finite.
 */
export function powerSumDb(levelsDb: readonly number[]): number {
  return sumDb(levelsDb, 10);
}

/** The most that signals can add up to, all in phase: 20 log10 Σ 10^(L/20). Source: definition. Throws as `powerSumDb`. */
export function inPhaseSumDb(levelsDb: readonly number[]): number {
  return sumDb(levelsDb, 20);
}

/**
 * How many dB a reading lies above the signal alone when unrelated noise adds to it: 10 log10(1 + 10^(−d/10)) for a
 * signal d dB above the noise, both as r.m.s. in the receiver's bandwidth. Source: addition of powers.
 */
export function raisedByNoiseDb(signalAboveNoiseDb: number): number {
  return powerSumDb([0, -signalAboveNoiseDb]);
}

/** Counted from the highest level, so that no level is too large or too small to add. */
function sumDb(levelsDb: readonly number[], perDecadeDb: 10 | 20): number {
  if (levelsDb.length === 0) throw new RangeError('There is no level to add.');
  for (const db of levelsDb) if (!Number.isFinite(db)) throw new RangeError(`${db} dB is no level.`);
  const highestDb = levelsDb.reduce((a, b) => Math.max(a, b));
  const parts = levelsDb.reduce((sum, db) => sum + 10 ** ((db - highestDb) / perDecadeDb), 0);
  return highestDb + perDecadeDb * Math.log10(parts);
}
