import { AsyncResource } from 'node:async_hooks';
import { availableParallelism } from 'node:os';
import { Worker } from 'node:worker_threads';
import type { LikelySources } from '@/emc/likelySources';
import type { Evaluation, EvaluationInput } from '@/emc/types';
import { Throttled } from '@/errors';
import { ScannedFile } from '@/ingest/scannedFile';
import { FairTurns } from './fairTurns';
import { taskSteps, type ImportTask, type ResultOf, type SourcesTask } from './importTasks';
import type { FileSource, FromWorker, ToWorker } from './importWorker';
import { inTurns } from './inTurns';

/**
 * One worker more than the machine has cores, at most four: the third of a small machine stays free for whoever else
 * sends a file while one person has two under way.
 */
export const WORKERS = Math.min(4, Math.max(2, availableParallelism() + 1));
const MOST_WAITING = 40;
const MOST_WAITING_PER_PERSON = 8;
/** Below this a file is done in turns on the main thread before a worker would have been given it. */
export const INLINE_BYTES = 512 * 1024;
/** A worker without work ends, and with it the file it holds. */
const IDLE_MS = 60_000;

interface Waiting {
  task: ImportTask;
  sha256: string | null;
  load: () => Promise<FileSource>;
  resolve: (result: ResultOf<ImportTask>) => void;
  reject: (error: Error) => void;
}

interface Slot {
  worker: Worker;
  /** SHA-256 of the file it worked on last. */
  holds: string | null;
  busy: { person: number; waiting: Waiting } | null;
  idle: NodeJS.Timeout | null;
}

interface Pool {
  slots: Slot[];
  turns: FairTurns<Waiting>;
}

// One pool per process: the server's bundles each hold their own copy of this module.
const holder = globalThis as typeof globalThis & { stillfieldImportPool?: Pool };

function pool(): Pool {
  holder.stillfieldImportPool ??= { slots: [], turns: new FairTurns(WORKERS - 1) };
  return holder.stillfieldImportPool;
}

/**
 * The worker is started from text, as the password workers are, because a path beside this module does not survive
 * bundling. tsx reads the sources from the directory the process was started in, as it does for the server itself.
 */
const CODE = `
const { workerData } = require('node:worker_threads');
const load = require('node:module').createRequire(workerData + '/package.json');
load('tsx/cjs');
load(workerData + '/src/services/importWorker.ts');
`;

/** A file small enough is worked on here, in turns; the rest on a worker's thread. */
export function isSmall(bytes: number): boolean {
  return bytes <= INLINE_BYTES;
}

export async function runHere<T extends ImportTask>(bytes: Uint8Array | null, task: T): Promise<ResultOf<T>> {
  return (await inTurns(taskSteps(bytes && new ScannedFile(bytes), task))) as ResultOf<T>;
}

/** Points of all traces that are judged on the main thread, in turns. */
const INLINE_POINTS = 65_536;

/** Judges points that are at hand: a few here, many on a worker's thread, which is given a copy. @throws {Throttled} */
export async function evaluateApart(person: number, input: EvaluationInput): Promise<Evaluation> {
  const task = { kind: 'evaluate' as const, input };
  const points = input.traces.reduce((sum, { reading }) => sum + reading.length, 0);
  if (points <= INLINE_POINTS) return runHere(null, task);
  return runApart(person, task, null, () => Promise.reject(new Error('This task has no file')));
}

/** Emissions times the highest frequency over the widest bandwidth; what is below takes a few milliseconds. */
const INLINE_SEARCH = 30_000;

/** Searches for likely sources: a small search here, a long one on a worker's thread. @throws {Throttled} */
export async function sourcesApart(person: number, input: Omit<SourcesTask, 'kind'>): Promise<LikelySources> {
  const task = { kind: 'sources' as const, ...input };
  const { emissions } = input;
  const highestHz = emissions.reduce((most, { frequencyHz }) => Math.max(most, frequencyHz), 0);
  const widestHz = emissions.reduce((most, { bandwidthHz }) => Math.max(most, bandwidthHz), 0);
  if (emissions.length === 0 || (emissions.length * highestHz) / widestHz <= INLINE_SEARCH) return runHere(null, task);
  return runApart(person, task, null, () => Promise.reject(new Error('This task has no file')));
}

