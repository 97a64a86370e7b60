import { normalCdf, normalQuantile } from './normalDistribution';

/**
 * Two decimals that are equal on paper are equal here: 0.1 + 37.2 is a little more than 37.3 in binary, and a reading
 * is kept as a Float32, which holds 39.4 to within 2e-6. Only where a level on the limit is accepted; it is a thousand
 * times finer than any reading.
 */
export const EQUAL_WITHIN_DB = 1e-5;

/** A level, its limit, and the expanded uncertainty that was stated with coverage factor k. */
export interface Stated {
  level: number;
  limit: number;
  expandedUDb: number;
  k?: number;
}

/**
 * Probability that the true level is at or under an upper limit, given the level that was read: Φ((limit − level) / u)
 * with u = U / k, normal and without prior knowledge. Source: ISO/IEC Guide 98-4 (JCGM 106:2012) clause 7. Throws
 * RangeError on figures that are none; without uncertainty there is no probability.
 */
export function conformityProbability({ level, limit, expandedUDb, k = 2 }: Stated): number {
  if (!Number.isFinite(level) || !Number.isFinite(limit)) {
    throw new RangeError(`A level of ${level} against a limit of ${limit} cannot be judged.`);
  }
  return normalCdf((limit - level) / standardOf(expandedUDb, k));
}

/** Specific risk that a level accepted as under is over: what is left of the probability. Source: JCGM 106:2012 clause 9. */
export function falseAcceptRisk({ level, limit, expandedUDb, k = 2 }: Stated): number {
  // Mirrored instead of 1 − p, so that a small risk keeps its digits.
  return conformityProbability({ level: -level, limit: -limit, expandedUDb, k });
}

/** The risk at the acceptance limit, limit − guard band: the largest an accepted level can have. JCGM 106:2012 8.3. */
export function largestFalseAcceptRisk(guardDb: number, expandedUDb: number, k = 2): number {
  return falseAcceptRisk({ level: -guardOf(guardDb), limit: 0, expandedUDb, k });
}

/**
 * The guard band that keeps the risk at the acceptance limit at a chosen figure, in standard uncertainties: Φ⁻¹(1 −
 * risk). Source: JCGM 106:2012 8.3.2. Throws RangeError unless the risk is above 0 and at most 0.5.
 */
export function guardInStandardUncertainties(risk: number): number {
  if (!(risk > 0 && risk <= 0.5)) throw new RangeError(`A risk of ${risk} is not above 0 and at most 0.5.`);
  return risk === 0.5 ? 0 : -normalQuantile(risk);
}

/** Guarded acceptance: a level at or under limit − guard band is accepted. Source: JCGM 106:2012 8.3. */
export function isAccepted(level: number, limit: number, guardDb: number): boolean {
  return level - (limit - guardOf(guardDb)) <= EQUAL_WITHIN_DB;
}

/** The four statements of ILAC-G8, as levels read: conditional within the guard band on either side of the limit. */
export const STATEMENTS = ['under', 'under, conditional', 'over, conditional', 'over'] as const;
export type Statement = (typeof STATEMENTS)[number];

/** The non-binary statement with guard band w on both sides. Source: ILAC-G8:09/2019 4.2.3. Throws on a w below 0. */
export function nonBinaryStatement(level: number, limit: number, guardDb: number): Statement {
  if (isAccepted(level, limit, guardDb)) return 'under';
  if (isAccepted(level, limit, 0)) return 'under, conditional';
  return isAccepted(level, limit + guardDb, 0) ? 'over, conditional' : 'over';
}

function guardOf(guardDb: number): number {
  if (guardDb >= 0 && Number.isFinite(guardDb)) return guardDb;
  throw new RangeError(`A guard band of ${guardDb} dB is none.`);
}

function standardOf(expandedUDb: number, k: number): number {
  if (!(expandedUDb > 0 && Number.isFinite(expandedUDb))) {
    throw new RangeError(`Expanded uncertainty ${expandedUDb} dB gives no probability.`);
  }
  if (!(k > 0 && Number.isFinite(k))) throw new RangeError(`A coverage factor of ${k} is none.`);
  return expandedUDb / k;
}
