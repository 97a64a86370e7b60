import fc from 'fast-check';
import { closePasswordWorkers } from '@/auth/passwordWorker';
import { Booking } from '@/models/booking';
import { unitOfWork } from '@/models/unitOfWork';
import { createBooking } from '@/services/bookings';
import { firstGap } from '@/services/bookingSlots';
import { cancelBooking, changeBooking } from '@/services/changeBookings';
import { enterBench, overlaps, type Bench } from '../support/bookingBench';
import { freshDatabase, type TestDatabase } from '../support/database';
import { enterWorld, type World } from '../support/world';

/* Random bookings against the simplest model there is: a list of spans, in which no two may overlap. */

let schema: TestDatabase;
let world: World;
let bench: Bench;
beforeAll(async () => {
  schema = await freshDatabase();
  world = await enterWorld();
  bench = await enterBench(world, 3);
}, 120_000);
afterAll(async () => {
  await closePasswordWorkers();
  await schema.close();
});

const QUARTER_MS = 900_000;
const NOW = new Date('2026-03-20T08:00:00Z');
/** From 27 March 2026 on, so that the night summer time begins lies in the middle. */
const at = (quarter: number) => new Date(Date.UTC(2026, 2, 27) + quarter * QUARTER_MS);

interface Stands {
  id: string;
  version: number;
  position: number;
  person: number;
  from: number;
  to: number;
}
interface Step {
  act: 'book' | 'move' | 'cancel';
  which: number;
  position: number;
  person: number;
  from: number;
  long: number;
}

const step: fc.Arbitrary<Step> = fc.record({
  act: fc.constantFrom('book', 'book', 'book', 'move', 'cancel'),
  which: fc.nat(30),
  position: fc.nat(1),
  person: fc.nat(2),
  from: fc.nat(96 * 4),
  long: fc.oneof(fc.integer({ min: 1, max: 24 }), fc.integer({ min: 24, max: 96 * 2 })),
});

const busy = (standing: Stands[], { position, person, from, long }: Step) =>
  standing.filter(
    (one) => (one.position === position || one.person === person) && one.from < from + long && from < one.to,
  );

/** The first quarter from which position and person are free together, found by trying every one. */
function nextFree(standing: Stands[], wanted: Step): Date {
  for (let from = wanted.from; ; from++) if (busy(standing, { ...wanted, from }).length === 0) return at(from);
}

const said = (instant: Date) =>
  new Intl.DateTimeFormat('en-GB', { timeZone: 'Europe/London', dateStyle: 'medium', timeStyle: 'short' })
    .format(instant)
    .replace(/^0/, '');

test('a booking or a move goes through exactly when the model has room, and a clash names the next free time', async () => {
  await fc.assert(
    fc.asyncProperty(fc.array(step, { minLength: 5, maxLength: 25 }), async (steps) => {
      await unitOfWork(() => Booking.update({ state: 'cancelled' }, { where: {} }));
      let standing: Stands[] = [];
      for (const one of steps) {
        const target = standing[one.which % Math.max(1, standing.length)];
        if (one.act !== 'book' && !target) continue;
        if (one.act === 'cancel') {
          await cancelBooking(world.manager.actor, target!.id, target!.version, { reason: 'model' }, NOW);
          standing = standing.filter(({ id }) => id !== target!.id);
          continue;
        }
        const moving = one.act === 'move' ? target! : null;
        const others = standing.filter((other) => other !== moving);
        const wanted = {
          positionId: bench.positions[one.position]!,
          technicianId: bench.people[one.person]!,
          startsAt: at(one.from).toISOString(),
          endsAt: at(one.from + one.long).toISOString(),
        };
        const body = { ...wanted, sampleId: bench.samples[0]!, stateId: null, work: 'model' };
        const asked = moving
          ? changeBooking(world.manager.actor, moving.id, moving.version, wanted, NOW)
          : createBooking(world.manager.actor, body, NOW);
        const answer = await asked.catch((error: Error & { kind?: string }) => error);
        if (busy(others, one).length > 0) {
          expect(answer).toMatchObject({ kind: 'conflict' });
          const { message } = answer as Error;
          expect(message).toContain(`for as long from ${said(nextFree(others, one))}.`);
          continue;
        }
        expect(answer).toHaveProperty('version');
        const { id, version } = answer as { id: string; version: number };
        const { position, person, from, long } = one;
        standing = [...others, { id, version, position, person, from, to: from + long }];
      }
      expect(await overlaps()).toEqual([]);
      const count = await unitOfWork(() => Booking.count({ where: { state: 'booked' } }));
      expect(count).toBe(standing.length);
    }),
    { numRuns: 15 },
  );
}, 180_000);

test('the first gap is the first that is long enough, never before it is asked for, and null beyond the search', () => {
  const span = fc.tuple(fc.nat(60), fc.integer({ min: 1, max: 12 }));
  fc.assert(
    fc.property(fc.array(span, { maxLength: 12 }), fc.nat(30), fc.integer({ min: 1, max: 10 }), (spans, from, long) => {
      const taken = spans
        .sort((a, b) => a[0] - b[0])
        .map(([start, n]) => ({ startsAt: at(start), endsAt: at(start + n) }));
      let expected: Date | null = null;
      for (let quarter = from; quarter + long <= 50 && !expected; quarter++) {
        const free = taken.every(({ startsAt, endsAt }) => endsAt <= at(quarter) || startsAt >= at(quarter + long));
        if (free) expected = at(quarter);
      }
      expect(firstGap(taken, at(from), long * QUARTER_MS, at(50))).toEqual(expected);
    }),
    { numRuns: 500 },
  );
});
