import { closePasswordWorkers } from '@/auth/passwordWorker';
import { Forbidden, NotFound } from '@/errors';
import { verifyChain } from '@/services/audit';
import { listCustody, moveSample } from '@/services/custody';
import { readDay } from '@/services/day';
import { freshDatabase, type TestDatabase } from '../support/database';
import { enterWorld, type World } from '../support/world';

let schema: TestDatabase;
let world: World;

beforeAll(async () => {
  schema = await freshDatabase();
  world = await enterWorld();
}, 120_000);
afterAll(async () => {
  await closePasswordWorkers();
  await schema.close();
});

test('the newest move says where a sample is: in its list, on the day it is booked and to its designer', async () => {
  const { technician, designer, sample } = world;
  expect((await listCustody(technician.actor, sample.id, { limit: 10 })).items).toEqual([]);
  await moveSample(technician.actor, sample.id, { place: 'shelf 2', note: '' });
  await moveSample(technician.actor, sample.id, { place: 'position A', note: 'lid off' });
  const moves = await listCustody(designer.actor, sample.id, { limit: 10 });
  expect(moves.items.map(({ place, note, by }) => [place, note, by])).toEqual([
    ['position A', 'lid off', 'technician'],
    ['shelf 2', '', 'technician'],
  ]);
  const day = await readDay(technician.actor, '2031-01-07');
  expect(day.bookings.find(({ id }) => id === world.booking.id)!.place).toMatchObject({ place: 'position A' });
  expect(await verifyChain(`job-${world.job.id}`)).toBeNull();
});

test('a page holds as many moves as were asked for and names the next', async () => {
  const { technician, other } = world;
  for (const place of ['a', 'b', 'c']) await moveSample(technician.actor, other.id, { place, note: '' });
  const first = await listCustody(technician.actor, other.id, { limit: 2 });
  expect(first.items.map(({ place }) => place)).toEqual(['c', 'b']);
  const second = await listCustody(technician.actor, other.id, { limit: 2, after: first.next! });
  expect(second.items.map(({ place }) => place)).toEqual(['a']);
});

test('a designer moves nothing, and another client’s finds no such sample', async () => {
  const { designer, outsider, sample } = world;
  await expect(moveSample(designer.actor, sample.id, { place: 'home', note: '' })).rejects.toThrow(Forbidden);
  await expect(listCustody(outsider.actor, sample.id, { limit: 10 })).rejects.toThrow(NotFound);
});
