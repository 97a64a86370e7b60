import { verifyPassword } from '@/auth/password';
import { closePasswordWorkers } from '@/auth/passwordWorker';
import { AuditEntry } from '@/models/auditEntry';
import { unitOfWork } from '@/models/unitOfWork';
import { User } from '@/models/user';
import { main as clientAdd } from '@/ops/commands/client-add';
import { main as labCreate } from '@/ops/commands/lab-create';
import { main as userAdd } from '@/ops/commands/user-add';
import { main as userDisable } from '@/ops/commands/user-disable';
import { main as userPassword } from '@/ops/commands/user-password';
import { freshDatabase, type TestDatabase } from '../support/database';

let schema: TestDatabase;
const said: string[] = [];

beforeAll(async () => {
  schema = await freshDatabase();
  jest.spyOn(process.stdout, 'write').mockImplementation((text) => said.push(String(text)) > 0);
  jest.spyOn(process.stderr, 'write').mockImplementation(() => true);
});
afterAll(async () => {
  jest.restoreAllMocks();
  await closePasswordWorkers();
  await schema.close();
});

const person = (email: string) => unitOfWork(() => User.findOne({ where: { email }, rejectOnEmpty: true }));

test('the commands set up a lab and its people, and the record names the server, not a person', async () => {
  await labCreate(['Harrow Lane EMC Bench', 'Europe/London', 'HL']);
  await clientAdd(['Tidewater Pumps']);
  const email = 'dora@tidewater.example';
  await userAdd(['boss@harrowlane.example', 'Boss', 'manager', 'Harrow Lane EMC Bench', '--generate']);
  await userAdd([email, 'Dora', 'designer', 'Tidewater Pumps', '--generate']);
  await userPassword([email, '--generate']);
  const password = said.at(-1)!.trim();
  expect(await verifyPassword(password, (await person(email)).passwordHash)).toMatchObject({ ok: true });
  await userDisable([email]);
  expect((await person(email)).disabledAt).not.toBeNull();
  const entries = await unitOfWork(() => AuditEntry.findAll({ order: ['seq'] }));
  expect(entries.map(({ action }) => action)).toEqual([
    'lab Harrow Lane EMC Bench entered',
    'client Tidewater Pumps entered',
    'person entered',
    'person entered',
    'password set',
    'person disabled',
  ]);
  expect(new Set(entries.map(({ actorId }) => actorId))).toEqual(new Set([null]));
});
