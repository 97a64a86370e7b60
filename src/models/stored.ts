import type { FactorQuantity, LevelUnit, Detector } from '@/emc/kinds';
import type { UncertaintyStep } from '@/emc/types';

/** Shapes of the JSON columns. They are written once and never migrated, so fields are only ever added. */

export type TokenScope = 'read' | 'upload';

/** One item along a signal path, from the sample to the receiver. Tables may differ by polarisation. */
export interface StoredPathItem {
  equipmentId: string;
  role: string;
  /** Names the term in an addition, e.g. `antenna factor`; null for an item that adds nothing, such as the receiver. */
  term: string | null;
  quantity: FactorQuantity | null;
  tables: { horizontal: string | null; vertical: string | null; any: string | null };
  /** Where it is in the path, in a path split by frequency; absent or null is an open end. */
  fromHz?: number | null;
  toHz?: number | null;
}

export interface StoredUncertainty {
  prescan: UncertaintyStep[];
  final: UncertaintyStep[];
}

/** One contribution to an uncertainty budget, as `Contribution` of the core. */
export interface StoredContribution {
  name: string;
  valueDb: number;
  distribution: { shape: 'normal'; k: number } | { shape: 'rectangular' | 'triangular' | 'U-shaped' };
  sensitivity: number;
  source: string;
  degreesOfFreedom: number | null;
}

export interface StoredBudgetRange {
  startHz: number;
  stopHz: number;
  contributions: StoredContribution[];
}

/** What the steps of an uncertainty were computed from. */
export interface StoredBudget {
  prescan: StoredBudgetRange[];
  final: StoredBudgetRange[];
}

/** How the file was read when it was kept: enough to read it again to the same numbers. */
export interface StoredReading {
  frequencyUnit: 'Hz' | 'kHz' | 'MHz' | 'GHz';
  centreHz: number | null;
  alreadyCorrected: string[];
  traces: { index: number; name: string; unit: LevelUnit; detector: Detector; rbwHz: number | null }[];
  remarks: string[];
  /** As the file states them; a video filter narrower than the RBW averages. */
  vbwHz?: number | null;
  rbwShape?: '6 dB' | '3 dB' | null;
}

/** What was said of a file of one shape when it was kept; nothing of it depends on the file's values. */
export interface StoredShapeAnswers {
  port: 'enclosure' | 'ac-mains' | 'wired-network';
  pathId: string | null;
  limitSetId: string;
  distanceM: number | null;
  heightSwept: boolean;
  valuesHold: 'receiver-input' | 'field';
  alreadyCorrected: string[];
  frequencyUnit: 'Hz' | 'kHz' | 'MHz' | 'GHz';
  traces: { index: number; unit: LevelUnit; detector: Detector; rbwHz: number | null }[];
}

/** Where a file that ends or breaks early was cut, kept on purpose: everything before that line was read. */
export interface StoredPartial {
  /** Line of the file that is not whole. */
  line: number;
  /** What was found there and what was expected, as the refusal said it. */
  message: string;
  /** The last frequency read, in the order of the file. */
  readToHz: number;
}

/** The revisions an evaluation used, by public id. */
export interface StoredInputs {
  pathRevision: string | null;
  factorTables: { term: string; table: string; applied: boolean }[];
  /** Absent from what was written before it was named; its lines say the same. */
  limitSet?: string;
  limitLines: string[];
  uncertaintyOf: string | null;
}
