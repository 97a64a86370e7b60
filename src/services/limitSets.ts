import { authorise, type Actor } from '@/auth/actor';
import type { LineUnit } from '@/emc/kinds';
import type { LimitLine } from '@/emc/types';
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

export async function listLimitSets(actor: Actor | null, page: PageRequest) {
  authorise(actor, 'limit-set.list');
  return unitOfWork(async () => {
    const rows = await LimitSet.findAll({
      where: { withdrawnAt: null, ...olderThan(page) },
      order: [['id', 'DESC']],
      limit: page.limit + 1,
    });
    const lines = await linesOf(rows);
    return pageFrom(rows, page, (row): LimitSetView => {
      const { publicId: id, name, port, distanceM, revision } = row;
      return { id, name, port, distanceM, revision, lines: lines.get(row.id)! };
    });
  });
}
