import Papa from 'papaparse';
import { runThrough } from '@/ingest/bytes';
import { recogniseSteps } from '@/ingest/recognise';
import { ScannedFile } from '@/ingest/scannedFile';
import { unitOfWork } from '@/models/unitOfWork';
import { taskSteps, type JudgedFile, type JudgeTask } from '@/services/importTasks';
import { gather } from '@/services/judgeFile';
import { judgingOf } from '@/services/judging';
import type { Lab } from './lab';
import { rounded, say, timed } from './measure';

/**
 * Parsing and evaluating beside papaparse alone and beside reading the bytes, in this process on one thread, as a worker
 * does it. A worker scans a file once: recognising it leaves what reading it needs.
 */
export async function benchCompute({ choice }: Lab, text: string, points: number, rounds: number): Promise<void> {
  const bytes = new TextEncoder().encode(text);
  const recognition = runThrough(recogniseSteps(bytes, 'bench.csv'));
  const { terms, lines, path } = await unitOfWork(() => gather(recognition, choice, new Date()));
  const task: JudgeTask = {
    kind: 'judge',
    recognition,
    answers: { frequencyUnit: 'Hz', sweepIndex: 0 },
    traces: choice.traces,
    judging: judgingOf({ ...choice, revision: path!.revision, terms, lines, rule: 'guarded-by-u' }),
    store: false,
  };
  const held = new ScannedFile(bytes);
  const reading = await timed(() => bytes.reduce((sum, byte) => sum ^ byte, 0), rounds);
  const papaparse = await timed(() => Papa.parse(text), rounds);
  const papaparseTyped = await timed(() => Papa.parse(text, { dynamicTyping: true }), rounds);
  const recognising = await timed(() => runThrough(recogniseSteps(new ScannedFile(bytes), 'bench.csv')), rounds);
  const afresh = await timed(() => runThrough(taskSteps(new ScannedFile(bytes), task)), rounds);
  const scanned = await timed(() => runThrough(taskSteps(held, task)), rounds);
  const stored = await timed(() => runThrough(taskSteps(held, { ...task, store: true })), rounds);
  const judged = runThrough(taskSteps(held, { ...task, store: true })) as JudgedFile;
  const packed = runThrough(taskSteps(held, { kind: 'recognise', name: '', sweepIndex: null, store: true }));
  const original = (packed as { parts: Uint8Array[] }).parts.reduce((sum, part) => sum + part.length, 0);
  const traces = judged.segments.reduce(
    (sum, { axis, traces: own }) =>
      sum + (axis?.bytes.length ?? 16) + own.reduce((all, { levels }) => all + levels.bytes.length, 0),
    0,
  );
  say({
    bench: 'parse and evaluate',
    points,
    traces: 2,
    bytes: bytes.length,
    candidates: judged.evaluation.candidates.length,
    readBytes: reading,
    papaparse,
    papaparseTyped,
    recognise: recognising,
    parseAndEvaluate: afresh,
    evaluateWhatWasScanned: scanned,
    evaluateAndPack: stored,
    timesPapaparse: rounded(afresh.bestCpuMs / papaparse.bestCpuMs),
    timesPapaparseTyped: rounded(afresh.bestCpuMs / papaparseTyped.bestCpuMs),
    uploadAndKeepTimesPapaparse: rounded((recognising.bestCpuMs + scanned.bestCpuMs) / papaparse.bestCpuMs),
    timesReadBytes: rounded(afresh.bestCpuMs / reading.bestCpuMs),
    storedBytesPerPoint: rounded((original + traces) / points),
    ofThem: { original: rounded(original / points), traces: rounded(traces / points) },
  });
}
