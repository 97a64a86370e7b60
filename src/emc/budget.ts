import { normalCdf } from './normalDistribution';
import { studentTQuantile } from './studentT';

/** How the value of a contribution is stated, and with it how it becomes a standard uncertainty. */
export type Distribution =
  | { shape: 'normal'; /** Coverage factor the value is stated with; 1 for a standard uncertainty. */ k: number }
  | { shape: 'rectangular' | 'triangular' | 'U-shaped' };

export interface Contribution {
  /** e.g. `antenna factor`, `mismatch antenna to receiver` */
  name: string;
  /** Zero or more: the half-width of the interval, or the uncertainty stated with its k. */
  valueDb: number;
  distribution: Distribution;
  /** dB of the result per dB of the contribution; 1 for everything that adds to the level. */
  sensitivity: number;
  /** Where the value comes from, e.g. `certificate 2231, page 2`. */
  source: string;
  /** n − 1 for a value from n readings; null or left out for one without limit (type B). */
  degreesOfFreedom?: number | null;
}

export interface BudgetRow {
  contribution: Contribution;
  divisor: number;
  /** valueDb / divisor. */
  standardDb: number;
  /** What it adds to the result: |sensitivity| · standardDb. */
  contributedDb: number;
  /** Part of the combined variance, 0 to 1; null where the combined uncertainty is zero. */
  shareOfVariance: number | null;
}

export interface BudgetResult {
  rows: BudgetRow[];
  combinedDb: number;
  /** Welch-Satterthwaite; null where nothing limits them. */
  effectiveDegreesOfFreedom: number | null;
  coverageFactor: number;
  expandedDb: number;
}

/**
 * What a value is divided by for its standard uncertainty: k for a normal one, √3, √6 and √2 for rectangular,
 * triangular and U-shaped. Source: JCGM 100:2008 (GUM) 4.3; LAB34 3.4. Throws RangeError on a k that is not above 0.
 */
export function divisorOf(distribution: Distribution): number {
  switch (distribution.shape) {
    case 'normal':
      if (distribution.k > 0 && Number.isFinite(distribution.k)) return distribution.k;
      throw new RangeError(`A coverage factor of ${distribution.k} is none.`);
    case 'rectangular':
      return Math.sqrt(3);
    case 'triangular':
      return Math.sqrt(6);
    case 'U-shaped':
      return Math.SQRT2;
  }
}

/** √(Σ u²) of contributions that are not correlated. Source: JCGM 100:2008 (GUM) 5.1.2. */
export function rootSumOfSquares(contributed: readonly number[]): number {
  return Math.hypot(...contributed);
}

/**
 * Combines uncorrelated contributions: u = √(Σ (c·u)²), U = k·u. k is 2, or where degrees of freedom are given the t
 * factor of the same level for the effective ones. Source: JCGM 100:2008 (GUM) 5.1.2, 6.2.1, G.4.1. Throws RangeError
 * without contributions, and on a value, sensitivity, k or degrees of freedom that cannot be.
 */
export function budgetOf(contributions: readonly Contribution[]): BudgetResult {
  if (contributions.length === 0) throw new RangeError('A budget without contributions has no uncertainty.');
  const standards = contributions.map(standardOf);
  const combinedDb = rootSumOfSquares(standards.map(({ contributedDb }) => contributedDb));
  const rows = standards.map((row) => ({
    ...row,
    shareOfVariance: combinedDb === 0 ? null : (row.contributedDb / combinedDb) ** 2,
  }));
  const effectiveDegreesOfFreedom = effectiveOf(standards, combinedDb);
  const coverageFactor = effectiveDegreesOfFreedom === null ? 2 : coverageFactorAt(effectiveDegreesOfFreedom);
  return { rows, combinedDb, effectiveDegreesOfFreedom, coverageFactor, expandedDb: coverageFactor * combinedDb };
}

/**
 * Two-sided t factor of the level that k = 2 has for a normal distribution (95.45 %), or of another level. Degrees of
 * freedom need not be whole. Source: JCGM 100:2008 (GUM) G.3 and Table G.2. Throws RangeError below 1.
 */
export function coverageFactorAt(degreesOfFreedom: number, level = 2 * normalCdf(2) - 1): number {
  if (!(degreesOfFreedom >= 1)) throw new RangeError(`${degreesOfFreedom} degrees of freedom are fewer than 1.`);
  return studentTQuantile((1 + level) / 2, degreesOfFreedom);
}

function standardOf(contribution: Contribution): Omit<BudgetRow, 'shareOfVariance'> {
  const { name, valueDb, sensitivity, distribution, degreesOfFreedom } = contribution;
  if (!(valueDb >= 0 && Number.isFinite(valueDb))) throw new RangeError(`${name}: ${valueDb} dB is no uncertainty.`);
  if (!Number.isFinite(sensitivity)) throw new RangeError(`${name}: a sensitivity of ${sensitivity} is none.`);
  if (typeof degreesOfFreedom === 'number' && !(degreesOfFreedom >= 1)) {
    throw new RangeError(`${name}: ${degreesOfFreedom} degrees of freedom are fewer than 1.`);
  }
  const divisor = divisorOf(distribution);
  const standardDb = valueDb / divisor;
  return { contribution, divisor, standardDb, contributedDb: Math.abs(sensitivity) * standardDb };
}

/** ν = u⁴ / Σ (uᵢ⁴ / νᵢ) (GUM G.2b); contributions without limit add nothing to the sum. */
function effectiveOf(rows: readonly Omit<BudgetRow, 'shareOfVariance'>[], combinedDb: number): number | null {
  let limited = 0;
  for (const { contribution, contributedDb } of rows) {
    const { degreesOfFreedom } = contribution;
    if (typeof degreesOfFreedom === 'number') limited += (contributedDb / combinedDb) ** 4 / degreesOfFreedom;
  }
  return limited > 0 ? 1 / limited : null;
}
