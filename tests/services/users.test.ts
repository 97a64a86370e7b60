import { SERVER } from '@/auth/actor';
import { closePasswordWorkers } from '@/auth/passwordWorker';
import { Conflict, Forbidden, type Invalid, NotFound, Unauthenticated } from '@/errors';
import { AuditEntry } from '@/models/auditEntry';
import { unitOfWork } from '@/models/unitOfWork';
import { User } from '@/models/user';
import { verifyChain } from '@/services/audit';
import { enterClient } from '@/services/organisations';
import { createUser, disableUser, type NewUser, setPassword } from '@/services/users';
import { enterLab, PASSWORD, type TestPerson } from '../auth/people';
import { freshDatabase, type TestDatabase } from '../support/database';

let schema: TestDatabase;
let lab: Awaited<ReturnType<typeof enterLab>>;
let manager: TestPerson;
let entry: NewUser;

beforeAll(async () => {
  schema = await freshDatabase();
  lab = await enterLab();
  manager = await lab.person('manager', { signsIn: false });
  const organisationId = lab.lab.publicId;
  entry = { organisationId, role: 'technician', name: 'Mira Solt', email: 'mira@harrowlane.example', password: null };
});
afterAll(async () => {
  await closePasswordWorkers();
  await schema.close();
});

const rowOf = (publicId: string) => unitOfWork(() => User.findOne({ where: { publicId }, rejectOnEmpty: true }));
const entriesOf = (subjectId: string) => unitOfWork(() => AuditEntry.findAll({ where: { subjectId }, order: ['seq'] }));
const pointersOf = (attempt: Promise<unknown>) =>
  attempt.then(() => []).catch((error: Invalid) => error.issues.map(({ pointer }) => pointer));

test('a person is entered in lower case, hashed, and recorded without name, e-mail or password', async () => {
  const { publicId } = await createUser(manager.actor, {
    ...entry,
    email: ' Mira.Solt@HarrowLane.example ',
    password: PASSWORD,
  });
  const row = await rowOf(publicId);
  expect(row.email).toBe('mira.solt@harrowlane.example');
  expect(row.passwordHash).toMatch(/^s1\$/);
  const [audit] = await entriesOf(publicId);
  expect([audit!.scope, audit!.action, audit!.actorId]).toEqual(['lab', 'person entered', manager.actor.userId]);
  expect(audit!.canonical).toContain('technician');
  for (const secret of ['mira', 'Mira', 'Solt', PASSWORD, row.passwordHash!]) {
    expect(audit!.canonical).not.toContain(secret);
  }
});

test('only a manager at a browser enters, changes or disables people', async () => {
  const token = { kind: 'token', scopes: ['read', 'upload'] } as const;
  const others = [
    (await lab.person('technician', { signsIn: false })).actor,
    (await lab.person('designer', { signsIn: false })).actor,
    { ...manager.actor, via: token },
  ];
  for (const actor of others) {
    await expect(createUser(actor, entry)).rejects.toThrow(Forbidden);
    await expect(setPassword(actor, manager.email, PASSWORD)).rejects.toThrow(Forbidden);
    await expect(disableUser(actor, manager.email)).rejects.toThrow(Forbidden);
  }
});

test('nobody is not the server', async () => {
  await expect(createUser(null, entry)).rejects.toThrow(Unauthenticated);
  await expect(setPassword(null, manager.email, PASSWORD)).rejects.toThrow(Unauthenticated);
  await expect(disableUser(null, manager.email)).rejects.toThrow(Unauthenticated);
  await expect(enterClient(null, 'Tidewater Pumps')).rejects.toThrow(Unauthenticated);
  const { publicId } = await enterClient(SERVER, 'Tidewater Pumps');
  expect((await entriesOf(publicId)).map(({ actorId }) => actorId)).toEqual([null]);
});

test('every wrong entry is named at once', async () => {
  const wrong = {
    organisationId: '0000000000000000',
    role: 'manager',
    name: ' ',
    email: 'x',
    password: 'short',
  } as const;
  expect(await pointersOf(createUser(manager.actor, wrong))).toEqual([
    '/name',
    '/email',
    '/organisationId',
    '/password',
  ]);
});

test('the lab’s roles are for the lab, a designer is a client’s', async () => {
  const client = lab.client.publicId;
  expect(await pointersOf(createUser(SERVER, { ...entry, organisationId: client }))).toEqual(['/role']);
  expect(await pointersOf(createUser(SERVER, { ...entry, role: 'designer' }))).toEqual(['/role']);
});

test('an e-mail belongs to one person, however many enter it at once and in whatever case', async () => {
  const email = 'twice@harrowlane.example';
  const tries = [email, email.toUpperCase(), ` ${email}`].map((e) => createUser(SERVER, { ...entry, email: e }));
  const done = await Promise.allSettled(tries);
  const refused = done.filter((result) => result.status === 'rejected').map(({ reason }) => reason as Invalid);
  expect(refused).toHaveLength(2);
  for (const { issues } of refused) expect(issues).toEqual([{ pointer: '/email', message: expect.any(String) }]);
});

test('a new password is judged, replaces the old one, and is recorded without it', async () => {
  const who = await lab.person('technician');
  const before = await rowOf(who.publicId);
  expect(await pointersOf(setPassword(SERVER, who.email, 'password1234'))).toEqual(['/password']);
  expect((await rowOf(who.publicId)).passwordHash).toBe(before.passwordHash);
  await setPassword(manager.actor, who.publicId, 'another tidal copper mast');
  const after = await rowOf(who.publicId);
  expect(after.passwordHash).not.toBe(before.passwordHash);
  expect(after.version).toBe(before.version + 1);
  const audit = (await entriesOf(who.publicId)).at(-1)!;
  expect(audit.action).toBe('password set');
  expect(audit.canonical).not.toContain('s1$');
  await expect(setPassword(SERVER, 'nobody@harrowlane.example', PASSWORD)).rejects.toThrow(NotFound);
});

test('the last manager cannot be disabled; of two that disable each other at once, one remains', async () => {
  await expect(disableUser(manager.actor, manager.publicId)).rejects.toThrow(Conflict);
  const second = await lab.person('manager', { signsIn: false });
  const both = await Promise.allSettled([
    disableUser(manager.actor, second.publicId),
    disableUser(second.actor, manager.publicId),
  ]);
  expect(both.map(({ status }) => status).sort()).toEqual(['fulfilled', 'rejected']);
  const left = await unitOfWork(() => User.count({ where: { role: 'manager', disabledAt: null } }));
  expect(left).toBe(1);
});

test('disabling twice is recorded once, and the chain holds', async () => {
  const who = await lab.person('technician', { signsIn: false });
  await disableUser(SERVER, who.publicId);
  await disableUser(SERVER, who.publicId);
  const actions = (await entriesOf(who.publicId)).map(({ action }) => action);
  expect(actions).toEqual(['person entered', 'person disabled']);
  expect(await verifyChain('lab')).toBeNull();
});
