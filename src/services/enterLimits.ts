import { authorise, type Actor } from '@/auth/actor';
import type { Port } from '@/emc/kinds';
import type { LimitLine } from '@/emc/types';
import { Invalid } from '@/errors';
import { LimitLineRevision } from '@/models/limitLineRevision';
import { LimitSet } from '@/models/limitSet';
import { newPublicId } from '@/models/publicId';
import { unitOfWork } from '@/models/unitOfWork';
import { recordChange } from './audit';

export interface NewLimitLine extends Omit<LimitLine, 'id'> {
  /** Stable over revisions, e.g. `cispr32-b-ce-qp`. */
  key: string;
  document: string;
  class: string;
  port: string;
  source: string;
  basis: string;
  /** Where it came from a file by hand: why it was entered, and the file. */
  reason?: string;
  fileName?: string;
  fileSha256?: string;
}

/** Enters a limit line as the next revision of its key; earlier ones stay, and so does what was judged by them. */
export async function enterLimitLine(
  actor: Actor | null,
  line: NewLimitLine,
  at = new Date(),
): Promise<LimitLineRevision> {
  authorise(actor, 'limit.enter');
  const { key, segments, ...rest } = line;
  return unitOfWork(async () => {
    const revision = (await LimitLineRevision.count({ where: { lineKey: key } })) + 1;
    const row = await LimitLineRevision.create({
      publicId: newPublicId(),
      lineKey: key,
      revision,
      ...rest,
      segments: [...segments],
      userId: actor.userId,
      createdAt: at,
    });
    recordChange(actor, {
      scope: 'lab',
      action: `limit line ${key} revision ${revision} entered`,
      subjectType: 'limit-line',
      subjectId: row.publicId,
      before: null,
      after: { ...rest, segments },
      at,
    });
    return row;
  });
}

export interface NewLimitSet {
  name: string;
  port: Port;
  distanceM: number | null;
  lines: LimitLineRevision[];
}

export async function enterLimitSet(actor: Actor | null, set: NewLimitSet, at = new Date()): Promise<LimitSet> {
  authorise(actor, 'limit.enter');
  if (set.lines.length === 0) throw new Invalid([{ pointer: '/lines', message: 'names at least one limit line' }]);
  const { name, port, distanceM } = set;
  return unitOfWork(async () => {
    const revision = (await LimitSet.count({ where: { name } })) + 1;
    const lineRevisionIds = set.lines.map((line) => line.publicId);
    const row = await LimitSet.create({
      publicId: newPublicId(),
      name,
      port,
      distanceM,
      revision,
      lineRevisionIds,
      createdAt: at,
    });
    recordChange(actor, {
      scope: 'lab',
      action: `limit set ${name} entered`,
      subjectType: 'limit-set',
      subjectId: row.publicId,
      before: null,
      after: { name, port, distanceM, lineRevisionIds },
      at,
    });
    return row;
  });
}
