import type { z } from 'zod';
import { Op } from 'sequelize';
import { authorise, type Actor } from '@/auth/actor';
import { CustodyMove } from '@/models/custodyMove';
import { newPublicId } from '@/models/publicId';
import { unitOfWork } from '@/models/unitOfWork';
import type { User } from '@/models/user';
import type { CustodyView, moveSampleBody } from '@/schemas/custody';
import { recordChange } from './audit';
import { olderThan, pageFrom, type Page, type PageRequest } from './paging';
import { findSample } from './samples';

function view(row: CustodyMove): CustodyView {
  const { publicId, place, note, createdAt } = row;
  const { user } = row as CustodyMove & { user: User };
  return { id: publicId, place, note, by: user.name, at: createdAt.toISOString() };
}

/** Where a sample has been, newest first; nothing while nobody has said. */
export async function listCustody(
  actor: Actor | null,
  sampleId: string,
  page: PageRequest,
): Promise<Page<CustodyView>> {
  authorise(actor, 'custody.list');
  return unitOfWork(async () => {
    const { id } = await findSample(actor, sampleId);
    const rows = await CustodyMove.findAll({
      where: { sampleId: id, ...olderThan(page) },
      include: ['user'],
      order: [['id', 'DESC']],
      limit: page.limit + 1,
    });
    return pageFrom(rows, page, view);
  });
}

/** A sample of a job that has ended can still go somewhere: back to its client, as a rule. */
export async function moveSample(
  actor: Actor | null,
  sampleId: string,
  body: z.infer<typeof moveSampleBody>,
  at = new Date(),
): Promise<CustodyView> {
  authorise(actor, 'custody.move');
  return unitOfWork(async () => {
    const sample = await findSample(actor, sampleId);
    const [before] = [...(await placesOf([sample.id])).values()];
    const row = await CustodyMove.create({
      ...body,
      publicId: newPublicId(),
      sampleId: sample.id,
      userId: actor.userId,
      createdAt: at,
    });
    recordChange(actor, {
      scope: `job-${sample.job.publicId}`,
      action: `sample ${sample.code} moved`,
      subjectType: 'sample',
      subjectId: sampleId,
      before: { place: before?.place ?? null },
      after: body,
      at,
    });
    await row.reload({ include: ['user'] });
    return view(row);
  });
}

/** Where samples (row ids) are now; those that nobody has moved are left out. */
export async function placesOf(sampleIds: readonly number[]): Promise<Map<number, CustodyView>> {
  const newest = await CustodyMove.findAll({
    attributes: [[CustodyMove.sequelize!.fn('MAX', CustodyMove.sequelize!.col('id')), 'id']],
    where: { sampleId: [...new Set(sampleIds)] },
    group: ['sample_id'],
    raw: true,
  });
  const rows = await CustodyMove.findAll({
    where: { id: { [Op.in]: newest.map(({ id }) => id) } },
    include: ['user'],
  });
  return new Map(rows.map((row) => [row.sampleId, view(row)]));
}
