import { createHash } from 'node:crypto';
import { authorise, type Actor } from '@/auth/actor';
import { Conflict, NotFound } from '@/errors';

import { Photo } from '@/models/photo';
import { readPhotoBytes, writePhoto } from '@/models/photoStore';
import { newPublicId } from '@/models/publicId';
import { type Sweep } from '@/models/sweep';
import { currentTransaction, unitOfWork } from '@/models/unitOfWork';
import type { User } from '@/models/user';
import type { PhotoView } from '@/schemas/setup';
import { recordChange } from './audit';
import { olderThan, pageFrom, type Page, type PageRequest } from './paging';
import { findRun, type Run } from './runs';
import { lockOpenJob } from './samples';
import { changeVersioned } from './versions';

export const MOST_PHOTOS = 40;

export interface PreparedPhoto {
  /** Of the file as it was sent. */
  sha256: string;
  sentBytes: number;
  whole: { bytes: Uint8Array; width: number; height: number };
  small: { bytes: Uint8Array; width: number; height: number };
}

type WholePhoto = Photo & { user: User; withdrawer: User | null };
const PEOPLE = ['user', 'withdrawer'];
const person = ({ publicId, name }: User) => ({ id: publicId, name });

function view(row: Photo, run: Run): PhotoView {
  const { user, withdrawer } = row as WholePhoto;
  const { publicId: id, version, caption, width, height, bytes, sha256 } = row;
  return {
    id,
    version,
    runId: run.publicId,
    caption,
    width,
    height,
    bytes,
    sha256,
    small: { width: row.smallWidth, height: row.smallHeight },
    sent: { bytes: row.sentBytes, sha256: row.sentSha256 },
    by: person(user),
    at: row.createdAt.toISOString(),
    withdrawn: row.withdrawnAt && {
      at: row.withdrawnAt.toISOString(),
      by: person(withdrawer!),
      reason: row.withdrawReason!,
    },
  };
}

/** A withdrawn picture may show what a client must not see, so it is there for the lab's people alone. */
const shown = (actor: Actor) => (actor.role === 'designer' ? { withdrawnAt: null } : {});

/** A photograph and its run, which the actor may see, or NotFound. */
async function findPhoto(actor: Actor, publicId: string): Promise<{ photo: Photo; run: Run }> {
  const photo = await Photo.findOne({ where: { publicId, ...shown(actor) }, include: [...PEOPLE, 'sweep'] });
  const sweep = (photo as (Photo & { sweep: Sweep }) | null)?.sweep;
  if (!photo || !sweep) throw new NotFound('photograph');
  return { photo, run: await runOfPhoto(actor, sweep) };
}

async function runOfPhoto(actor: Actor, sweep: Sweep): Promise<Run> {
  return findRun(actor, sweep.publicId).catch((error: unknown) => {
    throw error instanceof NotFound ? new NotFound('photograph') : error;
  });
}

export async function listPhotos(actor: Actor | null, runId: string, page: PageRequest): Promise<Page<PhotoView>> {
  authorise(actor, 'setup.read');
  return unitOfWork(async () => {
    const run = await findRun(actor, runId);
    const rows = await Photo.findAll({
      where: { sweepId: run.id, ...shown(actor), ...olderThan(page) },
      include: PEOPLE,
      order: [['id', 'DESC']],
      limit: page.limit + 1,
    });
    return pageFrom(rows, page, (row) => view(row, run));
  });
}

export async function readPhoto(actor: Actor | null, publicId: string): Promise<PhotoView> {
  authorise(actor, 'setup.read');
  return unitOfWork(async () => {
    const { photo, run } = await findPhoto(actor, publicId);
    return view(photo, run);
  });
}

export interface PhotoImage {
  contentType: string;
  /** Names these bytes for ever, for an ETag. */
  etag: string;
  /** Read only when they are asked for. */
  bytes: () => Promise<Buffer>;
}

export async function downloadPhoto(
  actor: Actor | null,
  publicId: string,
  size: 'whole' | 'small',
): Promise<PhotoImage> {
  authorise(actor, 'setup.read');
  const { photo } = await unitOfWork(() => findPhoto(actor, publicId));
  const { id, contentType, sha256 } = photo;
  return {
    contentType,
    etag: `"${sha256.slice(0, 32)}-${size}"`,
    bytes: () => unitOfWork(() => readPhotoBytes(id, size)),
  };
}

