import { col, fn } from 'sequelize';
import type { z } from 'zod';
import { authorise, visibleOrganisation, type Actor } from '@/auth/actor';
import { Conflict, NotFound } from '@/errors';
import { Job } from '@/models/job';
import { ModificationState } from '@/models/modificationState';
import type { Organisation } from '@/models/organisation';
import type { Product } from '@/models/product';
import { newPublicId } from '@/models/publicId';
import { Sample } from '@/models/sample';
import { Sweep } from '@/models/sweep';
import { currentTransaction, unitOfWork } from '@/models/unitOfWork';
import type { changeSampleBody, changeStateBody, createSampleBody, createStateBody, SampleView } from '@/schemas/job';
import { recordChange } from './audit';
import { nextNumber } from './counters';
import { findJob } from './jobs';
import { olderThan, pageFrom, type PageRequest } from './paging';
import { settleFitting } from './settleRetests';
import { changeVersioned } from './versions';

type WholeJob = Job & { organisation: Organisation; product: Product };
type Whole = Sample & { job: WholeJob; states: ModificationState[] };
const JOB = { association: 'job', include: ['organisation', 'product'] };
const INCLUDE = [JOB, 'states'];

export const stateLabel = (position: number): string => `M${position}`;

function view(row: Sample, runs: Map<number, number>): SampleView {
  const { job, states } = row as Whole;
  return {
    id: row.publicId,
    version: row.version,
    code: row.code,
    serial: row.serial,
    firmware: row.firmware,
    description: row.description,
    organisation: { id: job.organisation.publicId, name: job.organisation.name },
    job: { id: job.publicId, number: job.number, title: job.title },
    product: { id: job.product.publicId, code: job.product.code, name: job.product.name },
    states: [...states]
      .sort((a, b) => a.position - b.position)
      .map((state) => ({
        id: state.publicId,
        version: state.version,
        label: stateLabel(state.position),
        description: state.description,
        planned: state.planned,
        runs: runs.get(state.id) ?? 0,
      })),
  };
}

async function runCounts(samples: Sample[]): Promise<Map<number, number>> {
  const stateIds = samples.flatMap((sample) => (sample as Whole).states.map((state) => state.id));
  const rows = (await Sweep.findAll({
    attributes: ['stateId', [fn('COUNT', col('id')), 'count']],
    where: { stateId: stateIds },
    group: ['state_id'],
    raw: true,
  })) as unknown as { stateId: number; count: number | string }[];
  return new Map(rows.map((row) => [Number(row.stateId), Number(row.count)]));
}

/** A sample the actor may see, with its job and states, or NotFound. */
export async function findSample(actor: Actor, publicId: string): Promise<Sample & { job: Job }> {
  const row = await Sample.findOne({ where: { publicId }, include: INCLUDE });
  const own = visibleOrganisation(actor);
  if (!row || (own !== null && (row as Whole).job.organisationId !== own)) throw new NotFound('sample');
  return row as Whole;
}

/**
 * Holds a job (row id) until the unit commits, so that nobody closes it meanwhile; take it before any row below it.
 * @throws {Conflict} when it is not open
 */
export async function lockOpenJob(jobId: number): Promise<Job> {
  const job = await Job.findByPk(jobId, { lock: currentTransaction().LOCK.UPDATE, rejectOnEmpty: true });
  if (job.state !== 'open') throw new Conflict(`Job ${job.number} is ${job.state}. Reopen it first.`);
  return job;
}

async function whole(actor: Actor, publicId: string): Promise<SampleView> {
  const row = await findSample(actor, publicId);
  return view(row, await runCounts([row]));
}

export async function listSamples(actor: Actor | null, page: PageRequest & { jobId?: string }) {
  authorise(actor, 'sample.list');
  const own = visibleOrganisation(actor);
  return unitOfWork(async () => {
    const job = page.jobId ? await findJob(actor, page.jobId) : null;
    const rows = await Sample.findAll({
      where: { ...olderThan(page), ...(job && { jobId: job.id }) },
      include: [{ ...JOB, required: true, ...(own !== null && { where: { organisationId: own } }) }],
      order: [['id', 'DESC']],
      limit: page.limit + 1,
    });
    const states = await ModificationState.findAll({ where: { sampleId: rows.map((row) => row.id) } });
    for (const row of rows) Object.assign(row, { states: states.filter((state) => state.sampleId === row.id) });
    const runs = await runCounts(rows);
    return pageFrom(rows, page, (row) => view(row, runs));
  });
}

