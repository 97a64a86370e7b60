import { authorise, type Actor } from '@/auth/actor';
import type { Port } from '@/emc/kinds';
import { newPublicId } from '@/models/publicId';
import { SignalPath } from '@/models/signalPath';
import { SignalPathRevision } from '@/models/signalPathRevision';
import type { StoredPathItem, StoredUncertainty } from '@/models/stored';
import { currentTransaction, unitOfWork } from '@/models/unitOfWork';
import { recordChange } from './audit';

export interface NewPathRevision {
  code: string;
  name: string;
  port: Port;
  position: string;
  items: StoredPathItem[];
  uncertainty: StoredUncertainty;
  uncertaintySource: string;
}

/** Enters the next revision of a path, and the path itself when its code is new. Earlier revisions stay as they are. */
export async function enterSignalPath(
  actor: Actor | null,
  path: NewPathRevision,
  at = new Date(),
): Promise<SignalPathRevision> {
  authorise(actor, 'path.enter');
  const { code, name, port, position, items, uncertainty, uncertaintySource } = path;
  return unitOfWork(async () => {
    const row =
      (await SignalPath.findOne({ where: { code } })) ??
      (await SignalPath.create({ publicId: newPublicId(), code, name, port, position, createdAt: at }));
    const revision = (await SignalPathRevision.count({ where: { signalPathId: row.id } })) + 1;
    const entered = await SignalPathRevision.create({
      publicId: newPublicId(),
      signalPathId: row.id,
      revision,
      items,
      uncertainty,
      uncertaintySource,
      createdAt: at,
    });
    recordChange(actor, {
      scope: 'lab',
      action: `signal path ${code} revision ${revision} entered`,
      subjectType: 'path',
      subjectId: row.publicId,
      before: null,
      after: { revision: entered.publicId, items, uncertainty },
      at,
    });
    return entered;
  });
}

/**
 * The next revision of every path whose newest one names a table that was replaced (old public id to new): the same
 * items and uncertainty, the new tables. Call inside the unit that enters them.
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
    const { uncertainty, uncertaintySource } = newest;
    const revision = await SignalPathRevision.create({
      publicId: newPublicId(),
      signalPathId: path.id,
      revision: newest.revision + 1,
      items,
      uncertainty,
      uncertaintySource,
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
