import { Op, QueryTypes } from 'sequelize';
import { authorise, visibleOrganisation, type Actor } from '@/auth/actor';
import type { LineUnit } from '@/emc/kinds';
import type { LimitLine } from '@/emc/types';
import { NotFound } from '@/errors';
import { database } from '@/models/database';
import { LimitLineRevision } from '@/models/limitLineRevision';
import { LimitSet } from '@/models/limitSet';
import { unitOfWork } from '@/models/unitOfWork';
import type { LimitSetView } from '@/schemas/bench';
import type { LimitLineView } from '@/schemas/sweep';
import { olderThan, pageFrom, type PageRequest } from './paging';

export function lineView(row: LimitLineRevision): LimitLineView {
  return {
    id: row.publicId,
    name: row.name,
    document: row.document,
    source: row.source,
    basis: row.basis,
    revision: row.revision,
    detector: row.detector,
    bandwidthHz: row.bandwidthHz,
    unit: row.unit as LineUnit,
    distanceM: row.distanceM,
    segments: row.segments,
  };
}

/** The same line as the core computes with it. */
export function toCoreLine(view: LimitLineView): LimitLine {
  const { id, name, detector, bandwidthHz, unit, distanceM, segments } = view;
  return { id, name, detector, bandwidthHz, unit, distanceM, segments };
}

/** The lines of some sets by public id, each set's in its own order. */
export async function linesOf(sets: LimitSet[]): Promise<Map<number, LimitLineView[]>> {
  const ids = [...new Set(sets.flatMap((set) => set.lineRevisionIds))];
  const rows = await LimitLineRevision.findAll({ where: { publicId: ids } });
  const byId = new Map(rows.map((row) => [row.publicId, lineView(row)]));
  return new Map(sets.map((set) => [set.id, set.lineRevisionIds.map((id) => byId.get(id)!)]));
}

function setView(row: LimitSet, lines: LimitLineView[]): LimitSetView {
  const { publicId: id, name, port, distanceM, revision, withdrawnAt } = row;
  return { id, name, port, distanceM, revision, withdrawnAt: withdrawnAt?.toISOString() ?? null, lines };
}

/** Row ids of the sets a client's own runs were judged by; null for the lab's people, who see every set. */
async function setsOfOwnRuns(actor: Actor): Promise<number[] | null> {
  const own = visibleOrganisation(actor);
  if (own === null) return null;
  const rows = await database().query<{ id: number | string }>(
    `SELECT DISTINCT s.limit_set_id AS id FROM sweeps s
     JOIN modification_states m ON m.id = s.state_id JOIN samples p ON p.id = m.sample_id
     JOIN jobs j ON j.id = p.job_id WHERE j.organisation_id = :own AND s.evaluation_id IS NOT NULL`,
    { replacements: { own }, type: QueryTypes.SELECT },
  );
  return rows.map(({ id }) => Number(id));
}

/** Sets in use, newest first; a client sees those of its own runs, whether withdrawn since or not. */
export async function listLimitSets(actor: Actor | null, page: PageRequest & { withdrawn?: 'without' | 'with' }) {
  authorise(actor, 'limit-set.list');
  return unitOfWork(async () => {
    const own = await setsOfOwnRuns(actor);
    const all = own !== null || page.withdrawn === 'with';
    const rows = await LimitSet.findAll({
      where: {
        [Op.and]: [olderThan(page), all ? {} : { withdrawnAt: null }, own === null ? {} : { id: own }],
      },
      order: [['id', 'DESC']],
      limit: page.limit + 1,
    });
    const lines = await linesOf(rows);
    return pageFrom(rows, page, (row) => setView(row, lines.get(row.id)!));
  });
}

/** One revision of a set, withdrawn or not. */
export async function readLimitSet(actor: Actor | null, publicId: string): Promise<LimitSetView> {
  authorise(actor, 'limit-set.list');
  return unitOfWork(async () => {
    const row = await LimitSet.findOne({ where: { publicId } });
    const own = row && (await setsOfOwnRuns(actor));
    if (!row || (own !== null && !own.includes(row.id))) throw new NotFound('limit set');
    return setView(row, (await linesOf([row])).get(row.id)!);
  });
}
