import { authorise, type Actor } from '@/auth/actor';
import type { Port } from '@/emc/kinds';
import type { UncertaintyStep } from '@/emc/types';
import { SignalPath } from '@/models/signalPath';
import { unitOfWork } from '@/models/unitOfWork';
import { currentRevisions } from './signalPaths';

/**
 * The expanded prescan uncertainty of the newest path of each port, as steps over frequency: for drawing a guard band
 * before anything is measured. Nothing is judged by it.
 */
export async function prescanUncertainty(actor: Actor | null): Promise<Partial<Record<Port, UncertaintyStep[]>>> {
  authorise(actor, 'limit-set.list');
  return unitOfWork(async () => {
    const paths = await SignalPath.findAll({ order: [['id', 'ASC']], limit: 200 });
    const revisions = await currentRevisions(paths);
    const byPort: Partial<Record<Port, UncertaintyStep[]>> = {};
    for (const path of paths) {
      const revision = revisions.find(({ signalPathId }) => signalPathId === path.id);
      if (revision && revision.uncertainty.prescan.length > 0) byPort[path.port] = revision.uncertainty.prescan;
    }
    return byPort;
  });
}