export async function readSample(actor: Actor | null, publicId: string): Promise<SampleView> {
  authorise(actor, 'sample.read');
  return unitOfWork(() => whole(actor, publicId));
}

export async function createSample(
  actor: Actor | null,
  jobId: string,
  body: z.infer<typeof createSampleBody>,
  at = new Date(),
): Promise<SampleView> {
  authorise(actor, 'sample.create');
  return unitOfWork(async () => {
    const job = await lockOpenJob((await findJob(actor, jobId)).id);
    const code = `S-${String(await nextNumber('sample')).padStart(3, '0')}`;
    const { serial, firmware, description } = body;
    const row = await Sample.create({
      publicId: newPublicId(),
      jobId: job.id,
      code,
      serial,
      firmware,
      description,
      createdAt: at,
    });
    await ModificationState.create({
      publicId: newPublicId(),
      sampleId: row.id,
      position: 0,
      description: 'as received',
      planned: false,
      createdAt: at,
    });
    recordChange(actor, {
      scope: `job-${job.publicId}`,
      action: 'sample entered',
      subjectType: 'sample',
      subjectId: row.publicId,
      before: null,
      after: { code, ...body },
      at,
    });
    return whole(actor, row.publicId);
  });
}

const lockedSample = (id: number): Promise<Sample> =>
  Sample.findByPk(id, { lock: currentTransaction().LOCK.UPDATE, rejectOnEmpty: true });

export async function changeSample(
  actor: Actor | null,
  publicId: string,
  version: number,
  body: z.infer<typeof changeSampleBody>,
): Promise<SampleView> {
  authorise(actor, 'sample.change');
  return unitOfWork(async () => {
    const { id, job } = await findSample(actor, publicId);
    await lockOpenJob(job.id);
    const row = await lockedSample(id);
    const before = { serial: row.serial, firmware: row.firmware, description: row.description };
    await changeVersioned(Sample, row, version, body, 'sample');
    recordChange(actor, {
      scope: `job-${job.publicId}`,
      action: 'sample changed',
      subjectType: 'sample',
      subjectId: publicId,
      before,
      after: { ...before, ...body },
    });
    return whole(actor, publicId);
  });
}

export async function createState(
  actor: Actor | null,
  sampleId: string,
  body: z.infer<typeof createStateBody>,
  at = new Date(),
): Promise<SampleView> {
  authorise(actor, 'state.create');
  return unitOfWork(async () => {
    const sample = await findSample(actor, sampleId);
    await lockOpenJob(sample.job.id);
    await lockedSample(sample.id);
    const position = await ModificationState.count({ where: { sampleId: sample.id } });
    const row = await ModificationState.create({
      publicId: newPublicId(),
      sampleId: sample.id,
      position,
      description: body.description,
      planned: body.planned,
      createdAt: at,
    });
    recordChange(actor, {
      scope: `job-${sample.job.publicId}`,
      action: `state ${stateLabel(position)} added`,
      subjectType: 'state',
      subjectId: row.publicId,
      before: null,
      after: { sample: sampleId, position, ...body },
      at,
    });
    if (!row.planned) await settleFitting(actor, row, at);
    return whole(actor, sampleId);
  });
}

export async function changeState(
  actor: Actor | null,
  publicId: string,
  version: number,
  body: z.infer<typeof changeStateBody>,
): Promise<SampleView> {
  authorise(actor, 'state.change');
  return unitOfWork(async () => {
    const found = await ModificationState.findOne({ where: { publicId }, include: ['sample'] });
    if (!found) throw new NotFound('modification state');
    const { sample } = found as ModificationState & { sample: Sample };
    const { job } = await findSample(actor, sample.publicId);
    await lockOpenJob(job.id);
    const lock = currentTransaction().LOCK.UPDATE;
    const row = await ModificationState.findByPk(found.id, { lock, rejectOnEmpty: true });
    if (body.planned && (await Sweep.count({ where: { stateId: row.id } })) > 0) {
      throw new Conflict(`${stateLabel(row.position)} has been measured; it can no longer be planned.`);
    }
    const before = { description: row.description, planned: row.planned };
    await changeVersioned(ModificationState, row, version, body, 'modification state');
    recordChange(actor, {
      scope: `job-${job.publicId}`,
      action: `state ${stateLabel(row.position)} changed`,
      subjectType: 'state',
      subjectId: publicId,
      before,
      after: { ...before, ...body },
    });
    if (body.planned !== undefined && body.planned !== before.planned) await settleFitting(actor, row);
    return whole(actor, sample.publicId);
  });
}
