import { Op } from 'sequelize';
import type { SignalPathRevision } from '@/models/signalPathRevision';
import { Sweep } from '@/models/sweep';
import type { PathRecord } from '@/schemas/paths';

const LATEST = 10;

/** Runs that were corrected through some revisions: how many, by the row of each, and the newest. A voided run is none. */
export async function runsThrough(
  revisions: readonly SignalPathRevision[],
): Promise<PathRecord['runs'] & { byRevision: Map<number, number> }> {
  const where = {
    pathRevisionId: revisions.map(({ id }) => id),
    evaluationId: { [Op.not]: null },
    voidedAt: null,
  };
  const counted = await Sweep.count({ where, group: ['pathRevisionId'] });
  const byRevision = new Map(counted.map((row) => [Number(row.pathRevisionId), Number(row.count)]));
  const rows = await Sweep.findAll({ where, order: [['id', 'DESC']], limit: LATEST });
  return {
    count: [...byRevision.values()].reduce((sum, count) => sum + count, 0),
    byRevision,
    latest: rows.map((row) => ({
      id: row.publicId,
      number: row.number,
      measuredAt: (row.measuredAt ?? row.createdAt).toISOString(),
      revision: revisions.find(({ id }) => id === row.pathRevisionId)!.revision,
    })),
  };
}
