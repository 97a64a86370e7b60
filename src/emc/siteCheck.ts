import type { Interval } from './intervals';
import { groundPlaneNsa, type SiteGeometry } from './siteAttenuation';

/** Source: ANSI C63.4; CISPR 16-1-4:2019 clause 6. */
export const NSA_TOLERANCE_DB = 4;
export const NSA_RANGE: Interval = { fromHz: 30e6, toHz: 1000e6 };

/** Normalised site attenuation as measured. */
export interface MeasuredNsa {
  frequencyHz: number;
  nsaDb: number;
}

export interface NsaDeviation extends MeasuredNsa {
  theoreticalDb: number;
  /** Measured less theoretical. */
  deviationDb: number;
  within: boolean;
}

/** `incomplete`: all within, but the table does not begin at 30 MHz or earlier and end at 1000 MHz or later. */
export interface NsaCheck {
  outcome: 'within' | 'outside' | 'incomplete';
  rows: NsaDeviation[];
  /** The row farthest from theory; null for a table without rows between 30 and 1000 MHz. */
  worst: NsaDeviation | null;
}

/**
 * Measured normalised site attenuation from levels in dBµV and antenna factors in dB/m: V direct (cables joined)
 * − V site (best height) − AF transmit − AF receive. Source: ANSI C63.4; CISPR 16-1-4.
 */
export function measuredNsa(levels: {
  directDbuv: number;
  siteDbuv: number;
  txFactorDbPerM: number;
  rxFactorDbPerM: number;
}): number {
  return levels.directDbuv - levels.siteDbuv - levels.txFactorDbPerM - levels.rxFactorDbPerM;
}

/**
 * A measured table against theory for one polarisation and transmit position: every row within ±4 dB, 4 dB itself
 * included. Rows outside 30 to 1000 MHz are not judged. A site is acceptable when all its positions and polarisations
 * are; this judges one. Source: ANSI C63.4; CISPR 16-1-4:2019 clause 6. Throws RangeError on a level that is not finite
 * and as `groundPlaneNsa` does.
 */
export function checkNsa(measured: readonly MeasuredNsa[], geometry: SiteGeometry): NsaCheck {
  const inRange = measured.filter(({ frequencyHz: hz }) => !(hz < NSA_RANGE.fromHz || hz > NSA_RANGE.toHz));
  const rows = inRange.map((row): NsaDeviation => {
    if (!Number.isFinite(row.nsaDb))
      throw new RangeError(`${row.nsaDb} dB at ${row.frequencyHz} Hz is no attenuation.`);
    const theoreticalDb = groundPlaneNsa(row.frequencyHz, geometry).nsaDb;
    const deviationDb = row.nsaDb - theoreticalDb;
    return { ...row, theoreticalDb, deviationDb, within: Math.abs(deviationDb) <= NSA_TOLERANCE_DB };
  });
  const farther = (a: NsaDeviation | null, b: NsaDeviation) =>
    a === null || Math.abs(b.deviationDb) > Math.abs(a.deviationDb) ? b : a;
  const reaches =
    measured.some(({ frequencyHz }) => frequencyHz <= NSA_RANGE.fromHz) &&
    measured.some(({ frequencyHz }) => frequencyHz >= NSA_RANGE.toHz);
  const outside = rows.some((row) => !row.within);
  return {
    outcome: outside ? 'outside' : reaches && rows.length > 0 ? 'within' : 'incomplete',
    rows,
    worst: rows.reduce<NsaDeviation | null>(farther, null),
  };
}
