import type { Detector, LevelUnit } from '@/emc/kinds';

/** What was read off a file, before anybody has confirmed it. Plain JSON: it is stored and answered as it is. */
export interface Recognition {
  kind: 'sweep' | 'factor-table' | 'refused';
  /** Set when refused: where, what was found, what was expected. */
  refusal: { line: number | null; found: string; expected: string; message: string } | null;
  /** Where a row is not whole: the lines around it as they stand, and what is missing in it. */
  broken: {
    /** Three lines before it, itself, and two after it; null past the end of the file. Cut at 200 characters. */
    lines: { line: number; text: string | null }[];
    /** In words, such as `average is missing`, and after how many characters of its line it belongs. */
    missing: string;
    after: number;
  } | null;
  /** What can be read before the broken row and kept as partial on purpose; null when there is nothing to keep. */
  partial: {
    /** The line that is not whole. */
    line: number;
    points: number;
    /** The last frequency read, in the order of the file. */
    readToHz: number;
    /** Where the file says that the sweep ends. */
    declaredStopHz: number | null;
    declaredPoints: number | null;
  } | null;
  /** Signature of the layout, without any of its values: files of one export have one. Null where there is no table. */
  shape: string | null;
  encoding: string;
  lineEnds: string;
  delimiter: ',' | ';' | 'tab' | 'space' | string;
  decimalMark: '.' | ',';
  thousandsMark: string | null;
  layout: 'pairs' | 'hop-rows' | 'time-rows';
  preambleLines: number;
  /** 1-based line of the column headings, null when there are none. */
  headerLine: number | null;
  /** 1-based lines of the first and last data row. */
  firstDataLine: number;
  lastDataLine: number;
  columns: RecognisedColumn[];
  frequency: {
    column: number | null;
    unit: 'Hz' | 'kHz' | 'MHz' | 'GHz' | null;
    unitEvidence: string | null;
    proposedUnit: 'Hz' | 'kHz' | 'MHz' | 'GHz';
    /** Values are offsets from a centre that the file does not hold. */
    offset: boolean;
    firstHz: number;
    lastHz: number;
    points: number;
    ascending: boolean;
    duplicates: number;
    /** Median distance between neighbours, and whether all equal it within 1e-6 of it. */
    stepHz: number;
    evenStep: boolean;
  };
  traces: RecognisedTrace[];
  sweeps: { name: string; startedAt: string | null }[];
  settings: RecognisedSettings;
  /** Corrections the file says are already in its values, e.g. `preamplifier`, `antenna factor`, `external attenuation 10 dB`. */
  correctedFor: { what: string; evidence: string; line: number }[];
  /** What the file does not say and a person must answer; `key` is also the name of the answer. */
  questions: Question[];
  /** Things that are worth a look but stop nothing: a declared count that differs, joined pieces, a constant column. */
  remarks: { text: string; line: number | null }[];
  /** Up to 12 lines for the preview: first ones, heading, first rows, last row. Text is cut at 200 characters. */
  preview: { line: number; text: string; role: 'preamble' | 'heading' | 'row'; cells: string[] | null }[];
}

export interface RecognisedColumn {
  index: number;
  heading: string | null;
  role: 'frequency' | 'level' | 'blank' | 'time' | 'phase' | 'other';
  evidence: string;
}

export interface RecognisedTrace {
  index: number;
  /** 0-based column in the file; for row layouts the column of the first level. */
  column: number;
  name: string;
  unit: LevelUnit | null;
  unitEvidence: string | null;
  /** Null when neither stated nor provable. */
  detector: Detector | null;
  detectorAsWritten: string | null;
  mode: string | null;
  /** Unused by the receiver: constant filler or empty. Not offered as a measurement. */
  blank: boolean;
  linear: boolean;
  first: number;
  last: number;
  min: number;
  minAtHz: number;
  max: number;
  maxAtHz: number;
}

export interface RecognisedSettings {
  rbwHz: number | null;
  rbwShape: '6 dB' | '3 dB' | null;
  vbwHz: number | null;
  vbwEnabled: boolean | null;
  sweepTimeS: number | null;
  dwellTimeS: number | null;
  attenuationDb: number | null;
  referenceLevel: number | null;
  preamplifier: 'on' | 'off' | null;
  startHz: number | null;
  stopHz: number | null;
  declaredPoints: number | null;
}

export interface Question {
  key:
    | 'frequencyUnit'
    | 'levelUnit'
    | 'centreHz'
    | 'detector'
    | 'rbwHz'
    | 'alreadyCorrected'
    | 'sweepIndex'
    | 'lossOrGain';
  text: string;
  proposal: string | null;
  traceIndex: number | null;
}

/** A person's answers. Anything the file states may be overridden too; the record then says so. */
export interface Answers {
  frequencyUnit?: 'Hz' | 'kHz' | 'MHz' | 'GHz';
  centreHz?: number;
  sweepIndex?: number;
  /** Read a refused file up to its broken row, on purpose. */
  partial?: boolean;
  traces?: { index: number; use: boolean; unit?: LevelUnit; detector?: Detector; name?: string }[];
}

export interface ReadTrace {
  index: number;
  name: string;
  unit: LevelUnit;
  detector: Detector;
  /** File order, nothing sorted, nothing merged. */
  values: Float64Array;
}

export interface ReadSweep {
  frequencyHz: Float64Array;
  traces: ReadTrace[];
}
