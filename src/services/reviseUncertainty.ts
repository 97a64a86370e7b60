import type { z } from 'zod';
import { authorise, type Actor } from '@/auth/actor';
import { NotFound } from '@/errors';
import { newPublicId } from '@/models/publicId';
import { SignalPath } from '@/models/signalPath';
import { SignalPathRevision } from '@/models/signalPathRevision';
import { unitOfWork } from '@/models/unitOfWork';
import type { PathRecord, reviseUncertaintyBody } from '@/schemas/paths';
import { recordChange } from './audit';
import { readPath } from './pathRecord';
import { stepsOf } from './uncertaintyBudget';
import { changeVersioned } from './versions';

/**
 * The next revision of a path: the same items and tables, its uncertainty computed from a new budget. What was judged
 * with an earlier revision keeps it. Throws Invalid as `stepsOf` does.
 */
export async function reviseUncertainty(
  actor: Actor | null,
  publicId: string,
  version: number,
  { budget, uncertaintySource, reason }: z.infer<typeof reviseUncertaintyBody>,
  at = new Date(),
): Promise<PathRecord> {
  authorise(actor, 'path.enter');
  return unitOfWork(async () => {
    const path = await SignalPath.findOne({ where: { publicId } });
    if (!path) throw new NotFound('signal path');
    const uncertainty = stepsOf(budget, path.port, path.publicId);
    // Takes the row, so that the revision before is the newest until the commit.
    await changeVersioned(SignalPath, path, version, {}, 'signal path');
    const before = await SignalPathRevision.findOne({
      where: { signalPathId: path.id },
      order: [['revision', 'DESC']],
      rejectOnEmpty: true,
    });
    const entered = await SignalPathRevision.create({
      publicId: newPublicId(),
      signalPathId: path.id,
      revision: before.revision + 1,
      items: before.items,
      uncertainty,
      uncertaintySource,
      budget,
      reason,
      userId: actor.userId,
      createdAt: at,
    });
    recordChange(actor, {
      scope: 'lab',
      action: `uncertainty of signal path ${path.code} revised in revision ${entered.revision}`,
      subjectType: 'path',
      subjectId: path.publicId,
      before: { revision: before.publicId, uncertainty: before.uncertainty },
      after: { revision: entered.publicId, uncertainty, budget, uncertaintySource, reason },
      at,
    });
    return readPath(actor, publicId);
  });
}
