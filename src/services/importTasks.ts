import type { DeclaredClock, SeenEmission } from '@/emc/clockHarmonics';
import { evaluate } from '@/emc/evaluate';
import { likelySources, type LikelySources } from '@/emc/likelySources';
import type { TraceHead } from '@/emc/segment';
import type { SwitchingConverter } from '@/emc/sidebands';
import type { Evaluation, EvaluationInput, Trace } from '@/emc/types';
import { IngestError } from '@/ingest/ingestError';
import { readSweepSteps } from '@/ingest/read';
import { recogniseSteps } from '@/ingest/recognise';
import type { ScannedFile } from '@/ingest/scannedFile';
import type { Answers, Recognition } from '@/ingest/types';
import { packFile } from '@/models/filePacking';
import { segmentsOf, type Segment } from '@/models/traceSegments';

/*
 * The long computations of an import, without a query and without a clock, so that they run alike on the main thread
 * (small files, in turns) and on a worker's (large ones). What they are given and what they answer can be cloned.
 */

export interface RecogniseTask {
  kind: 'recognise';
  name: string;
  /** One of several sweeps, to be described by its own preamble; null describes the file. */
  sweepIndex: number | null;
  /** Whether the file is to be stored. */
  store: boolean;
}
export interface Recognised {
  recognition: Recognition;
  /** The file as it is stored; empty unless it is to be. */
  parts: Uint8Array<ArrayBuffer>[];
}

/** All the core needs apart from the points. */
export type Judging = Omit<EvaluationInput, 'traces'>;

export interface JudgeTask {
  kind: 'judge';
  recognition: Recognition;
  answers: Answers;
  /** The traces to be judged; the filters they were read with are in the file. */
  traces: Omit<TraceHead, 'rbwShape' | 'vbwHz'>[];
  judging: Judging;
  /** Whether the points are to be stored: a preview has no use for segments. */
  store: boolean;
}
export interface AxisFacts {
  points: number;
  /** Lowest and highest frequency above 0 Hz. */
  firstHz: number;
  lastHz: number;
  /** The distance between neighbours when all are equal to a millionth of it, else null. */
  stepHz: number | null;
  /** The last frequency in the order of the file. */
  readToHz: number;
}
export interface JudgedFile {
  evaluation: Evaluation;
  heads: TraceHead[];
  axis: AxisFacts;
  /** Empty unless the points are to be stored. */
  segments: Segment[];
}
/** Why a file could not be judged; errors do not travel between threads with their class. */
export type Refused = { unreadable: { message: string; line: number | null; found: string; expected: string } };
export interface NoFrequency {
  noFrequency: true;
}

/** Points that are kept already, judged again. */
export interface EvaluateTask {
  kind: 'evaluate';
  input: EvaluationInput;
}

/** The search for what emissions may come from, which cannot be done in turns. */
export interface SourcesTask {
  kind: 'sources';
  emissions: SeenEmission[];
  clocks: DeclaredClock[];
  converters: SwitchingConverter[];
}

export type ImportTask = RecogniseTask | JudgeTask | EvaluateTask | SourcesTask;
export type ResultOf<T extends ImportTask> = T extends RecogniseTask
  ? Recognised
  : T extends JudgeTask
    ? JudgedFile | Refused | NoFrequency
    : T extends SourcesTask
      ? LikelySources
      : Evaluation;

/** @param file null for the task that brings its points along */
export function* taskSteps(file: ScannedFile | null, task: ImportTask): Generator<void, ResultOf<ImportTask>> {
  if (task.kind === 'evaluate') return yield* evaluate(task.input);
  if (task.kind === 'sources') return likelySources(task.emissions, task.clocks, task.converters);
  if (file === null) throw new Error('This task needs a file');
  if (task.kind === 'judge') return yield* judgeSteps(file, task);
  const recognition = yield* recogniseSteps(file, task.name, task.sweepIndex ?? undefined);
  return { recognition, parts: task.store ? yield* packFile(file.raw) : [] };
}

function* judgeSteps(
  file: ScannedFile,
  { recognition, answers, traces: chosen, judging, store }: JudgeTask,
): Generator<void, JudgedFile | Refused | NoFrequency> {
  let read;
  try {
    read = yield* readSweepSteps(file, recognition, answers);
  } catch (error) {
    if (!(error instanceof IngestError)) throw error;
    const { message, line, found, expected } = error;
    return { unreadable: { message, line, found, expected } };
  }
  const { frequencyHz } = read;
  const range = rangeOf(frequencyHz);
  if (range === null) return { noFrequency: true };
  // Of several sweeps each may state its own filters.
  const several = recognition.sweeps.length > 1;
  const own = several ? yield* recogniseSteps(file, undefined, answers.sweepIndex ?? 0) : recognition;
  const { rbwShape, vbwHz, vbwEnabled } = own.settings;
  const heads = chosen.map((trace) => ({ ...trace, rbwShape, vbwHz: vbwEnabled === false ? null : vbwHz }));
  const traces = heads.map((head): Trace => {
    const { values } = read.traces.find(({ index }) => index === head.index)!;
    // Rounded once, before anything is computed from them, so that the kept points give the same bits again.
    return { ...head, frequencyHz, reading: new Float32Array(values) };
  });
  const evaluation = yield* evaluate({ ...judging, traces });
  const levels = traces.map(({ index, reading }) => ({ index, levels: reading }));
  const segments = store ? yield* segmentsOf(frequencyHz, levels) : [];
  const points = frequencyHz.length;
  const axis = { points, ...range, stepHz: stepOf(frequencyHz), readToHz: frequencyHz[points - 1]! };
  return { evaluation, heads, axis, segments };
}

/** Lowest and highest frequency above 0 Hz; null when there is none. */
function rangeOf(frequencyHz: Float64Array): { firstHz: number; lastHz: number } | null {
  let firstHz = Infinity;
  let lastHz = 0;
  for (let i = 0; i < frequencyHz.length; i++) {
    const f = frequencyHz[i]!;
    if (f > 0 && f < firstHz) firstHz = f;
    if (f > lastHz) lastHz = f;
  }
  return lastHz > 0 ? { firstHz, lastHz } : null;
}

function stepOf(frequencyHz: Float64Array): number | null {
  const steps = frequencyHz.length - 1;
  if (steps < 1) return null;
  const step = (frequencyHz[steps]! - frequencyHz[0]!) / steps;
  for (let i = 0; i < steps; i++) {
    if (Math.abs(frequencyHz[i + 1]! - frequencyHz[i]! - step) > Math.abs(step) * 1e-6) return null;
  }
  return step;
}
