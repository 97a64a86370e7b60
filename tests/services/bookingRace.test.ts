import type { ChildProcess } from 'node:child_process';
import { closePasswordWorkers } from '@/auth/passwordWorker';
import type { Outcome, Told } from '../support/bookingProcess';
import { enterBench, overlaps, type Bench } from '../support/bookingBench';
import { freshDatabase, type TestDatabase } from '../support/database';
import { startEntry } from '../support/server';
import { enterWorld, type World } from '../support/world';

/* Bookings asked for at the same moment by two processes, each with a pool of its own: the database decides. */

const AT_ONCE = 20;
let schema: TestDatabase;
let world: World;
let bench: Bench;
let processes: ChildProcess[];

const heard = <T>(child: ChildProcess) =>
  new Promise<T>((resolve) => child.once('message', (said) => resolve(said as T)));

beforeAll(async () => {
  schema = await freshDatabase();
  world = await enterWorld();
  bench = await enterBench(world, AT_ONCE);
  processes = [0, 1].map(() => startEntry('tests/support/bookingProcess.ts', [], {}).process);
  await Promise.all(processes.map((child) => heard(child)));
}, 120_000);
afterAll(async () => {
  for (const child of processes) child.send('end');
  await closePasswordWorkers();
  await schema.close();
});

type Body = Told['bodies'][number];

/** Half of the bodies in each process, all at the same time. */
async function race(bodies: Body[]): Promise<Outcome[]> {
  const answers = processes.map((child) => heard<Outcome[]>(child));
  processes.forEach((child, i) => {
    const told: Told = { actor: world.manager.actor, bodies: bodies.filter((_, at) => at % processes.length === i) };
    child.send(told);
  });
  return (await Promise.all(answers)).flat();
}

const span = (day: number, from = '09:00', to = '11:00') => ({
  startsAt: `2032-03-${String(day).padStart(2, '0')}T${from}:00Z`,
  endsAt: `2032-03-${String(day).padStart(2, '0')}T${to}:00Z`,
});
const body = (i: number, more: Partial<Body>): Body => ({
  positionId: bench.positions[i]!,
  technicianId: bench.people[i]!,
  sampleId: bench.samples[i]!,
  stateId: null,
  work: `race ${i}`,
  ...span(1),
  ...more,
});
const each = (more: (i: number) => Partial<Body>) => Array.from({ length: AT_ONCE }, (_, i) => body(i, more(i)));
const tally = (outcomes: Outcome[]) => ({
  won: outcomes.filter(({ won }) => won !== null).length,
  others: [...new Set(outcomes.flatMap(({ won, kind }) => (won ? [] : [kind])))],
});

test.each([2, 3, 4])(
  '20 at once for one position on a new day (%i March): one wins, 19 are a clash in words',
  async (day) => {
    const outcomes = await race(each(() => ({ positionId: bench.positions[0]!, ...span(day) })));
    expect(tally(outcomes)).toEqual({ won: 1, others: ['conflict'] });
    const winner = outcomes.find(({ won }) => won)!.won!;
    for (const { won, message } of outcomes) {
      if (!won) expect(message).toContain(`is taken ${day} Mar 2032, 09:00 to 11:00 by LD-40 (${winner.sample.code})`);
    }
  },
  60_000,
);

test.each([5, 6, 7])(
  '20 at once for one person on a new day (%i March): one wins',
  async (day) => {
    const outcomes = await race(each(() => ({ technicianId: bench.people[0]!, ...span(day) })));
    expect(tally(outcomes)).toEqual({ won: 1, others: ['conflict'] });
  },
  60_000,
);

test('20 at once that share nothing all win, and so do neighbours that touch', async () => {
  expect(tally(await race(each(() => span(8))))).toEqual({ won: AT_ONCE, others: [] });
  const quarters = each((i) => {
    const at = (quarter: number) => new Date(Date.UTC(2032, 2, 9, 8) + quarter * 900_000).toISOString();
    return { positionId: bench.positions[0]!, technicianId: bench.people[0]!, startsAt: at(i), endsAt: at(i + 1) };
  });
  expect(tally(await race(quarters))).toEqual({ won: AT_ONCE, others: [] });
}, 60_000);

test('20 at once that all fail on their busy person, at a position nobody booked that day, are all a clash', async () => {
  await race(each(() => span(10)));
  const outcomes = await race(
    each((i) => ({ positionId: world.position.id, technicianId: bench.people[i]!, ...span(10) })),
  );
  expect(tally(outcomes)).toEqual({ won: 0, others: ['conflict'] });
}, 60_000);

test('five rounds of 20 long bookings at random over three positions and three people leave no overlap', async () => {
  // A linear congruential generator (Numerical Recipes constants): a failure can be repeated.
  let seed = 26;
  const random = (below: number) => {
    seed = (Math.imul(seed, 1664525) + 1013904223) >>> 0;
    return seed % below;
  };
  let won = 0;
  for (let round = 0; round < 5; round++) {
    const outcomes = await race(
      each(() => {
        const from = Date.UTC(2032, 3, 1) + random(96 * 20) * 900_000;
        return {
          positionId: bench.positions[random(3)]!,
          technicianId: bench.people[random(3)]!,
          startsAt: new Date(from).toISOString(),
          endsAt: new Date(from + (1 + random(96 * 4)) * 900_000).toISOString(),
        };
      }),
    );
    expect(outcomes.filter((one) => !one.won && one.kind !== 'conflict')).toEqual([]);
    won += tally(outcomes).won;
  }
  expect(won).toBeGreaterThan(5);
  expect(await overlaps()).toEqual([]);
}, 120_000);
