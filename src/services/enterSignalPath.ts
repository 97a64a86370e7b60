import { authorise, type Actor } from '@/auth/actor';
import type { Port } from '@/emc/kinds';
import { Invalid } from '@/errors';
import { newPublicId } from '@/models/publicId';
import { SignalPath } from '@/models/signalPath';
import { SignalPathRevision } from '@/models/signalPathRevision';
import type { StoredBudget, StoredPathItem, StoredUncertainty } from '@/models/stored';
import { currentTransaction, unitOfWork } from '@/models/unitOfWork';
import { recordChange } from './audit';
import { refuseItems } from './pathCheck';
import { stepsOf } from './uncertaintyBudget';

export interface NewPathRevision {
  code: string;
  name: string;
  port: Port;
  position: string;
  items: StoredPathItem[];
  /** Stated where there is no budget; with one it is computed from it. */
  uncertainty?: StoredUncertainty;
  budget?: StoredBudget | null;
  uncertaintySource: string;
}

/**
 * Enters the next revision of a path, and the path itself when its code is new. Earlier revisions stay as they are.
 * Throws Invalid as `refuseItems` and `stepsOf` do, and where uncertainty is neither stated nor budgeted.
 */
export async function enterSignalPath(
  actor: Actor | null,
  path: NewPathRevision,
  at = new Date(),
): Promise<SignalPathRevision> {
  authorise(actor, 'path.enter');
  const { code, name, port, position, items, budget = null, uncertaintySource } = path;
  return unitOfWork(async () => {
    await refuseItems(items);
    const row =
      (await SignalPath.findOne({ where: { code } })) ??
      (await SignalPath.create({ publicId: newPublicId(), code, name, port, position, createdAt: at }));
    const uncertainty = budget ? stepsOf(budget, port, row.publicId) : path.uncertainty;
    if (!uncertainty) throw new Invalid([{ pointer: '/uncertainty', message: 'is needed, stated or from a budget' }]);
    const revision = (await SignalPathRevision.count({ where: { signalPathId: row.id } })) + 1;
    if (revision > 1) await row.increment('version');
    const entered = await SignalPathRevision.create({
      publicId: newPublicId(),
      signalPathId: row.id,
      revision,
      items,
      uncertainty,
      uncertaintySource,
      budget,
      userId: actor.userId,
      createdAt: at,
    });
    recordChange(actor, {
      scope: 'lab',
      action: `signal path ${code} revision ${revision} entered`,
      subjectType: 'path',
      subjectId: row.publicId,
      before: null,
      after: { revision: entered.publicId, items, uncertainty, ...(budget && { budget }) },
      at,
    });
    return entered;
  });
}

/**
 * The next revision of every path whose newest one names a table that was replaced (old public id to new): the same
 * items, uncertainty and budget, the new tables. Call inside the unit that enters them.
 */
export async function followTables(
  actor: Actor,
  replaced: ReadonlyMap<string, string>,
  because: string,
  at: Date,
): Promise<{ path: SignalPath; revision: SignalPathRevision }[]> {
  if (replaced.size === 0) return [];
  const lock = currentTransaction().LOCK.UPDATE;
  const followed: { path: SignalPath; revision: SignalPathRevision }[] = [];
  for (const path of await SignalPath.findAll({ order: [['id', 'ASC']], lock })) {
    const newest = await SignalPathRevision.findOne({
      where: { signalPathId: path.id },
      order: [['revision', 'DESC']],
    });
    if (!newest) continue;
    const now = (id: string | null) => (id === null ? null : (replaced.get(id) ?? id));
    const items = newest.items.map((item): StoredPathItem => {
      const { horizontal, vertical, any } = item.tables;
      return { ...item, tables: { horizontal: now(horizontal), vertical: now(vertical), any: now(any) } };
    });
    if (JSON.stringify(items) === JSON.stringify(newest.items)) continue;
    const { uncertainty, uncertaintySource, budget } = newest;
    await path.increment('version');
    const revision = await SignalPathRevision.create({
      publicId: newPublicId(),
      signalPathId: path.id,
      revision: newest.revision + 1,
      items,
      uncertainty,
      uncertaintySource,
      budget,
      reason: because.slice(0, 300),
      userId: actor.userId,
      createdAt: at,
    });
    followed.push({ path, revision });
    recordChange(actor, {
      scope: 'lab',
      action: `signal path ${path.code} revision ${revision.revision} entered: ${because}`.slice(0, 200),
      subjectType: 'path',
      subjectId: path.publicId,
      before: { revision: newest.publicId },
      after: { revision: revision.publicId, items },
      at,
    });
  }
  return followed;
}
