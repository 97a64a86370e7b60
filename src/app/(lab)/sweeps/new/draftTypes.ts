import type { Detector, LevelUnit, MainsLine, Polarisation, Port, Purpose } from '@/schemas/common';
import type { SweepChoice } from '@/schemas/sweep';

/** What a draft took from the last file of its shape. */
export interface AsBefore {
  /** The run it was said of: `R-26-031`. */
  number: string;
  /** In words, what the figures depend on: `frequencies in MHz`, `dBµV`, `CBL-07 in the reading`. */
  took: string[];
  /** A person has said that it holds for this file too. */
  holds: boolean;
}

export type FrequencyUnit = SweepChoice['frequencyUnit'];

export interface TraceDraft {
  index: number;
  use: boolean;
  name: string;
  /** Empty until a person says it, where the file does not. */
  unit: LevelUnit | '';
  detector: Detector | '';
  rbwKhz: string;
}

/** The form as it stands: text where a person types, empty where nothing has been said yet. */
export interface Draft {
  stateId: string;
  port: Port;
  purpose: Purpose;
  operatingMode: string;
  line: MainsLine | '';
  polarisation: Polarisation | '';
  heightM: string;
  heightSwept: boolean;
  azimuthDeg: string;
  distanceM: string;
  pathId: string;
  limitSetId: string;
  valuesHold: SweepChoice['valuesHold'];
  alreadyCorrected: string[];
  frequencyUnit: FrequencyUnit | '';
  centreMhz: string;
  /** Empty until chosen, where the file holds several. */
  sweepIndex: number | '';
  traces: TraceDraft[];
  /** What was tried, for a quick trial; empty for a run that speaks for its state. */
  trial: string;
  /** Read up to the broken line, on purpose. */
  keepPartial: boolean;
  /** What was taken from the last file of this shape, and whether a person has said that it holds for this one. */
  asBefore: AsBefore | null;
}
