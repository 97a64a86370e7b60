import { dateOf } from '@fixtures/demo/dates';
import { equipment } from '@fixtures/demo/equipment';
import { limitSets } from '@fixtures/demo/limitSets';
import { organisations, users } from '@fixtures/demo/people';
import type { Actor } from '@/auth/actor';
import { SignalPath } from '@/models/signalPath';
import { unitOfWork } from '@/models/unitOfWork';
import type { SweepChoice } from '@/schemas/sweep';
import { createJob } from '@/services/jobs';
import { createProduct } from '@/services/products';
import { createSample } from '@/services/samples';
import { enterPublishedLimits } from '../publishedLimits';
import { seedEquipment, seedPaths } from '../seedBench';
import { seedPeople } from '../seedPeople';

/** A lab with people, a bench and one sample, and how its files are read. */
export interface Lab {
  actor: Actor;
  choice: SweepChoice;
  stateId: string;
}

export async function enterLab(): Promise<Lab> {
  const seedDay = new Date().toISOString().slice(0, 10);
  const at = (day: number) => new Date(`${dateOf(seedDay, day)}T08:00:00Z`);
  return unitOfWork(async () => {
    const people = await seedPeople(organisations, users, at(-400));
    const manager = people.actor('anselm');
    const sets = await enterPublishedLimits(manager, limitSets, at(-399));
    await seedPaths(manager, await seedEquipment(manager, equipment, (day) => dateOf(seedDay, day), at), at);
    const organisationId = people.organisation('pell-orrin').publicId;
    const product = await createProduct(manager, { organisationId, code: 'B-1', name: 'Bench load', description: '' });
    const job = await createJob(manager, { productId: product.id, title: 'bench', decisionRule: 'guarded-by-u' });
    const sample = await createSample(manager, job.id, { serial: '1', firmware: '', description: '' });
    const path = await SignalPath.findOne({ where: { code: 'P-3' }, rejectOnEmpty: true });
    const trace = (index: number, name: string, detector: 'peak' | 'average') =>
      ({ index, name, unit: 'dBuV', detector, rbwHz: 120e3 }) as const;
    return {
      actor: people.actor('mira'),
      stateId: sample.states[0]!.id,
      choice: {
        purpose: 'prescan',
        port: 'enclosure',
        line: null,
        polarisation: 'horizontal',
        distanceM: 3,
        pathId: path.publicId,
        limitSetId: sets.get('cispr32-b-enclosure-3m')!.publicId,
        valuesHold: 'receiver-input',
        alreadyCorrected: [],
        frequencyUnit: 'Hz',
        centreHz: null,
        sweepIndex: 0,
        keepPartial: false,
        traces: [trace(0, 'Peak', 'peak'), trace(1, 'Average', 'average')],
      },
    };
  });
}
