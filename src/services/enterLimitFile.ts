import type { z } from 'zod';
import { authorise, type Actor } from '@/auth/actor';
import type { Port } from '@/emc/kinds';
import { Conflict, Invalid, Unreadable, type Issue } from '@/errors';
import { IngestError } from '@/ingest/ingestError';
import { LimitLineRevision } from '@/models/limitLineRevision';
import { LimitSet } from '@/models/limitSet';
import { newPublicId } from '@/models/publicId';
import { currentTransaction, unitOfWork } from '@/models/unitOfWork';
import type { createLimitSet as createLimitSetOperation, LimitSetView } from '@/schemas/bench';
import type { EnteredLimitLine, enterLimitLineBody } from '@/schemas/tables';
import { recordChange } from './audit';
import { enterLimitLine } from './enterLimits';
import { readLimitFile, revisedLine, revisionsOf, segmentsOf, type LimitFile } from './limitLineFile';
import { lineSummary, setRefOf, setsNaming } from './limitLines';
import { readLimitSet } from './limitSets';
import { runsWithLine } from './tableUse';

type Body = z.infer<typeof enterLimitLineBody>;

/**
 * Enters a held file as a new limit line or as the next revision of one. Sets that were chosen get their next revision
 * with it and the older ones leave the choice for new runs; runs keep the set they were judged by.
 * @throws {Conflict} when the line has got another revision since the preview
 */
export async function enterLimitLineFile(actor: Actor | null, body: Body, at = new Date()): Promise<EnteredLimitLine> {
  authorise(actor, 'limit.enter');
  return unitOfWork(async () => {
    const before = await revisedLine(body.revises);
    // Whoever revises a line holds its first revision, so that two never make the same next one.
    const lock = currentTransaction().LOCK.UPDATE;
    if (before) await LimitLineRevision.findOne({ where: { lineKey: before.lineKey, revision: 1 }, lock });
    const earlier = before ? await revisionsOf(before.lineKey) : [];
    if (before && earlier[0]!.id !== before.id) {
      const now = `is at revision ${earlier[0]!.revision} now`;
      throw new Conflict(`${before.name} ${now}, otherwise than in the preview. Look at the difference again.`);
    }
    const file = await readHeld(body.fileId);
    const segments = asChosen(file, body);
    const { name, document, port, detector, bandwidthHz, unit, distanceM, source, basis, reason } = body;
    refuseOtherLine(body, before);
    const key = before?.lineKey ?? (await freeKey(body));
    const described = {
      name,
      document,
      class: body.class,
      port,
      detector,
      bandwidthHz,
      unit,
      distanceM,
      source,
      basis,
    };
    const { name: fileName, sha256: fileSha256 } = file.upload;
    const row = await enterLimitLine(actor, { key, ...described, segments, reason, fileName, fileSha256 }, at);
    const older = earlier.map(({ publicId }) => publicId);
    const naming = older.length > 0 ? await setsNaming(older, { withdrawnAt: null }) : [];
    const unknown = body.setIds.findIndex((id) => !naming.some(({ publicId }) => publicId === id));
    if (unknown >= 0) {
      throw new Invalid([{ pointer: `/setIds/${unknown}`, message: 'is no set in use that names this line' }]);
    }
    const chosen = naming.filter(({ publicId }) => body.setIds.includes(publicId));
    const followed: LimitSet[] = [];
    for (const set of chosen) {
      const ids = set.lineRevisionIds.map((id) => (older.includes(id) ? row.publicId : id));
      followed.push(await reviseSet(actor, set, { lineRevisionIds: [...new Set(ids)] }, reason, at));
    }
    const counts = await Promise.all(older.map(async (id) => (await runsWithLine(id)).count));
    return {
      line: lineSummary(await row.reload({ include: ['user'] }), true),
      sets: followed.map(setRefOf),
      left: naming.filter((set) => !chosen.includes(set)).map(setRefOf),
      runs: counts.reduce((sum, one) => sum + one, 0),
    };
  });
}

async function readHeld(fileId: string): Promise<LimitFile> {
  try {
    return await readLimitFile(fileId);
  } catch (error) {
    throw unreadable(error);
  }
}

function unreadable(error: unknown): unknown {
  return error instanceof IngestError ? new Unreadable(error.message, error.line, error.found, error.expected) : error;
}

/** The segments as chosen; what nobody has answered is named, each in its field. */
function asChosen({ table }: LimitFile, body: Body) {
  if (table.unit !== null && table.unit !== body.unit) {
    throw new Invalid([{ pointer: '/unit', message: `is ${table.unit} in the file (${table.unitEvidence})` }]);
  }
  try {
    return segmentsOf(table, body);
  } catch (error) {
    if (error instanceof IngestError && error.found === 'no frequency unit') {
      throw new Invalid([{ pointer: '/frequencyUnit', message: 'is needed: no line of the file states it' }]);
    }
    if (error instanceof IngestError && error.found === 'no rule between two limits') {
      throw new Invalid([
        { pointer: '/between', message: 'is needed: nothing says how the line runs between two limits' },
      ]);
    }
    throw unreadable(error);
  }
}

/** A revision corrects figures, source or words of the same line; another detector, unit or distance is another line. */
function refuseOtherLine(body: Body, before: LimitLineRevision | null): void {
  if (!before) return;
  const issues = (['detector', 'bandwidthHz', 'unit', 'distanceM'] as const).flatMap((field): Issue[] => {
    if (body[field] === before[field]) return [];
    const was = before[field] ?? 'without one';
    return [
      { pointer: `/${field}`, message: `is ${was} in revision ${before.revision}; another is a line of its own` },
    ];
  });
  if (issues.length > 0) throw new Invalid(issues);
}

