import { Op } from 'sequelize';
import type { z } from 'zod';
import { authorise, type Actor } from '@/auth/actor';
import { Conflict, Invalid } from '@/errors';
import { keepUploadParts } from '@/models/blobs';
import { ModificationState } from '@/models/modificationState';
import { newPublicId } from '@/models/publicId';
import type { StoredPartial } from '@/models/stored';
import { Sweep } from '@/models/sweep';
import { SweepFile } from '@/models/sweepFile';
import type { Segment } from '@/models/traceSegments';
import { writeSegments } from '@/models/traceStore';
import { unitOfWork } from '@/models/unitOfWork';
import type { Upload } from '@/models/upload';
import type { keepSweep } from '@/schemas/sweep';
import { inImportTurn } from './importLimits';
import type { JudgedFile } from './importTasks';
import { gather, judge, type Judged } from './judgeFile';
import { remarksOn } from './runRemarks';
import { findSample, stateLabel } from './samples';
import { findUpload, recognitionOf } from './sweepFiles';

type Body = z.infer<typeof keepSweep>;

/** A bench PC's clock may run a little ahead. */
const CLOCK_SLACK_MS = 5 * 60_000;
/** What is written in one transaction: two to four megabytes at most. */
const FILE_PARTS_AT_ONCE = 8;
const SEGMENTS_AT_ONCE = 8;
const ORPHANED_MS = 3_600_000;

/** A run whose bytes are written and that nothing shows yet. */
export interface PendingSweep {
  id: number;
  fileId: number;
  state: { id: number; jobId: number; jobPublicId: string };
  upload: Upload;
  judged: Judged;
  at: Date;
}

/**
 * Reads and judges the file, and writes its bytes and points in several small transactions, under a run without
 * evaluation that no query finds. No lock is held meanwhile. What is not published is dropped, at the latest by
 * housekeeping.
 */
export async function stageSweep(actor: Actor | null, body: Body, at = new Date()): Promise<PendingSweep> {
  authorise(actor, 'sweep.keep');
  return inImportTurn(actor, async () => {
    const { state, upload, gathered } = await unitOfWork(async () => {
      const state = await findState(actor, body.stateId);
      refusePlanned(state.row);
      const upload = await findUpload(body.fileId);
      const measuredAt = body.measuredAt === null ? at : new Date(body.measuredAt);
      if (measuredAt.getTime() > at.getTime() + CLOCK_SLACK_MS) {
        throw new Invalid([{ pointer: '/measuredAt', message: 'lies in the future' }]);
      }
      return { state, upload, gathered: await gather(recognitionOf(upload), body, measuredAt) };
    });
    const judged = await judge(actor, upload, body, gathered, { store: true, rule: state.rule });
    const { id, fileId } = await unitOfWork(() => writeRun(actor, body, { state: state.row, upload, judged, at }));
    const { jobId, jobPublicId } = state;
    const pending = { id, fileId, state: { id: state.row.id, jobId, jobPublicId }, upload, judged, at };
    try {
      await writeBytes(pending, judged.segments);
    } catch (error) {
      await dropSweep(pending).catch(() => undefined);
      throw error;
    }
    return pending;
  });
}

async function writeBytes({ id, fileId, upload }: PendingSweep, segments: readonly Segment[]): Promise<void> {
  for (let seq = 0, copied = FILE_PARTS_AT_ONCE; copied === FILE_PARTS_AT_ONCE; seq += copied) {
    copied = await unitOfWork(() => keepUploadParts(upload.id, fileId, seq, FILE_PARTS_AT_ONCE));
    // Housekeeping may have taken the upload away meanwhile.
    if (copied < FILE_PARTS_AT_ONCE) await unitOfWork(() => findUpload(upload.publicId));
  }
  for (let seq = 0; seq < segments.length; seq += SEGMENTS_AT_ONCE) {
    await unitOfWork(() => writeSegments(id, segments.slice(seq, seq + SEGMENTS_AT_ONCE), seq));
  }
}

