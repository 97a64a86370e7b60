import type { Interval } from './intervals';

// All of this: CISPR 16-1-4, validation of test sites above 1 GHz (from memory).

/** Largest site VSWR: 6 dB, a ratio of 2. */
export const SITE_VSWR_DB = 6;
export const SITE_VSWR_RANGE: Interval = { fromHz: 1e9, toHz: 18e9 };
/** The six positions of a location, as distances along the line toward the receive antenna. */
export const POSITIONS_CM = [0, 2, 10, 18, 30, 40] as const;
export type PositionCm = (typeof POSITIONS_CM)[number];

/** Level received from the source at one position, corrected for its distance to the receive antenna. */
export interface PositionReading {
  positionCm: PositionCm;
  frequencyHz: number;
  levelDbuv: number;
}

/** Site VSWR of one location at one frequency: highest less lowest level of its positions. */
export interface SiteVswr {
  frequencyHz: number;
  vswrDb: number;
  highestAtCm: PositionCm;
  lowestAtCm: PositionCm;
  /** Positions without a reading: the VSWR is then at least what stands here. */
  missingCm: PositionCm[];
  /** `fails` as soon as 6 dB are exceeded; `unknown` while they are not but a position is missing. */
  outcome: 'ok' | 'fails' | 'unknown';
}

/** 20 log10 of a voltage ratio: how a site VSWR is told in dB. Throws RangeError on a ratio below 1. */
export function vswrDb(ratio: number): number {
  if (!(ratio >= 1 && Number.isFinite(ratio))) throw new RangeError(`${ratio} is no standing wave ratio.`);
  return 20 * Math.log10(ratio);
}

/**
 * Site VSWR of one location and polarisation from the readings at its positions, per frequency in ascending order.
 * 6 dB itself is enough. Throws RangeError on a level that is not finite, on two readings of one position at one
 * frequency, and on a frequency outside 1 to 18 GHz, where the criterion does not stand.
 */
export function siteVswr(readings: readonly PositionReading[]): SiteVswr[] {
  const byFrequency = new Map<number, PositionReading[]>();
  for (const reading of readings) {
    const { frequencyHz, levelDbuv, positionCm } = reading;
    if (!(frequencyHz >= SITE_VSWR_RANGE.fromHz && frequencyHz <= SITE_VSWR_RANGE.toHz)) {
      throw new RangeError(`Site VSWR has no criterion at ${frequencyHz} Hz.`);
    }
    if (!Number.isFinite(levelDbuv)) throw new RangeError(`${levelDbuv} dBuV at ${frequencyHz} Hz is no level.`);
    const there = byFrequency.get(frequencyHz) ?? [];
    if (there.some((other) => other.positionCm === positionCm)) {
      throw new RangeError(`${positionCm} cm has two readings at ${frequencyHz} Hz.`);
    }
    byFrequency.set(frequencyHz, [...there, reading]);
  }
  return [...byFrequency].sort(([a], [b]) => a - b).map(([frequencyHz, there]) => vswrAt(frequencyHz, there));
}

function vswrAt(frequencyHz: number, there: readonly PositionReading[]): SiteVswr {
  const highest = there.reduce((a, b) => (b.levelDbuv > a.levelDbuv ? b : a));
  const lowest = there.reduce((a, b) => (b.levelDbuv < a.levelDbuv ? b : a));
  const db = highest.levelDbuv - lowest.levelDbuv;
  const missingCm = POSITIONS_CM.filter((cm) => !there.some(({ positionCm }) => positionCm === cm));
  return {
    frequencyHz,
    vswrDb: db,
    highestAtCm: highest.positionCm,
    lowestAtCm: lowest.positionCm,
    missingCm,
    outcome: db > SITE_VSWR_DB ? 'fails' : missingCm.length > 0 ? 'unknown' : 'ok',
  };
}