/** A key from the line's own words that no line has yet: `cispr-32-b-enclosure-qp-3m`. */
async function freeKey(body: Body): Promise<string> {
  const marks = { 'quasi-peak': 'qp', average: 'av', peak: 'pk' };
  const distance = body.distanceM === null ? '' : `${body.distanceM}m`;
  const words = [body.document, body.class, body.port, marks[body.detector], distance].join(' ');
  const slug = words
    .normalize('NFKD')
    .toLowerCase()
    .replace(/[^a-z0-9]+/g, '-')
    .replace(/^-|-$/g, '')
    .slice(0, 52);
  for (let n = 1; ; n++) {
    const key = n === 1 ? slug || 'line' : `${slug || 'line'}-${n}`;
    if ((await LimitLineRevision.count({ where: { lineKey: key } })) === 0) return key;
  }
}

/** The next revision of a set; the older one leaves the choice for new runs. */
async function reviseSet(
  actor: Actor,
  set: LimitSet,
  changed: Partial<Pick<LimitSet, 'lineRevisionIds' | 'port' | 'distanceM'>>,
  reason: string,
  at: Date,
): Promise<LimitSet> {
  const row = await LimitSet.findByPk(set.id, { lock: currentTransaction().LOCK.UPDATE, rejectOnEmpty: true });
  if (row.withdrawnAt !== null) throw new Conflict(`${row.name} has another revision by now. Load the page again.`);
  await LimitSet.update({ withdrawnAt: at }, { where: { id: row.id } });
  const { name, port, distanceM, lineRevisionIds } = row;
  const next = { name, port, distanceM, lineRevisionIds, ...changed };
  const created = await LimitSet.create({
    publicId: newPublicId(),
    ...next,
    revision: row.revision + 1,
    createdAt: at,
  });
  recordChange(actor, {
    scope: 'lab',
    action: `limit set ${name} revision ${created.revision} entered`,
    subjectType: 'limit-set',
    subjectId: created.publicId,
    before: { revision: row.publicId, lineRevisionIds },
    after: { ...next, reason },
    at,
  });
  return created;
}

type SetBody = z.infer<NonNullable<(typeof createLimitSetOperation)['body']>>;

/** A set of newest lines, under a new name or as the next revision of a set in use. */
export async function createLimitSet(actor: Actor | null, body: SetBody, at = new Date()): Promise<LimitSetView> {
  authorise(actor, 'limit.enter');
  return unitOfWork(async () => {
    const lineRevisionIds = await linesForSet(body);
    const { name, port, distanceM, reason } = body;
    if (body.revises !== null) {
      const set = await LimitSet.findOne({ where: { publicId: body.revises, withdrawnAt: null } });
      if (!set) throw new Invalid([{ pointer: '/revises', message: 'is no limit set in use' }]);
      if (set.name !== name) throw new Invalid([{ pointer: '/name', message: `is ${set.name}, as before` }]);
      const revised = await reviseSet(actor, set, { lineRevisionIds, port, distanceM }, reason, at);
      return readLimitSet(actor, revised.publicId);
    }
    if ((await LimitSet.count({ where: { name } })) > 0) {
      throw new Invalid([{ pointer: '/name', message: 'is taken; revise that set, or give this one another name' }]);
    }
    const row = await LimitSet.create({ publicId: newPublicId(), name, port, distanceM, revision: 1, lineRevisionIds, createdAt: at }); // prettier-ignore
    recordChange(actor, {
      scope: 'lab',
      action: `limit set ${name} entered`,
      subjectType: 'limit-set',
      subjectId: row.publicId,
      before: null,
      after: { name, port, distanceM, lineRevisionIds, reason },
      at,
    });
    return readLimitSet(actor, row.publicId);
  });
}

/** Checks that lines can stand in one set: newest revisions, each once, of the set's distance and of its port's units. */
async function linesForSet({ lineIds, distanceM, port }: SetBody): Promise<string[]> {
  const rows = await LimitLineRevision.findAll({ where: { publicId: lineIds } });
  const issues: Issue[] = [];
  const units = unitsOf(port);
  for (const [i, id] of lineIds.entries()) {
    const say = (message: string) => issues.push({ pointer: `/lineIds/${i}`, message });
    const row = rows.find(({ publicId }) => publicId === id);
    if (!row) {
      say('is not a limit line of this lab');
      continue;
    }
    const newest = await LimitLineRevision.max<number, LimitLineRevision>('revision', {
      where: { lineKey: row.lineKey },
    });
    if (newest !== row.revision) say(`is revision ${row.revision} of ${row.name}; the newest is ${newest}`);
    if (lineIds.indexOf(id) !== i) say('is named twice');
    if (row.distanceM !== distanceM) say(`is for ${row.distanceM === null ? 'no distance' : `${row.distanceM} m`}`);
    if (!units.includes(row.unit)) say(`is in ${row.unit}, which is not measured at this port`);
  }
  if (issues.length > 0) throw new Invalid(issues);
  return lineIds;
}

function unitsOf(port: Port): string[] {
  return port === 'enclosure' ? ['dBuV/m', 'dBuA/m', 'dBpW', 'dBuA'] : ['dBuV', 'dBuA', 'dBpW'];
}
