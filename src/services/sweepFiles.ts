import { createHash } from 'node:crypto';
import { authorise, type Actor } from '@/auth/actor';
import { Invalid, NotFound } from '@/errors';
import { proposeFromName } from '@/ingest/proposals';
import type { Recognition } from '@/ingest/types';
import { writeUploadParts } from '@/models/blobs';
import { newPublicId } from '@/models/publicId';
import { Sweep } from '@/models/sweep';
import { SweepFile } from '@/models/sweepFile';
import { currentTransaction, unitOfWork } from '@/models/unitOfWork';
import { Upload } from '@/models/upload';
import type { RecognitionView, SweepFileView } from '@/schemas/sweepFile';
import { proposedByShape } from './fileShapes';
import { letOldestGo } from './importLimits';
import { isSmall, runApart, runHere } from './importWorkers';
import { onUpload } from './uploadTasks';

const HELD_MS = 24 * 3600 * 1000;
/** Parts written in one transaction: a few megabytes at most. */
const PARTS_AT_ONCE = 8;

/** A file as it was received: in memory, or in a spool that only this process can open. */
export interface SweepFileToHold {
  name: string;
  /** Hex, of the bytes. */
  sha256: string;
  source: { whole: Uint8Array } | { fd: number; bytes: number };
}

/**
 * Recognises a file and holds it for a day; a refused file is held too, to be shown. Its bytes are written in several
 * small transactions: until `showSweepFile` has answered its id nobody knows it, and one that never does expires.
 */
export async function holdSweepFile(actor: Actor | null, file: SweepFileToHold): Promise<Upload> {
  authorise(actor, 'sweep-file.create');
  const { name, sha256, source } = file;
  const bytes = 'whole' in source ? source.whole.length : source.bytes;
  const task = { kind: 'recognise' as const, name, sweepIndex: null, store: true };
  const { recognition, parts } =
    'whole' in source && isSmall(bytes)
      ? await runHere(source.whole, task)
      : await runApart(actor.userId, task, sha256, async () => source);
  const upload = await unitOfWork(async () => {
    await letOldestGo(actor.userId);
    return Upload.create({
      publicId: newPublicId(),
      sha256,
      name,
      bytes,
      recognition: recognition as unknown as Record<string, unknown>,
      userId: actor.userId,
      expiresAt: new Date(Date.now() + HELD_MS),
    });
  });
  for (let seq = 0; seq < parts.length; seq += PARTS_AT_ONCE) {
    await unitOfWork(() => writeUploadParts(upload.id, parts.slice(seq, seq + PARTS_AT_ONCE), seq));
  }
  return upload;
}

/** What was recognised in a file that was just held. */
export async function showSweepFile(actor: Actor | null, upload: Upload): Promise<SweepFileView> {
  authorise(actor, 'sweep-file.create');
  return unitOfWork(() => view(upload));
}

/** A held file that nobody was told of is let go at once. */
export async function dropSweepFile(upload: Upload): Promise<void> {
  await unitOfWork(() => Upload.destroy({ where: { id: upload.id } }));
}

/** Holds and shows a file that is in memory. */
export async function createSweepFile(
  actor: Actor | null,
  { name, bytes }: { name: string; bytes: Uint8Array },
): Promise<SweepFileView> {
  const sha256 = createHash('sha256').update(bytes).digest('hex');
  return showSweepFile(actor, await holdSweepFile(actor, { name, sha256, source: { whole: bytes } }));
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
  const task = { kind: 'recognise' as const, name: upload.name, sweepIndex: sweep, store: false };
  const { recognition } = await onUpload(actor, upload, task);
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
