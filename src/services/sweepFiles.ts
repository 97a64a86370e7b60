import { createHash } from 'node:crypto';
import { authorise, type Actor } from '@/auth/actor';
import { Invalid, NotFound, Unreadable } from '@/errors';
import { IngestError } from '@/ingest/ingestError';
import { proposeFromName } from '@/ingest/proposals';
import { readSweepSteps } from '@/ingest/read';
import { recogniseSteps } from '@/ingest/recognise';
import type { Answers, ReadSweep, Recognition } from '@/ingest/types';
import { readUpload, writeUpload } from '@/models/blobs';
import { newPublicId } from '@/models/publicId';
import { Sweep } from '@/models/sweep';
import { SweepFile } from '@/models/sweepFile';
import { currentTransaction, unitOfWork } from '@/models/unitOfWork';
import { Upload } from '@/models/upload';
import type { RecognitionView, SweepFileView } from '@/schemas/sweepFile';
import { proposedByShape } from './fileShapes';
import { inTurns } from './inTurns';

const HELD_MS = 24 * 3600 * 1000;

/** Keeps an uploaded file for a day and answers what was recognised in it; a refused file is held too, to be shown. */
export async function createSweepFile(
  actor: Actor | null,
  file: { name: string; bytes: Uint8Array; sha256?: string },
): Promise<SweepFileView> {
  authorise(actor, 'sweep-file.create');
  const recognition = await inTurns(recogniseSteps(file.bytes, file.name));
  const { sha256 = createHash('sha256').update(file.bytes).digest('hex') } = file;
  return unitOfWork(async () => {
    const upload = await Upload.create({
      publicId: newPublicId(),
      sha256,
      name: file.name,
      bytes: file.bytes.length,
      recognition: recognition as unknown as Record<string, unknown>,
      userId: actor.userId,
      expiresAt: new Date(Date.now() + HELD_MS),
    });
    await writeUpload(upload.id, file.bytes);
    return view(upload);
  });
}

/** What was recognised; with `sweep`, the file is read again and that sweep described by its own preamble. */
export async function readSweepFile(actor: Actor | null, publicId: string, sweep?: number): Promise<SweepFileView> {
  authorise(actor, 'sweep-file.read');
  const upload = await unitOfWork(() => findUpload(publicId));
  const whole = recognitionOf(upload);
  if (sweep === undefined || whole.sweeps.length < 2) return unitOfWork(() => view(upload));
  if (sweep >= whole.sweeps.length) {
    throw new Invalid([{ pointer: '/query/sweep', message: `is not in this file; it holds ${whole.sweeps.length}` }]);
  }
  const bytes = await unitOfWork(() => readUpload(upload.id));
  const recognition = await inTurns(recogniseSteps(bytes, upload.name, sweep));
  return unitOfWork(() => view(upload, recognition));
}

/** An upload that is still held, or NotFound. Uploads belong to the lab; only its people reach this. */
export async function findUpload(publicId: string, { lock = false } = {}): Promise<Upload> {
  const row = await Upload.findOne({ where: { publicId }, ...(lock && { lock: currentTransaction().LOCK.UPDATE }) });
  if (!row || row.expiresAt.getTime() < Date.now()) throw new NotFound('uploaded file (it is held for a day)');
  return row;
}

/** What was recognised; a file recognised by an earlier build lacks what that build did not know. */
export const recognitionOf = (row: Upload | SweepFile): Recognition => ({
  ...{ broken: null, partial: null, shape: null },
  ...(row.recognition as unknown as Recognition),
});

/** Reads the whole file in turns; what the reader refuses becomes an Unreadable with its line. */
export async function readAsAnswered(
  bytes: Uint8Array,
  recognition: Recognition,
  answers: Answers,
): Promise<ReadSweep> {
  if (recognition.refusal && !answers.partial) {
    const { message, line, found, expected } = recognition.refusal;
    throw new Unreadable(message, line, found, expected);
  }
  try {
    return await inTurns(readSweepSteps(bytes, recognition, answers));
  } catch (error) {
    if (error instanceof IngestError) throw new Unreadable(error.message, error.line, error.found, error.expected);
    throw error;
  }
}

async function view(upload: Upload, recognised = recognitionOf(upload)): Promise<SweepFileView> {
  const files = await SweepFile.findAll({ where: { sha256: upload.sha256 }, attributes: ['id'], limit: 20 });
  const runs = files.length
    ? await Sweep.findAll({ where: { sweepFileId: files.map((file) => file.id) }, order: [['id', 'DESC']], limit: 20 })
    : [];
  const proposed = proposeFromName(upload.name);
  // Recognition and its zod schema are the same shape; the compiler checks it here.
  const recognition: RecognitionView = recognised;
  return {
    id: upload.publicId,
    name: upload.name,
    bytes: upload.bytes,
    sha256: upload.sha256,
    recognition,
    repeats: runs.map((run) => ({ sweepId: run.publicId, number: run.number })),
    proposals: {
      polarisation: proposed.polarisation ?? null,
      line: proposed.line ?? null,
      heightM: proposed.heightM ?? null,
      state: proposed.state ?? null,
      purpose: proposed.purpose ?? null,
    },
    asBefore: recognition.shape === null ? null : await proposedByShape(recognition.shape),
  };
}
