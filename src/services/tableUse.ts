import { QueryTypes } from 'sequelize';
import { database } from '@/models/database';
import type { FactorTableRevision } from '@/models/factorTableRevision';
import { SignalPath } from '@/models/signalPath';
import { SignalPathRevision } from '@/models/signalPathRevision';
import type { OutdatedRuns } from '@/schemas/tables';
import { dayIn } from './lab';

/* What uses a revision of a table or a line: paths by their items, runs by what their standing evaluation names. */

export interface RunRow {
  id: string;
  number: string;
  measuredAt: string;
}

const LATEST = 10;
const LISTED = 50;

/** The tables a revision of a path names, by public id. */
export function tablesOn(revision: SignalPathRevision): string[] {
  return revision.items.flatMap(({ tables }) => Object.values(tables)).filter((id): id is string => id !== null);
}

/** Every revision of every path that names one of some tables, newest first. */
export async function pathRevisionsWith(tableIds: readonly string[]) {
  const wanted = new Set(tableIds);
  const revisions = await SignalPathRevision.findAll({ order: [['id', 'DESC']] });
  const newest = new Map<number, number>();
  for (const { signalPathId, revision } of revisions) {
    newest.set(signalPathId, Math.max(revision, newest.get(signalPathId) ?? 0));
  }
  const using = revisions.filter((revision) => tablesOn(revision).some((id) => wanted.has(id)));
  const paths = await SignalPath.findAll({ where: { id: [...new Set(using.map((one) => one.signalPathId))] } });
  return using.map((revision) => {
    const path = paths.find(({ id }) => id === revision.signalPathId)!;
    return { path, revision, current: newest.get(path.id) === revision.revision };
  });
}

/** Joins a run to its standing evaluation; a voided run speaks for nothing. */
const STANDING = `FROM sweeps s JOIN evaluations e ON e.id = s.evaluation_id WHERE s.voided_at IS NULL`;
/** Index-friendly first: only runs through these revisions of paths are looked into. */
const ADDED = `s.path_revision_id IN (:revisions)
  AND JSON_CONTAINS(e.inputs, JSON_OBJECT('table', :table, 'applied', TRUE), '$.factorTables')`;
const MEASURED = 'COALESCE(s.measured_at, s.created_at)';

async function runRows(where: string, replacements: Record<string, unknown>, limit: number) {
  const select = <T extends object>(columns: string, tail: string) =>
    database().query<T>(`SELECT ${columns} ${STANDING} AND ${where} ${tail}`, {
      replacements,
      type: QueryTypes.SELECT,
    });
  const [counted] = await select<{ count: number | string }>('COUNT(*) AS count', '');
  const count = Number(counted!.count);
  if (count === 0) return { count, latest: [] };
  const columns = `s.public_id AS id, s.number AS number, ${MEASURED} AS at`;
  const rows = await select<{ id: string; number: string; at: Date | string }>(
    columns,
    `ORDER BY s.id DESC LIMIT ${limit}`,
  );
  const latest = rows.map(({ id, number, at }): RunRow => ({ id, number, measuredAt: new Date(at).toISOString() }));
  return { count, latest };
}

/** Runs whose standing evaluation added a table: how many, and the newest. */
export async function runsWithTable(table: string, limit = LATEST, since: Date | null = null) {
  const revisions = (await pathRevisionsWith([table])).map(({ revision }) => revision.id);
  if (revisions.length === 0) return { count: 0, latest: [] };
  const after = since === null ? '' : ` AND ${MEASURED} >= :since`;
  return runRows(ADDED + after, { revisions, table, ...(since && { since }) }, limit);
}

/** Runs whose standing evaluation was judged against a limit line. */
export async function runsWithLine(line: string) {
  return runRows(`JSON_CONTAINS(e.inputs, JSON_QUOTE(:line), '$.limitLines')`, { line }, LATEST);
}

/** The first instant of a calendar day in a zone, to the quarter of an hour that every zone's offset keeps. */
function startOfDay(day: string, zone: string): Date {
  const utc = Date.parse(`${day}T00:00:00Z`);
  for (let quarters = -60; quarters < 60; quarters++) {
    const at = new Date(utc + quarters * 900_000);
    if (dayIn(zone, at) === day) return at;
  }
  throw new RangeError(`${day} is no day in ${zone}`);
}

/**
 * Runs measured since a day that used a revision older than the newest of its name: what a calibration that was made
 * then, and entered later, leaves to be evaluated again. Null when there are none.
 */
export async function outdatedSince(
  older: readonly FactorTableRevision[],
  sinceDay: string,
  zone: string,
): Promise<OutdatedRuns | null> {
  const since = startOfDay(sinceDay, zone);
  const found: OutdatedRuns = { sinceDay, count: 0, revisions: [], runs: [] };
  const seen = new Set<string>();
  for (const { publicId, name, revision } of older) {
    const { count, latest } = await runsWithTable(publicId, LISTED, since);
    if (count === 0) continue;
    found.revisions.push({ name, revision, count });
    for (const run of latest) if (!seen.has(run.id)) found.runs.push({ ...run, name, revision });
    for (const run of latest) seen.add(run.id);
    found.count += count;
  }
  found.runs = found.runs.sort((a, b) => (a.measuredAt < b.measuredAt ? 1 : -1)).slice(0, LISTED);
  return found.count > 0 ? found : null;
}
