import { positive } from './freeSpace';
import { largeSourceBoundaryM, smallSourceBoundaryM } from './nearField';

/**
 * How a level follows distance. `inverse-distance`: 20 dB per decade throughout. `47 CFR 15.31(f)`: 20 dB per decade at
 * and above 30 MHz (f)(1), 40 dB per decade below (f)(2), where no fall-off was measured at two distances.
 */
export const DISTANCE_RULES = ['inverse-distance', '47 CFR 15.31(f)'] as const;
export type DistanceRule = (typeof DISTANCE_RULES)[number];

const SQUARE_BELOW_HZ = 30e6;
/** A distance at which the field of anything larger than a hand is no longer that of a point. */
const CLOSE_M = 1;

export interface Conversion {
  frequencyHz: number;
  /** Where the level was measured. */
  fromM: number;
  /** Where the limit stands. */
  toM: number;
  rule: DistanceRule;
  /** Largest extent of the radiating source with its cables; null where nobody has said. */
  extentM: number | null;
}

/** Why a converted level shows nothing about being under. `boundaryM` is where the far field begins. */
export type Doubt =
  | { because: 'starts-in-near-field' | 'ends-in-near-field'; border: 'lambda/2pi' | '2D2/lambda'; boundaryM: number }
  | { because: 'starts-at-1-m' };

/** What a converted level can show: `at-most-over` may be over, inconclusive or need a final, never under. */
export type Standing = { shows: 'under-and-over' } | { shows: 'at-most-over'; doubts: [Doubt, ...Doubt[]] };

/** The distance correction as a term of its own. */
export interface DistanceTerm extends Conversion {
  dbPerDecade: 20 | 40;
  /** Add it to the level at `fromM` to have the level at `toM`. */
  correctionDb: number;
  standing: Standing;
}

/** Fall-off of a rule at a frequency, dB per decade of distance. Throws RangeError on what is no frequency. */
export function fallOffDbPerDecade(rule: DistanceRule, frequencyHz: number): 20 | 40 {
  positive('Frequency', frequencyHz, 'Hz');
  return rule === '47 CFR 15.31(f)' && frequencyHz < SQUARE_BELOW_HZ ? 40 : 20;
}

/**
 * The term that turns a level at one distance into the level at another: n log10(from/to), n by the rule. Source:
 * inverse-distance law; 47 CFR 15.31(f). Throws RangeError on a frequency, distance or extent of zero or less.
 */
export function distanceTerm(conversion: Conversion): DistanceTerm {
  const { frequencyHz, rule, fromM, toM } = conversion;
  const dbPerDecade = fallOffDbPerDecade(rule, frequencyHz);
  const ratio = positive('Distance', fromM, 'm') / positive('Distance', toM, 'm');
  return {
    ...conversion,
    dbPerDecade,
    correctionDb: dbPerDecade * Math.log10(ratio),
    standing: standingOf(conversion),
  };
}

/**
 * What a level can show after its conversion. No law of distance holds within λ/2π (any source) or 2D²/λ (a source of
 * known extent): 47 CFR 15.31(f)(1) extrapolates outside the near field only. From 1 m or closer none is taken to hold.
 * A level at the limit's own distance is not converted and shows both.
 */
export function standingOf({ frequencyHz, fromM, toM, extentM }: Conversion): Standing {
  if (fromM === toM) return { shows: 'under-and-over' };
  const borders = [{ border: 'lambda/2pi' as const, boundaryM: smallSourceBoundaryM(frequencyHz) }];
  const doubts = [...borders, ...largeBorder(frequencyHz, extentM)].flatMap((near): Doubt[] => [
    ...(fromM < near.boundaryM ? [{ because: 'starts-in-near-field' as const, ...near }] : []),
    ...(toM < near.boundaryM ? [{ because: 'ends-in-near-field' as const, ...near }] : []),
  ]);
  if (fromM <= CLOSE_M) doubts.push({ because: 'starts-at-1-m' });
  const [first, ...rest] = doubts;
  return first ? { shows: 'at-most-over', doubts: [first, ...rest] } : { shows: 'under-and-over' };
}

function largeBorder(frequencyHz: number, extentM: number | null) {
  if (extentM === null) return [];
  return [{ border: '2D2/lambda' as const, boundaryM: largeSourceBoundaryM(frequencyHz, extentM) }];
}
