import { Booking } from '@/models/booking';
import { Job } from '@/models/job';
import { ModificationState } from '@/models/modificationState';
import { newPublicId } from '@/models/publicId';
import { Sample } from '@/models/sample';
import { TestPosition } from '@/models/testPosition';
import { unitOfWork } from '@/models/unitOfWork';
import { User } from '@/models/user';
import type { World } from './world';

/**
 * `count` positions, people and samples, each sample in a job of its own: bookings of different samples then share no
 * row but the guards of their position and person.
 */
export async function enterBench(world: World, count: number) {
  return unitOfWork(async () => {
    const job = await Job.findOne({ where: { publicId: world.job.id }, rejectOnEmpty: true });
    const manager = await User.findOne({ where: { publicId: world.manager.actor.publicId }, rejectOnEmpty: true });
    const [positions, people, samples]: string[][] = [[], [], []];
    for (let i = 0; i < count; i++) {
      const mark = newPublicId().slice(0, 5);
      const position = { code: mark, name: `position ${mark}`, description: '', capabilities: [] };
      positions!.push((await TestPosition.create({ publicId: newPublicId(), ...position })).publicId);
      const person = { role: 'technician' as const, name: `Person ${mark}`, email: `${mark}@harrowlane.example` };
      const { organisationId } = manager;
      people!.push((await User.create({ publicId: newPublicId(), organisationId, ...person })).publicId);
      const { productId, title, decisionRule } = job;
      const own = { publicId: newPublicId(), number: `T-${mark}`, organisationId: job.organisationId };
      const { id: jobId } = await Job.create({ ...own, productId, title, decisionRule });
      const named = { code: mark, serial: mark, firmware: '', description: '' };
      const sample = await Sample.create({ publicId: newPublicId(), jobId, ...named });
      const state = { sampleId: sample.id, position: 0, description: 'as received', planned: false };
      await ModificationState.create({ publicId: newPublicId(), ...state });
      samples!.push(sample.publicId);
    }
    return { positions: positions!, people: people!, samples: samples! };
  });
}
export type Bench = Awaited<ReturnType<typeof enterBench>>;

/** Pairs of standing bookings that share a position or a person at some instant; there must be none. */
export async function overlaps(): Promise<string[]> {
  const rows = await unitOfWork(() => Booking.findAll({ where: { state: 'booked' }, order: [['startsAt', 'ASC']] }));
  return rows.flatMap((one, i) =>
    rows
      .slice(i + 1)
      .filter((other) => other.startsAt < one.endsAt && one.startsAt < other.endsAt)
      .filter((other) => other.positionId === one.positionId || other.technicianId === one.technicianId)
      .map((other) => `${one.publicId} and ${other.publicId}`),
  );
}
