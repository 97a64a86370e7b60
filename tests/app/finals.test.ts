import { POST as preview } from '@/app/api/finals/preview/route';
import { POST as keep } from '@/app/api/finals/route';
import { closePasswordWorkers } from '@/auth/passwordWorker';
import type { RouteHandler } from '@/http/handle';
import { Sweep } from '@/models/sweep';
import { SweepFile } from '@/models/sweepFile';
import { unitOfWork } from '@/models/unitOfWork';
import type { FinalsKept } from '@/schemas/finals';
import { keepSweep } from '@/services/keepSweep';
import { listRetests } from '@/services/retests';
import { createSample } from '@/services/samples';
import { createSweepFile } from '@/services/sweepFiles';
import { freshDatabase, type TestDatabase } from '../support/database';
import { enterWorld, sweepFile, type World } from '../support/world';

const ORIGIN = 'http://localhost:3000';
let schema: TestDatabase;
let world: World;
let stateId = '';
let retestId = '';

/** Readings of −14 dB correction against 40 dBµV/m: 52 dBµV is 2 under, which a prescan with U of 6 dB leaves open. */
beforeAll(async () => {
  schema = await freshDatabase();
  world = await enterWorld();
  const { actor } = world.technician;
  const sample = await createSample(actor, world.job.id, { serial: 'F-1', firmware: '', description: '' });
  stateId = sample.states[0]!.id;
  const file = await createSweepFile(actor, sweepFile({ 144: 52 }));
  await keepSweep(actor, { ...world.choice, ...world.about, stateId, fileId: file.id });
  retestId = (await listRetests(actor, { limit: 1, sampleId: sample.id })).items[0]!.id;
}, 120_000);
afterAll(async () => {
  await closePasswordWorkers();
  await schema.close();
});

const typed = (level: number) => ({
  ...{ stateId, port: 'enclosure', polarisation: 'horizontal', distanceM: 3, heightSwept: true },
  ...{ pathId: world.choice.pathId, limitSetId: world.choice.limitSetId, operatingMode: 'full light' },
  ...{ valuesHold: 'receiver-input', unit: 'dBuV' },
  finals: [{ retestIds: [retestId], frequencyHz: 144e6, rbwHz: 120e3, readings: [{ detector: 'quasi-peak', level }] }],
});

async function ask(handler: RouteHandler, body: unknown, key?: string): Promise<Response> {
  const headers = new Headers({ origin: ORIGIN, cookie: world.technician.cookie, 'content-type': 'application/json' });
  if (key) headers.set('idempotency-key', key);
  return handler(new Request(`${ORIGIN}/x`, { method: 'POST', headers, body: JSON.stringify(body) }));
}
const counted = () => unitOfWork(async () => [await Sweep.unscoped().count(), await SweepFile.count()] as const);

test('pressed twice, at once and again later, they are kept once; another reading under the same key is refused', async () => {
  const [runs, files] = await counted();
  const key = 'finals-0001';
  const answers = await Promise.all([ask(keep, typed(47), key), ask(keep, typed(47), key)]);
  answers.push(await ask(keep, typed(47), key));
  const replies = (await Promise.all(answers.map((answer) => answer.json()))) as FinalsKept[];
  expect(answers.map(({ status }) => status)).toEqual([201, 201, 201]);
  expect(new Set(replies.map((reply) => reply.runs[0]!.id)).size).toBe(1);
  expect(replies[0]!.retests).toMatchObject([{ id: retestId, status: 'cleared' }]);
  expect(await counted()).toEqual([runs + 1, files + 1]);
  expect((await ask(keep, typed(48), key)).status).toBe(409);
  expect(await counted()).toEqual([runs + 1, files + 1]);
});

test('what is no reading is refused with its place, and nothing is left of it', async () => {
  const before = await counted();
  const body = { ...typed(47), finals: [{ ...typed(47).finals[0], readings: [{ detector: 'quasi-peak', level: 900 }], heightM: 12 }] }; // prettier-ignore
  for (const handler of [keep, preview]) {
    const answer = await ask(handler, body);
    const { errors } = (await answer.json()) as { errors: { pointer: string }[] };
    expect([answer.status, errors.map(({ pointer }) => pointer)]).toEqual([
      400,
      ['/finals/0/readings/0/level', '/finals/0/heightM'],
    ]);
  }
  const other = await ask(keep, { ...typed(47), pathId: 'x'.repeat(16) });
  expect([other.status, JSON.stringify(await other.json())]).toEqual([400, expect.stringContaining('/pathId')]);
  expect(await counted()).toEqual(before);
});
