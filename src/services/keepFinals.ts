import { createHash } from 'node:crypto';
import { authorise, type Actor } from '@/auth/actor';
import { Retest } from '@/models/retest';
import { unitOfWork } from '@/models/unitOfWork';
import type { FinalsBody, FinalsKept } from '@/schemas/finals';
import type { KeepSweep } from '@/schemas/sweep';
import { composeFinals, type ComposedFinals } from './finals';
import { publishSweep } from './keepSweep';
import { dropSweep, stageSweep, type PendingSweep } from './stageSweep';
import { dropSweepFile, holdSweepFile } from './sweepFiles';

interface StagedFinals {
  body: KeepSweep;
  pending: PendingSweep;
}

/**
 * Composes a file of typed finals for each set of detectors, and stages each as an uploaded file is staged: held,
 * recognised, read, judged and written under a run that nothing shows yet.
 */
export async function stageFinals(actor: Actor | null, body: FinalsBody, at = new Date()): Promise<StagedFinals[]> {
  authorise(actor, 'sweep.keep');
  const { files } = await unitOfWork(() => composeFinals(actor, body, at));
  const staged: StagedFinals[] = [];
  try {
    for (const file of files) staged.push(await stageOne(actor, body, file, at));
  } catch (error) {
    await dropFinals(staged).catch(() => undefined);
    throw error;
  }
  return staged;
}

async function stageOne(
  actor: Actor,
  body: FinalsBody,
  { file, group, choice }: ComposedFinals,
  at: Date,
): Promise<StagedFinals> {
  const sha256 = createHash('sha256').update(file.bytes).digest('hex');
  const upload = await holdSweepFile(actor, { name: file.name, sha256, source: { whole: file.bytes } });
  try {
    const rows = group.finals.map(({ final }) => final);
    const keep: KeepSweep = {
      ...choice,
      fileId: upload.publicId,
      stateId: body.stateId,
      operatingMode: body.operatingMode,
      heightM: oneOf(rows.map(({ heightM }) => heightM)),
      heightSwept: body.heightSwept,
      azimuthDeg: oneOf(rows.map(({ azimuthDeg }) => azimuthDeg)),
      measuredAt: lastRead(rows, at),
      trial: null,
    };
    return { body: keep, pending: await stageSweep(actor, keep, at) };
  } finally {
    // The run has a copy of its own; the upload would count among what the person holds.
    await dropSweepFile(upload).catch(() => undefined);
  }
}

/** A run has one height and one azimuth; where its finals differ the file has each. */
function oneOf(values: readonly (number | null)[]): number | null {
  return values.every((value) => value === values[0]) ? (values[0] ?? null) : null;
}

const DAY_MS = 24 * 3600_000;

/** When the last was read, by the clock of the bench: never later than now; a clock that is days behind says nothing. */
function lastRead(rows: readonly { readAt: string | null }[], at: Date): string | null {
  const times = rows.flatMap(({ readAt }) => (readAt === null ? [] : [Date.parse(readAt)]));
  const last = Math.min(at.getTime(), Math.max(...times));
  return at.getTime() - last < DAY_MS ? new Date(last).toISOString() : null;
}

/** The staged finals as runs, all of them or none; each settles the retests of its state and port. */
export async function publishFinals(
  actor: Actor | null,
  body: FinalsBody,
  staged: readonly StagedFinals[],
): Promise<FinalsKept> {
  authorise(actor, 'sweep.keep');
  return unitOfWork(async () => {
    const runs: FinalsKept['runs'] = [];
    for (const { body: keep, pending } of staged) {
      const { id, number, evaluation, points } = await publishSweep(actor, keep, pending);
      runs.push({ id, number, verdict: evaluation.verdict, points });
    }
    const ids = [...new Set(body.finals.flatMap(({ retestIds }) => retestIds))];
    const rows = await Retest.findAll({ where: { publicId: ids }, order: [['number', 'ASC']] });
    const retests = rows.map(({ publicId: id, number, status, statusReason }) => ({
      id,
      number,
      status,
      statusReason,
    }));
    return { runs, retests };
  });
}

/** Lets go what was staged and not published. */
export async function dropFinals(staged: readonly StagedFinals[]): Promise<void> {
  for (const { pending } of staged) await dropSweep(pending);
}

/** Keeps typed finals in one go. */
export async function keepFinals(actor: Actor | null, body: FinalsBody, at = new Date()): Promise<FinalsKept> {
  const staged = await stageFinals(actor, body, at);
  try {
    return await publishFinals(actor, body, staged);
  } catch (error) {
    await dropFinals(staged).catch(() => undefined);
    throw error;
  }
}
