import { col, fn } from 'sequelize';
import type { z } from 'zod';
import { authorise, visibleOrganisation, type Actor } from '@/auth/actor';
import { Invalid, NotFound } from '@/errors';
import { Job } from '@/models/job';
import type { Organisation } from '@/models/organisation';
import { Product } from '@/models/product';
import { newPublicId } from '@/models/publicId';
import { Sample } from '@/models/sample';
import { currentTransaction, unitOfWork } from '@/models/unitOfWork';
import type { changeJobBody, createJobBody, JobView } from '@/schemas/job';
import { recordChange } from './audit';
import { nextNumber } from './counters';
import { dayIn, labSettings } from './lab';
import { olderThan, pageFrom, type PageRequest } from './paging';
import { changeVersioned } from './versions';

type Whole = Job & { organisation: Organisation; product: Product };
const INCLUDE = ['organisation', 'product'];

function view(row: Job, samples: number): JobView {
  const { organisation, product } = row as Whole;
  return {
    id: row.publicId,
    version: row.version,
    number: row.number,
    title: row.title,
    organisation: { id: organisation.publicId, name: organisation.name },
    product: { id: product.publicId, code: product.code, name: product.name },
    decisionRule: row.decisionRule,
    state: row.state,
    stateReason: row.stateReason,
    createdAt: row.createdAt.toISOString(),
    samples,
  };
}

async function sampleCounts(jobIds: number[]): Promise<Map<number, number>> {
  const rows = (await Sample.findAll({
    attributes: ['jobId', [fn('COUNT', col('id')), 'count']],
    where: { jobId: jobIds },
    group: ['job_id'],
    raw: true,
  })) as unknown as { jobId: number; count: number | string }[];
  return new Map(rows.map((row) => [Number(row.jobId), Number(row.count)]));
}

/** A job the actor may see, or NotFound. */
export async function findJob(actor: Actor, publicId: string): Promise<Job> {
  const row = await Job.findOne({ where: { publicId }, include: INCLUDE });
  const own = visibleOrganisation(actor);
  if (!row || (own !== null && row.organisationId !== own)) throw new NotFound('job');
  return row;
}

export async function listJobs(actor: Actor | null, page: PageRequest) {
  authorise(actor, 'job.list');
  const own = visibleOrganisation(actor);
  return unitOfWork(async () => {
    const rows = await Job.findAll({
      where: { ...olderThan(page), ...(own !== null && { organisationId: own }) },
      include: INCLUDE,
      order: [['id', 'DESC']],
      limit: page.limit + 1,
    });
    const counts = await sampleCounts(rows.map((row) => row.id));
    return pageFrom(rows, page, (row) => view(row, counts.get(row.id) ?? 0));
  });
}

export async function readJob(actor: Actor | null, publicId: string): Promise<JobView> {
  authorise(actor, 'job.read');
  return unitOfWork(async () => whole(actor, publicId));
}

async function whole(actor: Actor, publicId: string): Promise<JobView> {
  const row = await findJob(actor, publicId);
  return view(row, await Sample.count({ where: { jobId: row.id } }));
}

/** Jobs are numbered per year of the lab's own calendar, `HL-2601` being the first of 2026; the prefix is the lab's own setting. */
export async function createJob(
  actor: Actor | null,
  body: z.infer<typeof createJobBody>,
  at = new Date(),
): Promise<JobView> {
  authorise(actor, 'job.create');
  return unitOfWork(async () => {
    const product = await Product.findOne({ where: { publicId: body.productId }, include: ['organisation'] });
    if (!product) throw new Invalid([{ pointer: '/productId', message: 'is not a product of this lab' }]);
    const { jobPrefix, zone } = await labSettings();
    const year = dayIn(zone, at).slice(0, 4);
    const count = await nextNumber(`job-${year}`);
    const row = await Job.create({
      publicId: newPublicId(),
      number: `${jobPrefix}-${year.slice(2)}${String(count).padStart(2, '0')}`,
      organisationId: product.organisationId,
      productId: product.id,
      title: body.title,
      decisionRule: body.decisionRule,
      createdAt: at,
    });
    recordChange(actor, {
      scope: `job-${row.publicId}`,
      action: 'job opened',
      subjectType: 'job',
      subjectId: row.publicId,
      before: null,
      after: { number: row.number, product: product.publicId, title: row.title, decisionRule: row.decisionRule },
      at,
    });
    return whole(actor, row.publicId);
  });
}

export async function changeJob(
  actor: Actor | null,
  publicId: string,
  version: number,
  body: z.infer<typeof changeJobBody>,
  at = new Date(),
): Promise<JobView> {
  authorise(actor, 'job.change');
  return unitOfWork(async () => {
    const { id } = await findJob(actor, publicId);
    const row = await Job.findByPk(id, { lock: currentTransaction().LOCK.UPDATE, rejectOnEmpty: true });
    const { title, state, stateReason, decisionRule } = row;
    const before = { title, state, stateReason, decisionRule };
    const after = { ...before, ...body };
    if (after.state === 'declined' && !after.stateReason) {
      throw new Invalid([{ pointer: '/stateReason', message: 'says why the job is declined' }]);
    }
    await changeVersioned(Job, row, version, body, 'job');
    recordChange(actor, {
      scope: `job-${publicId}`,
      action: after.state === before.state ? 'job changed' : `job ${after.state}`,
      subjectType: 'job',
      subjectId: publicId,
      before,
      after,
      at,
    });
    return whole(actor, publicId);
  });
}
