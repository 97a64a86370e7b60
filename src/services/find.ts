import { Op } from 'sequelize';
import type { z } from 'zod';
import { authorise, visibleOrganisation, type Actor } from '@/auth/actor';
import { Equipment } from '@/models/equipment';
import { Job } from '@/models/job';
import type { Organisation } from '@/models/organisation';
import { Product } from '@/models/product';
import { Sample } from '@/models/sample';
import { SignalPath } from '@/models/signalPath';
import { Sweep } from '@/models/sweep';
import { unitOfWork } from '@/models/unitOfWork';
import { FOUND_KINDS, type Found, type FoundItem, type FoundKind, type findQuery } from '@/schemas/find';
import { olderThan, pageFrom, type Page, type PageRequest } from './paging';
import { runInclude, type Run } from './runs';
import { stateLabel } from './samples';
import { wordsIn } from './tradeWords';

/** How many of each kind stand on the first answer. */
const FIRST_FEW = 8;

type JobOf = Job & { organisation: Organisation; product: Product };
type Search = (own: number | null, q: string, page: PageRequest) => Promise<Page<FoundItem>>;

/** Shared by every kind: newest first, one row more than asked for. */
const paged = (page: PageRequest) => ({
  order: [['id', 'DESC']] as [string, string][],
  limit: page.limit + 1,
  subQuery: false,
});

const ofJob = (own: number | null) => ({
  association: 'job',
  required: true,
  include: ['organisation', 'product'],
  ...(own !== null && { where: { organisationId: own } }),
});

const SEARCHES: Readonly<Record<FoundKind, Search>> = {
  job: async (own, q, page) => {
    const rows = await Job.findAll({
      where: {
        [Op.and]: [
          olderThan(page),
          own === null ? {} : { organisationId: own },
          wordsIn(q, ['$Job.number$', '$Job.title$', '$product.code$', '$product.name$', '$organisation.name$']),
        ],
      },
      include: ['organisation', 'product'],
      ...paged(page),
    });
    return pageFrom(rows, page, (row) => {
      const { product } = row as JobOf;
      return { id: row.publicId, name: row.number, says: `${row.title}, ${product.code}, ${row.state}` };
    });
  },
  sample: async (own, q, page) => {
    const rows = await Sample.findAll({
      where: {
        [Op.and]: [
          olderThan(page),
          wordsIn(q, ['$Sample.code$', '$Sample.serial$', '$job.number$', '$job.product.code$', '$job.product.name$']),
        ],
      },
      include: [ofJob(own)],
      ...paged(page),
    });
    return pageFrom(rows, page, (row) => {
      const { job } = row as Sample & { job: JobOf };
      return {
        id: row.publicId,
        name: row.code,
        says: `${job.product.name} ${job.product.code}, serial ${row.serial}, job ${job.number}`,
      };
    });
  },
  run: async (own, q, page) => {
    const rows = await Sweep.findAll({
      where: {
        [Op.and]: [
          olderThan(page),
          { evaluationId: { [Op.not]: null } },
          wordsIn(q, [
            '$Sweep.number$',
            '$Sweep.operating_mode$',
            '$Sweep.trial$',
            '$file.name$',
            '$state.sample.code$',
            '$state.sample.job.number$',
            '$state.sample.job.product.code$',
          ]),
        ],
      },
      include: [...runInclude(own), { association: 'file' }],
      ...paged(page),
    });
    return pageFrom(rows, page, (row) => {
      const { state, file } = row as Run;
      const trial = row.trial ? `, trial: ${row.trial}` : '';
      const { product } = state.sample.job;
      return {
        id: row.publicId,
        name: row.number,
        says: `${product.code} ${stateLabel(state.position)}${trial}, ${file.name}`,
      };
    });
  },
  product: async (own, q, page) => {
    const rows = await Product.findAll({
      where: {
        [Op.and]: [
          olderThan(page),
          own === null ? {} : { organisationId: own },
          wordsIn(q, ['$Product.code$', '$Product.name$', '$Product.description$', '$organisation.name$']),
        ],
      },
      include: ['organisation'],
      ...paged(page),
    });
    return pageFrom(rows, page, (row) => ({
      id: row.publicId,
      name: row.code,
      says: `${row.name}, ${(row as Product & { organisation: Organisation }).organisation.name}`,
    }));
  },
  equipment: async (own, q, page) => {
    // The lab's own; a client never sees it.
    if (own !== null) return { items: [], next: null };
    const rows = await Equipment.findAll({
      where: { [Op.and]: [olderThan(page), wordsIn(q, ['identifier', 'role', 'description'])] },
      ...paged(page),
    });
    return pageFrom(rows, page, (row) => ({
      id: row.publicId,
      name: row.identifier,
      says: row.state === 'in-use' ? row.description : `${row.description}, ${row.state}`,
    }));
  },
  path: async (own, q, page) => {
    if (own !== null) return { items: [], next: null };
    const rows = await SignalPath.findAll({
      where: { [Op.and]: [olderThan(page), wordsIn(q, ['code', 'name'])] },
      ...paged(page),
    });
    return pageFrom(rows, page, (row) => {
      return { id: row.publicId, name: row.code, says: `signal path, ${row.name}, test position ${row.position}` };
    });
  },
};

/** What carries the words, kind by kind, newest first. A designer finds what belongs to the own organisation. */
export async function findEverywhere(actor: Actor | null, query: z.infer<typeof findQuery>): Promise<Found> {
  authorise(actor, 'find.everywhere');
  const own = visibleOrganisation(actor);
  const { q, kind, after } = query;
  return unitOfWork(async () => {
    const kinds: Found['kinds'] = [];
    for (const one of kind ? [kind] : FOUND_KINDS) {
      const limit = kind ? query.limit : Math.min(query.limit, FIRST_FEW);
      const page = await SEARCHES[one](own, q, { limit, ...(kind && after && { after }) });
      kinds.push({ kind: one, ...page });
    }
    return { kinds };
  });
}
