import { readFileSync } from 'node:fs';
import path from 'node:path';
import { SERVER } from '@/auth/actor';
import { closePasswordWorkers } from '@/auth/passwordWorker';
import { Equipment } from '@/models/equipment';
import { unitOfWork } from '@/models/unitOfWork';
import { enterLab } from '@/services/organisations';
import { listPaths } from '@/services/signalPaths';
import { createUser } from '@/services/users';
import { benchFile, enterBench } from '../../src/ops/benchFile';
import { managerActor } from '../../src/ops/managerActor';
import { freshDatabase, type TestDatabase } from '../support/database';

const EXAMPLE = path.resolve(__dirname, '../../fixtures/bench.example.json');
const example = () => benchFile.parse(JSON.parse(readFileSync(EXAMPLE, 'utf8')));
const EMAIL = 'manager@harrowlane.example';

let schema: TestDatabase;
beforeAll(async () => {
  schema = await freshDatabase();
  const lab = await enterLab({ name: 'Harrow Lane EMC Bench', zone: 'Europe/London', jobPrefix: 'HL' });
  const person = { role: 'manager', name: 'Manager', email: EMAIL, password: null } as const;
  await createUser(SERVER, { organisationId: lab.publicId, ...person });
}, 60_000);
afterAll(async () => {
  await closePasswordWorkers();
  await schema.close();
});

const enter = (file = example()) => unitOfWork(async () => enterBench(await managerActor(EMAIL), file));

test('a mistake in the last path leaves nothing entered', async () => {
  const file = example();
  file.paths[0]!.items[0]!.tables.any = 'no such table';
  await expect(enter(file)).rejects.toMatchObject({ issues: [{ pointer: '/paths/0/items/0' }] });
  expect(await unitOfWork(() => Equipment.count())).toBe(0);
});

test('the example is entered whole, and its path adds its one term', async () => {
  await enter();
  const actor = await unitOfWork(() => managerActor(EMAIL));
  const { items } = await listPaths(actor, { limit: 10 });
  expect(items).toMatchObject([{ code: 'P-1', port: 'ac-mains', lowHz: 150e3, terms: [{ id: 'AMN-1', sign: '+' }] }]);
});

test('an item that is there already is refused, and nothing is changed', async () => {
  await expect(enter()).rejects.toThrow('AMN-1 is entered already');
  expect(await unitOfWork(() => Equipment.count())).toBe(2);
});