/** Keeps a photograph with its run: both sizes, who and when, in one transaction. */
export async function addPhoto(
  actor: Actor | null,
  runId: string,
  prepared: PreparedPhoto,
  caption: string,
  at = new Date(),
): Promise<PhotoView> {
  authorise(actor, 'setup.write');
  const { whole, small } = prepared;
  return unitOfWork(async () => {
    const run = await openRun(actor, runId);
    // Counted under the job's lock.
    if ((await Photo.count({ where: { sweepId: run.id, withdrawnAt: null } })) >= MOST_PHOTOS) {
      throw new Conflict(`${run.number} has ${MOST_PHOTOS} photographs. Withdraw one before you add another.`);
    }
    const row = await Photo.create({
      publicId: newPublicId(),
      sweepId: run.id,
      caption,
      contentType: 'image/jpeg',
      width: whole.width,
      height: whole.height,
      bytes: whole.bytes.length,
      sha256: createHash('sha256').update(whole.bytes).digest('hex'),
      smallWidth: small.width,
      smallHeight: small.height,
      sentBytes: prepared.sentBytes,
      sentSha256: prepared.sha256,
      userId: actor.userId,
      createdAt: at,
    });
    await writePhoto(row.id, 'whole', whole.bytes);
    await writePhoto(row.id, 'small', small.bytes);
    const { publicId, sha256, sentSha256 } = row;
    record(actor, run, 'photograph added', null, { photo: publicId, caption, sha256, sentSha256 }, at);
    return view(await row.reload({ include: PEOPLE }), run);
  });
}

export async function changePhoto(
  actor: Actor | null,
  publicId: string,
  version: number,
  { caption }: { caption: string },
): Promise<PhotoView> {
  authorise(actor, 'setup.write');
  return unitOfWork(async () => {
    const { photo, run } = await openPhoto(actor, publicId);
    await changeVersioned(Photo, photo, version, { caption }, 'photograph');
    record(
      actor,
      run,
      'caption of a photograph corrected',
      { photo: publicId, caption: photo.caption },
      { photo: publicId, caption },
    );
    return view(await photo.reload({ include: PEOPLE }), run);
  });
}

/** Takes a photograph out of sight of the client; the lab still sees it, with the reason. */
export async function withdrawPhoto(
  actor: Actor | null,
  publicId: string,
  version: number,
  { reason }: { reason: string },
  at = new Date(),
): Promise<PhotoView> {
  authorise(actor, 'setup.write');
  return unitOfWork(async () => {
    const { photo, run } = await openPhoto(actor, publicId);
    if (photo.withdrawnAt) throw new Conflict('This photograph is withdrawn already.');
    const values = { withdrawnAt: at, withdrawReason: reason, withdrawnBy: actor.userId };
    await changeVersioned(Photo, photo, version, values, 'photograph');
    record(actor, run, 'photograph withdrawn', { photo: publicId }, { photo: publicId, reason }, at);
    return view(await photo.reload({ include: PEOPLE }), run);
  });
}

async function openRun(actor: Actor, runId: string): Promise<Run> {
  const run = await findRun(actor, runId);
  await lockOpenJob(run.state.sample.job.id);
  return run;
}

async function openPhoto(actor: Actor, publicId: string): Promise<{ photo: Photo; run: Run }> {
  const { run } = await findPhoto(actor, publicId);
  await lockOpenJob(run.state.sample.job.id);
  // Read again under the lock.
  const photo = await Photo.findOne({ where: { publicId }, lock: currentTransaction().LOCK.UPDATE });
  return { photo: photo!, run };
}

type Values = Record<string, unknown>;

function record(actor: Actor, run: Run, action: string, before: Values | null, after: Values, at?: Date): void {
  const scope = `job-${run.state.sample.job.publicId}`;
  recordChange(actor, { scope, action, subjectType: 'sweep', subjectId: run.publicId, before, after, at });
}
