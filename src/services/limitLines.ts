import { Op, QueryTypes } from 'sequelize';
import { authorise, type Actor } from '@/auth/actor';
import type { LineUnit } from '@/emc/kinds';
import { limitDifference } from '@/emc/revisionDifference';
import { NotFound } from '@/errors';
import { limitLineText } from '@/ingest/tableText';
import { database } from '@/models/database';
import { LimitLineRevision } from '@/models/limitLineRevision';
import { LimitSet } from '@/models/limitSet';
import { unitOfWork } from '@/models/unitOfWork';
import type { User } from '@/models/user';
import type { LimitLineRecord, LimitLineSummary } from '@/schemas/tables';
import { lineView, toCoreLine } from './limitSets';
import { olderThan, pageFrom, type PageRequest } from './paging';
import { runsWithLine } from './tableUse';
import { wordsIn } from './tradeWords';

type Whole = LimitLineRevision & { user: User | null };

export function lineSummary(row: LimitLineRevision, newest: boolean): LimitLineSummary {
  const { user } = row as Whole;
  return {
    id: row.publicId,
    key: row.lineKey,
    revision: row.revision,
    newest,
    name: row.name,
    document: row.document,
    class: row.class,
    port: row.port,
    detector: row.detector,
    bandwidthHz: row.bandwidthHz,
    unit: row.unit as LineUnit,
    distanceM: row.distanceM,
    segments: row.segments,
    source: row.source,
    basis: row.basis,
    reason: row.reason,
    file: row.fileName !== null && row.fileSha256 !== null ? { name: row.fileName, sha256: row.fileSha256 } : null,
    enteredAt: row.createdAt.toISOString(),
    enteredBy: user && { id: user.publicId, name: user.name },
  };
}

/** Sets that name one of some revisions, newest first. */
export async function setsNaming(lineIds: readonly string[], where: { withdrawnAt?: null } = {}): Promise<LimitSet[]> {
  const wanted = new Set(lineIds);
  const sets = await LimitSet.findAll({ where, order: [['id', 'DESC']] });
  return sets.filter((set) => set.lineRevisionIds.some((id) => wanted.has(id)));
}

export const setRefOf = ({ publicId: id, name, revision, withdrawnAt }: LimitSet) => {
  return { id, name, revision, withdrawnAt: withdrawnAt?.toISOString() ?? null };
};

/** Each line by its newest revision. */
export async function listLimitLines(actor: Actor | null, page: PageRequest & { find?: string }) {
  authorise(actor, 'limit-line.list');
  return unitOfWork(async () => {
    const newest = await database().query<{ id: number | string }>(
      `SELECT MAX(id) AS id FROM limit_line_revisions GROUP BY line_key`,
      { type: QueryTypes.SELECT },
    );
    const searched = ['LimitLineRevision.name', 'document', 'class', 'port', 'detector', 'source', 'basis'];
    const rows = await LimitLineRevision.findAll({
      where: {
        [Op.and]: [
          olderThan(page),
          { id: newest.map(({ id }) => Number(id)) },
          page.find
            ? wordsIn(
                page.find,
                searched.map((one) => (one.includes('.') ? `$${one}$` : one)),
              )
            : {},
        ],
      },
      include: ['user'],
      order: [['id', 'DESC']],
      limit: page.limit + 1,
      subQuery: false,
    });
    return pageFrom(rows, page, (row) => lineSummary(row, true));
  });
}

async function findLine(publicId: string): Promise<LimitLineRevision> {
  const row = await LimitLineRevision.findOne({ where: { publicId } });
  if (!row) throw new NotFound('limit line');
  return row;
}

/** One revision with every other of its key, what names it and how it differs from the one before. */
export async function readLimitLine(actor: Actor | null, publicId: string): Promise<LimitLineRecord> {
  authorise(actor, 'limit-line.list');
  return unitOfWork(async () => {
    const { lineKey } = await findLine(publicId);
    const all = await LimitLineRevision.findAll({
      where: { lineKey },
      include: ['user'],
      order: [['revision', 'DESC']],
    });
    const row = all.find((one) => one.publicId === publicId)!;
    const before = all.find(({ revision }) => revision < row.revision) ?? null;
    return {
      ...lineSummary(row, row === all[0]),
      sets: (await setsNaming([publicId])).map(setRefOf),
      runs: await runsWithLine(publicId),
      revisions: all.map((one) => lineSummary(one, one === all[0])),
      before: before && {
        id: before.publicId,
        revision: before.revision,
        difference:
          before.unit === row.unit ? limitDifference(toCoreLine(lineView(before)), toCoreLine(lineView(row))) : null,
      },
    };
  });
}

/** As CSV under a name that says what it is; what is uploaded of it is the same line. */
export async function downloadLimitLine(
  actor: Actor | null,
  publicId: string,
): Promise<{ name: string; text: string }> {
  authorise(actor, 'limit-line.list');
  return unitOfWork(async () => {
    const row = await findLine(publicId);
    const { file: _file, ...line } = lineSummary(row, true);
    return { name: `${row.name}, revision ${row.revision}.csv`, text: limitLineText(line) };
  });
}
