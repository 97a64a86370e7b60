import type { Interval } from './intervals';
import type { Detector, LineDetector } from './kinds';

/** `unknown`: something that decides was not stated, or no source asks for anything here. */
export type Outcome = 'ok' | 'fails' | 'unknown';

/**
 * What a check of one receiver setting found from `fromHz` to `toHz`. Figures are what was compared, null where it is
 * not known; `because` says why it is unknown, and is null otherwise.
 */
export interface Finding<What extends string, Figures> extends Interval {
  what: What;
  outcome: Outcome;
  figures: Figures;
  because: string | null;
  /** Document and clause the check comes from. */
  source: string;
}

/** Bandwidth against the band's. `at6DbHz` is the filter's width 6 dB down, which the band's figure is stated at. */
export type BandwidthFinding = Finding<
  'bandwidth',
  { rbwHz: number | null; at6DbHz: number | null; askedHz: number | null }
>;

/** Step against half the bandwidth. `readsLowDb`: by how much a steady carrier midway between two points reads low. */
export type StepFinding = Finding<
  'step',
  {
    stepHz: number | null;
    greatestStepHz: number | null;
    readsLowDb: number | null;
    model: 'Gaussian, 6 dB bandwidth' | 'Gaussian, 3 dB bandwidth';
  }
>;

export type VideoBandwidthFinding = Finding<'video-bandwidth', { vbwHz: number | null; leastHz: number | null }>;
export type DwellFinding = Finding<'dwell', { dwellS: number | null; leastS: number | null }>;
export type ScanTimeFinding = Finding<'scan-time', { scanTimeS: number | null; leastS: number | null }>;
export type PulsePeriodFinding = Finding<'pulse-period', { dwellS: number | null; pulsePeriodS: number | null }>;

/**
 * What a reading in `average` can be: `cispr` is the highest that the average reaches through the meter's time constant
 * (160 ms in bands A and B, 100 ms above), which is what a CISPR limit in average means; `linear` is the mean over the
 * dwell, which reads less of slow pulses. RMS-average is a detector of its own, with limits of its own.
 */
export const AVERAGE_KINDS = ['linear', 'cispr'] as const;
export type AverageKind = (typeof AVERAGE_KINDS)[number];

/** How a reading stands to what the line's detector would read of the same signal in the same bandwidth. */
export type DetectorRelation = 'same' | 'at-or-above' | 'at-or-below' | 'none';
export type DetectorFinding = Finding<
  'detector',
  { detector: Detector; averageKind: AverageKind | null; asked: LineDetector; relation: DetectorRelation | null }
>;

/** Floor against the limit less 6 dB: where it is too high, and where no floor is known. */
export type FloorFinding = Finding<
  'noise-floor',
  {
    askedDb: number;
    leastDistanceDb: number | null;
    leastAtHz: number | null;
    tooHigh: Interval[];
    notKnown: Interval[];
  }
>;

export type OverloadFinding = Finding<'overload', { highestDbuv: number | null; greatestDbuv: number | null }>;

export type ReceiverFinding =
  | BandwidthFinding
  | StepFinding
  | VideoBandwidthFinding
  | DwellFinding
  | ScanTimeFinding
  | PulsePeriodFinding
  | DetectorFinding
  | FloorFinding
  | OverloadFinding;

/** A stated figure, or null where it is not stated. Throws RangeError, naming it, unless it is finite and above zero. */
export function stated(name: string, value: number | null, unit: string): number | null {
  if (value !== null && !(value > 0 && Number.isFinite(value))) {
    throw new RangeError(`${name} ${value} ${unit} is not above zero.`);
  }
  return value;
}
