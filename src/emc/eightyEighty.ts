import { EQUAL_WITHIN_DB } from './guardBand';
import { momentsOf, type Moments } from './moments';
import { noncentralTQuantile } from './noncentralT';
import { normalQuantile } from './normalDistribution';

/** With 80 % confidence at least 80 % of the units comply. Source: CISPR TR 16-4-3; CISPR 11, 14-1 and 32. */
export const CONFIDENCE = 0.8;
export const PROPORTION = 0.8;

/** Of fewer samples than this the rule says nothing at all. */
export const FEWEST_SAMPLES = 3;
/** Three or four only where no more units exist. Source: CISPR TR 16-4-3, from memory. */
export const SAMPLES_ASKED_FOR = 5;

/**
 * k by number of samples as the standards print it; 3 and 4 are 0.024 and 0.015 above the exact figure, the others
 * within 0.01. Source: CISPR TR 16-4-3 and CISPR 14-1, from memory.
 */
const PRINTED_K: Readonly<Record<number, number>> = {
  3: 2.04,
  4: 1.69,
  5: 1.52,
  6: 1.42,
  7: 1.35,
  8: 1.3,
  9: 1.27,
  10: 1.24,
  11: 1.21,
  12: 1.2,
};

/** `printed` for a declared evaluation by the standard, `exact` beyond its table and as a check of it. */
export type FactorKind = 'printed' | 'exact';

/** Levels at one frequency, one of each sample of a product, beside the limit in the same unit. */
export interface SeriesLevels {
  levels: readonly number[];
  limit: number;
  /** Said by a person: there are no more units than these. */
  noMoreUnitsExist?: boolean;
}

/** What a rule of series production says of samples. */
export interface SeriesStatement extends Moments {
  limit: number;
  /** What is compared with the limit, in its unit; null where the rule says nothing. */
  comparedAs: number | null;
  /** `over` is that the rule is not met: it shows of no unit that it is over. */
  verdict: 'under' | 'over' | 'not-covered';
  because: string;
}

/** As printed; null for a number of samples the table does not have. */
export function printedFactor(n: number): number | null {
  return PRINTED_K[n] ?? null;
}

/** Computed once each: a sheet asks for the same number of samples at every frequency. */
const exactFactors = new Map<number, number>();

/**
 * One-sided tolerance factor: the 0.8 quantile of the non-central t with n − 1 degrees of freedom and noncentrality
 * √n · Φ⁻¹(0.8), over √n. Source: CISPR TR 16-4-3. Throws RangeError unless n is a whole number from 2 on.
 */
export function exactFactor(n: number): number {
  if (!Number.isInteger(n) || n < 2) throw new RangeError(`There is no tolerance factor for ${n} samples.`);
  const known = exactFactors.get(n);
  if (known !== undefined) return known;
  const factor = noncentralTQuantile(CONFIDENCE, n - 1, Math.sqrt(n) * normalQuantile(PROPORTION)) / Math.sqrt(n);
  exactFactors.set(n, factor);
  return factor;
}

/**
 * The rule by the non-central t distribution: mean + k·s ≤ limit over samples of one product, in dB. Not covered for
 * fewer than three samples, for three or four unless a person says that no more exist, and where the printed table
 * ends. Source: CISPR TR 16-4-3:2004 + A1:2006. Throws RangeError on figures that are none.
 */
export function eightyEighty(series: SeriesLevels, factor: FactorKind): SeriesStatement & { k: number | null } {
  const moments = momentsOf(series.levels);
  const { n, mean, deviation } = moments;
  const missing = tooFew(series);
  if (missing !== null) return { ...notCovered(series, moments, missing), k: null };
  const k = factor === 'printed' ? printedFactor(n) : exactFactor(n);
  if (k === null) {
    return { ...notCovered(series, moments, `The printed table has no factor for ${n} samples.`), k };
  }
  // At least three samples have both.
  return { ...compared(series, moments, mean! + k * deviation!, 'Mean plus k times the standard deviation'), k };
}

/** Why there are too few samples for either rule by level; null when there are enough. Throws on a limit that is none. */
export function tooFew({ levels, limit, noMoreUnitsExist = false }: SeriesLevels): string | null {
  if (!Number.isFinite(limit)) throw new RangeError(`A limit of ${limit} is none.`);
  if (levels.length < FEWEST_SAMPLES) return 'Fewer than three samples say nothing about a series.';
  if (levels.length < SAMPLES_ASKED_FOR && !noMoreUnitsExist) {
    return 'Five samples are asked for; three or four only where no more units exist.';
  }
  return null;
}

export function notCovered({ limit }: SeriesLevels, moments: Moments, because: string): SeriesStatement {
  return { ...moments, limit, comparedAs: null, verdict: 'not-covered', because };
}

/** On the limit is under. */
export function compared({ limit }: SeriesLevels, moments: Moments, figure: number, name: string): SeriesStatement {
  const under = figure - limit <= EQUAL_WITHIN_DB;
  const because = `${name} is ${under ? 'not over' : 'over'} the limit.`;
  return { ...moments, limit, comparedAs: figure, verdict: under ? 'under' : 'over', because };
}
