import { authorise, type Actor } from '@/auth/actor';
import type { Port } from '@/emc/kinds';
import { newPublicId } from '@/models/publicId';
import { SignalPath } from '@/models/signalPath';
import { SignalPathRevision } from '@/models/signalPathRevision';
import type { StoredPathItem, StoredUncertainty } from '@/models/stored';
import { unitOfWork } from '@/models/unitOfWork';
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