/**
 * Runs a task on a worker's thread. People take turns; see FairTurns.
 * @param sha256 of the file; a worker that holds it needs no bytes. Null when the task needs none
 * @param load called when it is this task's turn and no free worker holds the file
 * @throws {Throttled} when too much waits already
 */
export function runApart<T extends ImportTask>(
  person: number,
  task: T,
  sha256: string | null,
  load: () => Promise<FileSource>,
): Promise<ResultOf<T>> {
  const { turns } = pool();
  if (turns.waiting >= MOST_WAITING || turns.waitingOf(person) >= MOST_WAITING_PER_PERSON) {
    throw new Throttled(10, 'Many large files are being read at this moment. Try again in a few seconds.');
  }
  return new Promise((resolve, reject) => {
    // Bound: it may be called while another request's task ends, and has to find this one's unit of work.
    const mine = AsyncResource.bind(load);
    turns.add(person, { task, sha256, load: mine, resolve: resolve as Waiting['resolve'], reject });
    next();
  });
}

function next(): void {
  const { slots, turns } = pool();
  for (;;) {
    const idle = slots.filter(({ busy }) => busy === null);
    if (idle.length === 0 && slots.length >= WORKERS) return;
    const turn = turns.next();
    if (turn === null) return;
    const { person, item: waiting } = turn;
    const holding = waiting.sha256 === null ? undefined : idle.find(({ holds }) => holds === waiting.sha256);
    const empty = idle.find(({ holds }) => holds === null);
    const fresh = empty ?? (slots.length < WORKERS ? start() : idle[0]!);
    const slot = holding ?? fresh;
    if (slot.idle) clearTimeout(slot.idle);
    slot.busy = { person, waiting };
    slot.worker.ref();
    void begin(slot, waiting, holding !== undefined);
  }
}

async function begin(slot: Slot, waiting: Waiting, holds: boolean): Promise<void> {
  try {
    const source = holds || waiting.sha256 === null ? null : await waiting.load();
    if (source !== null) slot.holds = null;
    const message: ToWorker = { task: waiting.task, sha256: waiting.sha256, source };
    const moved = source && 'parts' in source ? source.parts.map(({ buffer }) => buffer as ArrayBuffer) : [];
    slot.worker.postMessage(message, moved);
  } catch (error) {
    finish(slot, () => waiting.reject(error as Error));
  }
}

function finish(slot: Slot, settle: () => void): void {
  const { person } = slot.busy!;
  slot.busy = null;
  pool().turns.done(person);
  // An idle worker does not keep a finished command alive.
  slot.worker.unref();
  slot.idle = setTimeout(() => void slot.worker.terminate(), IDLE_MS).unref();
  settle();
  next();
}

function start(): Slot {
  const { TMPDIR, PATH } = process.env;
  const given = { ...(TMPDIR && { TMPDIR }), ...(PATH && { PATH }) };
  // None of the parent's flags, and none of its secrets: a task brings all it needs.
  const worker = new Worker(CODE, { eval: true, workerData: process.cwd(), execArgv: [], env: given });
  const slot: Slot = { worker, holds: null, busy: null, idle: null };
  pool().slots.push(slot);
  worker.on('message', (answer: FromWorker) => {
    const { waiting } = slot.busy!;
    if ('failure' in answer) {
      finish(slot, () => waiting.reject(new Error(`A file could not be worked on: ${answer.failure}`)));
      return;
    }
    if (waiting.sha256 !== null) slot.holds = waiting.sha256;
    finish(slot, () => waiting.resolve(answer.result));
  });
  const drop = (error: Error) => {
    const { slots, turns } = pool();
    const at = slots.indexOf(slot);
    if (at < 0) return;
    slots.splice(at, 1);
    if (slot.idle) clearTimeout(slot.idle);
    if (slot.busy) {
      turns.done(slot.busy.person);
      slot.busy.waiting.reject(error);
      slot.busy = null;
    }
    next();
  };
  worker.on('error', drop);
  worker.on('exit', (code) => drop(new Error(`an import worker ended with code ${code}`)));
  return slot;
}

/** Ends the workers; tests and short-lived commands call it last. */
export async function closeImportWorkers(): Promise<void> {
  await Promise.all(pool().slots.map(({ worker }) => worker.terminate()));
}
