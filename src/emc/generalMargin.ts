import {
  compared,
  CONFIDENCE,
  notCovered,
  PROPORTION,
  tooFew,
  type FactorKind,
  type SeriesLevels,
  type SeriesStatement,
} from './eightyEighty';
import { momentsOf } from './moments';
import { normalQuantile } from './normalDistribution';

/** The largest standard deviation the method counts on. Source: CISPR TR 16-4-3 A1, from memory. */
export const SIGMA_MAX_DB = 6;

/** By number of samples, in dB. Source: CISPR TR 16-4-3 A1, CISPR 14-1 and 15, from memory. */
const PRINTED_DB: Readonly<Record<number, number>> = { 3: 3.8, 4: 2.5, 5: 1.5, 6: 0.7 };

/**
 * The margin the highest of n samples has to keep: (Φ⁻¹(0.8) − Φ⁻¹(0.2^(1/n))) · 6 dB, or as printed. Null for a
 * number of samples that the method is not published for (3 to 6 are; from 8 on it would be below zero).
 */
export function generalMarginDb(n: number, factor: FactorKind): number | null {
  const printedDb = PRINTED_DB[n];
  if (printedDb === undefined) return null;
  if (factor === 'printed') return printedDb;
  return (normalQuantile(PROPORTION) - normalQuantile((1 - CONFIDENCE) ** (1 / n))) * SIGMA_MAX_DB;
}

/**
 * The method with a general margin: highest level + margin ≤ limit, for three to six samples. Not covered as
 * `eightyEighty` is, and above six. Source: CISPR TR 16-4-3 A1. Throws RangeError on figures that are none.
 */
export function generalMargin(series: SeriesLevels, factor: FactorKind): SeriesStatement & { marginDb: number | null } {
  const moments = momentsOf(series.levels);
  const missing = tooFew(series);
  if (missing !== null) return { ...notCovered(series, moments, missing), marginDb: null };
  const marginDb = generalMarginDb(moments.n, factor);
  if (marginDb === null) {
    return { ...notCovered(series, moments, 'The method is published for three to six samples.'), marginDb };
  }
  const figure = Math.max(...series.levels) + marginDb;
  return { ...compared(series, moments, figure, 'The highest level plus the general margin'), marginDb };
}
