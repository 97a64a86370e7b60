import type {
  DecisionRule,
  Detector,
  FactorQuantity,
  LevelUnit,
  LineDetector,
  LineUnit,
  Port,
  Purpose,
  Verdict,
} from './kinds';

/** One revision of one table of corrections. Rows ascend in frequency; interpolation is linear in dB over log f. */
export interface FactorTable {
  id: string;
  /** e.g. `ANT-02 vertical, table 4` */
  name: string;
  quantity: FactorQuantity;
  frequencyHz: readonly number[];
  /** In the quantity's unit (`factorUnitOf`); a loss, a gain and a voltage division factor are positive figures. */
  valueDb: readonly number[];
}

/** A table in the signal path. `applied: false` means that the reading already holds it, and why. */
export interface PathTerm {
  id: string;
  /** e.g. `antenna factor`, `cable loss`, `preamplifier gain` */
  name: string;
  table: FactorTable;
  applied: boolean;
  notAppliedBecause?: string;
  /** Where its item is in the path, both ends included; an end that is absent or null is open. */
  fromHz?: number | null;
  toHz?: number | null;
}

export interface LimitSegment {
  startHz: number;
  stopHz: number;
  startLimit: number;
  stopLimit: number;
  /** How the limit runs between its ends; a flat segment is either. */
  over: 'log-frequency' | 'linear-frequency';
}

export interface LimitLine {
  id: string;
  /** e.g. `CISPR 32:2015 class B, enclosure, 3 m, quasi-peak` */
  name: string;
  detector: LineDetector;
  bandwidthHz: number;
  unit: LineUnit;
  /** null for conducted lines */
  distanceM: number | null;
  segments: readonly LimitSegment[];
}

/** Expanded uncertainty as steps over frequency; outside every step it is unknown (null), never extrapolated. */
export interface UncertaintyStep {
  startHz: number;
  stopHz: number;
  expandedDb: number;
}

export interface Trace {
  /** Position in the run; candidates and windows refer to it. */
  index: number;
  name: string;
  detector: Detector;
  rbwHz: number | null;
  /** Video bandwidth where it is stated. */
  vbwHz?: number | null;
  /** How far down the RBW is measured; not stated counts as 6 dB, which is how CISPR 16-1-1 states its bandwidths. */
  rbwShape?: '6 dB' | '3 dB' | null;
  unit: LevelUnit;
  frequencyHz: Float64Array;
  /** As read, rounded once to Float32. */
  reading: Float32Array;
}

export interface EvaluationInput {
  traces: readonly Trace[];
  terms: readonly PathTerm[];
  lines: readonly LimitLine[];
  uncertainty: { prescan: readonly UncertaintyStep[]; final: readonly UncertaintyStep[] };
  purpose: Purpose;
  port: Port;
  rule: DecisionRule;
  /** Ucispr over frequency, for the rule that compares U with it. */
  ucispr?: readonly UncertaintyStep[];
  /** Read from a file that breaks off, kept so on purpose: nothing of it is under, and it covers nothing. */
  partial?: boolean;
}

export interface Candidate {
  /** 1 is the worst. */
  rank: number;
  kind: 'peak' | 'floor';
  traceIndex: number;
  lineId: string;
  frequencyHz: number;
  /** For `floor` the stretch it stands for; for `peak` both equal frequencyHz. */
  fromHz: number;
  toHz: number;
  reading: number;
  level: number;
  limit: number;
  marginDb: number;
  uncertaintyDb: number;
  verdict: Verdict;
  /** Why the reading cannot decide, when it cannot. */
  because: string | null;
}

export interface CoverageGap {
  lineId: string;
  fromHz: number;
  toHz: number;
  /** `partial`: levels stand there, but in a file that breaks off. */
  because: 'no-trace' | 'no-factor' | 'no-uncertainty' | 'gap' | 'partial';
}

/** One trace judged against one line. */
export interface JudgedPair {
  traceIndex: number;
  lineId: string;
  points: number;
  worstMarginDb: number | null;
  worstFrequencyHz: number | null;
}

/** Extremes of one trace per log-frequency column, computed from points. Only columns that hold a point appear. */
export interface Columns {
  frequencyHz: Float64Array;
  levelMin: Float32Array;
  levelMax: Float32Array;
  /** Margin to the line this trace hangs from; NaN is not used: columns without a limit have `hasMargin` 0. */
  marginMin: Float32Array;
  marginMax: Float32Array;
  hasMargin: Uint8Array;
}

export interface Evaluation {
  engine: string;
  /** Worst first by verdict, then by margin. */
  verdict: Verdict;
  /** Candidates by verdict; every gap counts as not covered. */
  counts: Record<Verdict, number>;
  pairs: JudgedPair[];
  candidates: Candidate[];
  gaps: CoverageGap[];
  /** Whole-range layer per trace, at LAYER_COLUMNS columns. */
  layers: Columns[];
}

export interface WorkingTerm {
  sign: '' | '+' | '−';
  figure: number;
  unit: string;
  name: string;
  /** Source lines are added by the service, which knows equipment and calibrations. */
  termId: string | null;
  applied: boolean;
  notAppliedBecause: string | null;
  /** The rows between which a factor was interpolated; equal when a row was hit. */
  rows: { lowerHz: number; lowerDb: number; upperHz: number; upperDb: number } | null;
}

export interface Working {
  traceIndex: number;
  lineId: string | null;
  frequencyHz: number;
  terms: WorkingTerm[];
  level: number | null;
  levelUnit: LineUnit | null;
  limit: number | null;
  marginDb: number | null;
  uncertaintyDb: number | null;
  /** What the decision rule adds to the level before it is compared; null where it has no say here. */
  addedDb: number | null;
  verdict: Verdict;
  because: string | null;
}
