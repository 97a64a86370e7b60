import { readSync } from 'node:fs';
import { parentPort } from 'node:worker_threads';
import { runThrough } from '@/ingest/bytes';
import { ScannedFile } from '@/ingest/scannedFile';
import { unpackFile } from '@/models/filePacking';
import { taskSteps, type ImportTask, type ResultOf } from './importTasks';

/* What runs on a worker's thread; importWorkers starts it and hands it one task at a time. */

/** Where a worker takes a file from: an open file of this process, bytes, or the parts it is stored in. */
export type FileSource = { fd: number; bytes: number } | { whole: Uint8Array } | { parts: Uint8Array[]; bytes: number };

export interface ToWorker {
  task: ImportTask;
  /** Of the file; null where the task needs none. */
  sha256: string | null;
  /** Null where the worker holds the file already, or the task needs none. */
  source: FileSource | null;
}

export type FromWorker =
  | { result: ResultOf<ImportTask> }
  /** `message` is for the log; what a person may be told is part of a result. */
  | { failure: string };

/** The file of the last task: who uploads one previews it and keeps it next. */
let held: { sha256: string; file: ScannedFile } | null = null;

async function load(source: FileSource): Promise<Uint8Array> {
  if ('whole' in source) return source.whole;
  if ('parts' in source) {
    const whole = await unpackFile(source.parts);
    if (whole.length !== source.bytes) throw new Error('The stored file is not whole');
    return whole;
  }
  const whole = new Uint8Array(source.bytes);
  for (let at = 0; at < whole.length;) {
    const read = readSync(source.fd, whole, at, whole.length - at, at);
    if (read === 0) throw new Error('The spooled file is shorter than it was');
    at += read;
  }
  return whole;
}

async function fileFor({ sha256, source }: ToWorker): Promise<ScannedFile | null> {
  if (sha256 === null) return null;
  if (source === null) {
    if (held?.sha256 !== sha256) throw new Error('The worker does not hold this file');
    return held.file;
  }
  held = null;
  held = { sha256, file: new ScannedFile(await load(source)) };
  return held.file;
}

/** The memory of what is handed over, so that it moves instead of being copied. */
function buffersOf(value: unknown, found: ArrayBuffer[] = []): ArrayBuffer[] {
  if (ArrayBuffer.isView(value)) {
    if (value.buffer instanceof ArrayBuffer && value.byteLength === value.buffer.byteLength) found.push(value.buffer);
  } else if (Array.isArray(value)) for (const one of value) buffersOf(one, found);
  else if (value !== null && typeof value === 'object') for (const one of Object.values(value)) buffersOf(one, found);
  return found;
}

async function work(message: ToWorker): Promise<FromWorker> {
  try {
    return { result: runThrough(taskSteps(await fileFor(message), message.task)) };
  } catch (error) {
    return { failure: error instanceof Error ? (error.stack ?? error.message) : String(error) };
  }
}

parentPort?.on('message', async (message: ToWorker) => {
  const answer = await work(message);
  parentPort!.postMessage(answer, [...new Set(buffersOf(answer))]);
});