/** Takes a run that was not published out again, with its points and its file; one that was stays. */
export async function dropSweep({ id, fileId }: Pick<PendingSweep, 'id' | 'fileId'>): Promise<void> {
  await unitOfWork(async () => {
    const gone = await Sweep.unscoped().destroy({ where: { id, evaluationId: null } });
    if (gone > 0) await SweepFile.destroy({ where: { id: fileId } });
  });
}

/**
 * Drops runs that were begun over an hour ago and never published: their process died, or could not drop them itself.
 * @returns how many
 */
export async function dropOrphans(most = 50): Promise<number> {
  const orphans = await unitOfWork(() =>
    Sweep.unscoped().findAll({
      where: { evaluationId: null, updatedAt: { [Op.lt]: new Date(Date.now() - ORPHANED_MS) } },
      attributes: ['id', 'sweepFileId'],
      limit: most,
    }),
  );
  for (const { id, sweepFileId: fileId } of orphans) await dropSweep({ id, fileId });
  return orphans.length;
}

interface Keeping {
  state: ModificationState;
  upload: Upload;
  judged: Judged & JudgedFile;
  at: Date;
}

/** The file and the run without what is large; both are pending until the run has an evaluation. */
async function writeRun(actor: Actor, body: Body, { state, upload, judged, at }: Keeping) {
  const { name, bytes, sha256, recognition } = upload;
  const file = await SweepFile.create({
    publicId: newPublicId(),
    name,
    bytes,
    sha256,
    recognition,
    userId: actor.userId,
    createdAt: at,
  });
  const { points, firstHz, lastHz, stepHz, readToHz } = judged.axis;
  const { purpose, port, line, polarisation, heightM, heightSwept, azimuthDeg, distanceM } = body;
  const { operatingMode, valuesHold, trial } = body;
  const { frequencyUnit, centreHz, traces, sweepIndex, measuredAt } = body;
  const { vbwHz = null, rbwShape = null } = judged.input.traces[0]!;
  const alreadyCorrected = body.alreadyCorrected ?? [];
  const remarks = remarksOn(upload, body);
  const publicId = newPublicId();
  const run = await Sweep.create({
    publicId,
    // replaced by its number when it is published
    number: publicId,
    stateId: state.id,
    sweepFileId: file.id,
    sweepIndex: sweepIndex ?? 0,
    purpose,
    port,
    line,
    polarisation,
    heightM,
    heightSwept,
    azimuthDeg,
    distanceM,
    operatingMode,
    trial,
    partial: body.keepPartial ? partialOf(upload, readToHz) : null,
    valuesHold,
    pathRevisionId: judged.path?.revision.id ?? null,
    limitSetId: judged.limitSet.id,
    reading: { frequencyUnit, centreHz, alreadyCorrected, traces, remarks, vbwHz, rbwShape },
    measuredAt: measuredAt === null ? null : new Date(measuredAt),
    points,
    firstHz,
    lastHz,
    stepHz,
    userId: actor.userId,
    createdAt: at,
  });
  return { id: run.id, fileId: file.id };
}

/** Where the file was cut, as its refusal said it. */
function partialOf(upload: Upload, readToHz: number): StoredPartial {
  const { refusal, partial } = recognitionOf(upload);
  const message = refusal!.message.replace(/ Export [^.]*\.$/, '');
  return { line: partial!.line, message, readToHz };
}

async function findState(actor: Actor, publicId: string) {
  const state = await ModificationState.findOne({ where: { publicId }, include: ['sample'] });
  if (!state) throw new Invalid([{ pointer: '/stateId', message: 'is not a modification state of this lab' }]);
  const { sample } = state as ModificationState & { sample: { publicId: string } };
  const { job } = await findSample(actor, sample.publicId);
  if (job.state !== 'open') throw new Conflict(`Job ${job.number} is ${job.state}. Reopen it first.`);
  return { row: state, jobId: job.id, jobPublicId: job.publicId, rule: job.decisionRule };
}

export function refusePlanned({ planned, position }: ModificationState): void {
  if (planned) throw new Conflict(`${stateLabel(position)} is still planned. Mark it as fitted before measuring it.`);
}
