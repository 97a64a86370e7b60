import { closePasswordWorkers } from '@/auth/passwordWorker';
import { RULES, throttleKey } from '@/auth/throttle';
import { oneTimeToken } from '@/auth/oneTimeToken';
import { Conflict, Forbidden, Invalid, NotFound, StaleVersion, Throttled, Unauthenticated } from '@/errors';
import { AuditEntry } from '@/models/auditEntry';
import { OneTimeLink } from '@/models/oneTimeLink';
import { Organisation } from '@/models/organisation';
import { OutboxMessage } from '@/models/outboxMessage';
import { Throttle } from '@/models/throttle';
import { unitOfWork } from '@/models/unitOfWork';
import { User } from '@/models/user';
import type { PersonView } from '@/schemas/people';
import { verifyChain } from '@/services/audit';
import { acceptInvitation, composeInvitationMail } from '@/services/invitations';
import { changeOwnPassword } from '@/services/ownPassword';
import * as people from '@/services/people';
import { actorOf, signIn } from '@/services/sessions';
import { requestPasswordReset, resetPassword } from '@/services/passwordReset';
import { admitAttempt } from '@/services/signInAttempts';
import { cookieOf, enterLab, PASSWORD, type TestPerson } from '../auth/people';
import { freshDatabase, type TestDatabase } from '../support/database';

const HOME = { address: '192.0.2.10', agent: 'Firefox/140.0' };
const NEW = 'another tidal copper mast';

let schema: TestDatabase;
let lab: Awaited<ReturnType<typeof enterLab>>;
let manager: TestPerson;
let count = 0;

beforeAll(async () => {
  schema = await freshDatabase();
  lab = await enterLab();
  manager = await lab.person('manager');
});
afterAll(async () => {
  await closePasswordWorkers();
  await schema.close();
});

const entry = () => {
  count += 1;
  return { name: `Odo Fenn ${count}`, email: `odo${count}@lumenwright.example`, role: 'designer' as const };
};
const invite = () => people.invitePerson(manager.actor, { ...entry(), organisationId: lab.client.publicId });
const linkOf = ({ id }: PersonView) =>
  unitOfWork(async () => {
    const user = await User.findOne({ where: { publicId: id }, rejectOnEmpty: true });
    return OneTimeLink.findOne({ where: { userId: user.id }, order: [['id', 'DESC']], rejectOnEmpty: true });
  });
const tokenOf = async (person: PersonView) => oneTimeToken('invitation', (await linkOf(person)).publicId);
const issuesOf = (attempt: Promise<unknown>) =>
  attempt.then(
    () => [],
    (error: Invalid) => error.issues.map(({ pointer }) => pointer),
  );

test('an invitation enters the person without a password, with a link of 7 days and its e-mail, in one', async () => {
  const person = await invite();
  expect(person).toMatchObject({ state: 'invited', lastSignInAt: null, role: 'designer' });
  expect(person.invitation).toMatchObject({ open: true, mail: { state: 'queued', attempts: 0, reason: null } });
  const link = await linkOf(person);
  expect(link.expiresAt.getTime() - link.createdAt.getTime()).toBe(7 * 24 * 3600_000);
  const mail = await composeInvitationMail({ link: link.publicId });
  expect(mail.to).toEqual({ name: person.name, address: person.email });
  expect(mail.text).toContain(`http://localhost:3000/invitation#${await tokenOf(person)}\n`);
  expect(mail.text).toContain('Lumenwright');
});

test('a new client is entered with its first designer, or not at all', async () => {
  const person = await people.invitePerson(manager.actor, { ...entry(), newClient: 'Kettle & Vane' });
  expect(person.organisation.name).toBe('Kettle & Vane');
  const before = await unitOfWork(() => Organisation.count());
  const taken = { ...entry(), email: person.email, newClient: 'Never Entered' };
  expect(await issuesOf(people.invitePerson(manager.actor, taken))).toEqual(['/email']);
  expect(await issuesOf(people.invitePerson(manager.actor, { ...entry(), newClient: 'kettle & VANE' }))).toEqual([
    '/newClient',
  ]);
  expect(
    await issuesOf(people.invitePerson(manager.actor, { ...entry(), role: 'manager', newClient: 'Another' })),
  ).toEqual(['/role']);
  expect(
    await issuesOf(people.invitePerson(manager.actor, { ...entry(), organisationId: '0000000000000000' })),
  ).toEqual(['/organisationId']);
  expect(await issuesOf(people.invitePerson(manager.actor, { ...entry(), organisationId: lab.lab.publicId }))).toEqual([
    '/role',
  ]);
  expect(await unitOfWork(() => Organisation.count())).toBe(before);
});

test('accepting it sets the password and signs in; it works once, and the sign-in shows', async () => {
  const person = await invite();
  const token = await tokenOf(person);
  await expect(acceptInvitation({ token, password: 'short' }, HOME)).rejects.toThrow(Invalid);
  const { actor, cookie } = await acceptInvitation({ token, password: NEW }, HOME);
  expect(actor).toMatchObject({ publicId: person.id, role: 'designer' });
  expect(await actorOf(new Headers({ cookie: cookieOf(cookie) }), HOME.address)).toMatchObject({ publicId: person.id });
  await expect(acceptInvitation({ token, password: NEW }, HOME)).rejects.toThrow(Conflict);
  const after = await people.readPerson(manager.actor, person.id);
  expect(after).toMatchObject({ state: 'active', invitation: null, lastSignInAt: expect.any(String) });
  await expect(people.inviteAgain(manager.actor, person.id)).rejects.toThrow(/has a password/);
});

test('of two that accept at once, one is signed in', async () => {
  const token = await tokenOf(await invite());
  const both = await Promise.allSettled([1, 2].map((n) => acceptInvitation({ token, password: `${NEW} ${n}` }, HOME)));
  expect(both.map(({ status }) => status).sort()).toEqual(['fulfilled', 'rejected']);
});

test('inviting again ends the link before; an accepted reset ends an open invitation', async () => {
  const person = await invite();
  const first = await tokenOf(person);
  const again = await people.inviteAgain(manager.actor, person.id);
  expect(again.invitation).toMatchObject({ open: true });
  await expect(acceptInvitation({ token: first, password: NEW }, HOME)).rejects.toThrow(Conflict);
  const second = await tokenOf(person);
  await requestPasswordReset(person.email, '198.51.100.9');
  await resetPassword(oneTimeToken('reset', (await linkOf(person)).publicId), NEW);
  await expect(acceptInvitation({ token: second, password: NEW }, HOME)).rejects.toThrow(Conflict);
});

test('what became of the e-mail stands with the person', async () => {
  const person = await invite();
  const { outboxId } = await linkOf(person);
  const set = (values: Partial<OutboxMessage>) =>
    unitOfWork(() => OutboxMessage.update(values, { where: { id: outboxId! } }));
  await set({ state: 'refused', attempts: 1, lastError: '550 no such mailbox', doneAt: new Date() });
  const { invitation } = await people.readPerson(manager.actor, person.id);
  expect(invitation!.mail).toMatchObject({ state: 'refused', reason: '550 no such mailbox' });
});

test('names and roles change on the version that was read; the trail repeats no name', async () => {
  const who = await lab.person('technician');
  const person = await people.readPerson(manager.actor, who.publicId);
  const renamed = await people.changePerson(manager.actor, person.id, person.version, { name: 'Mira Solt-Vane' });
  expect(renamed).toMatchObject({ name: 'Mira Solt-Vane', version: person.version + 1 });
  await expect(people.changePerson(manager.actor, person.id, person.version, { role: 'manager' })).rejects.toThrow(
    StaleVersion,
  );
  const promoted = await people.changePerson(manager.actor, person.id, renamed.version, { role: 'manager' });
  expect(promoted.role).toBe('manager');
  expect(await issuesOf(people.changePerson(manager.actor, person.id, promoted.version, { role: 'designer' }))).toEqual(
    ['/role'],
  );
  const entries = await unitOfWork(() => AuditEntry.findAll({ where: { subjectId: person.id }, order: ['seq'] }));
  expect(entries.map(({ action }) => action)).toEqual([
    'person entered',
    'name of a person corrected',
    'role changed to manager',
  ]);
  for (const { canonical } of entries) expect(canonical).not.toMatch(/Mira|Solt|@/);
  expect(await verifyChain('lab')).toBeNull();
  await people.changePerson(manager.actor, person.id, promoted.version, { role: 'technician' });
});

test('disabling with a reason ends sessions and links at once; enabling lets the old password in again', async () => {
  const who = await lab.person('technician');
  const { cookie } = await signIn({ email: who.email, password: PASSWORD }, HOME);
  const person = await people.readPerson(manager.actor, who.publicId);
  const out = await people.disablePerson(manager.actor, person.id, person.version, 'left the lab');
  expect(out).toMatchObject({ state: 'disabled', disabledReason: 'left the lab', disabledAt: expect.any(String) });
  expect(await actorOf(new Headers({ cookie: cookieOf(cookie) }), HOME.address)).toBeNull();
  await expect(people.disablePerson(manager.actor, person.id, out.version, 'again')).rejects.toThrow(Conflict);
  const back = await people.enablePerson(manager.actor, person.id, out.version, 'came back');
  expect(back).toMatchObject({ state: 'active', disabledReason: null });
  await signIn({ email: who.email, password: PASSWORD }, HOME);
  await expect(people.enablePerson(manager.actor, person.id, back.version, 'twice')).rejects.toThrow(Conflict);
});

test('nobody disables themself, and the lab keeps a manager who can sign in', async () => {
  const own = await people.readPerson(manager.actor, manager.publicId);
  await expect(people.disablePerson(manager.actor, own.id, own.version, 'x')).rejects.toThrow(/Another manager/);
  await expect(people.changePerson(manager.actor, own.id, own.version, { role: 'technician' })).rejects.toThrow(
    /only manager/,
  );
  // a manager who has never accepted the invitation cannot be the last one
  const body = { name: 'New Manager', email: 'new.manager@harrowlane.example', role: 'manager' as const };
  const invited = await people.invitePerson(manager.actor, { ...body, organisationId: lab.lab.publicId });
  await expect(people.changePerson(manager.actor, own.id, own.version, { role: 'technician' })).rejects.toThrow(
    /only manager/,
  );
  await people.disablePerson(manager.actor, invited.id, invited.version, 'a test');
});

test('of two managers that demote each other at once, one remains', async () => {
  const second = await lab.person('manager');
  const versions = await Promise.all(
    [manager, second].map(({ publicId }) => people.readPerson(manager.actor, publicId)),
  );
  const both = await Promise.allSettled([
    people.changePerson(manager.actor, second.publicId, versions[1]!.version, { role: 'technician' }),
    people.changePerson(second.actor, manager.publicId, versions[0]!.version, { role: 'technician' }),
  ]);
  expect(both.map(({ status }) => status).sort()).toEqual(['fulfilled', 'rejected']);
  expect(await unitOfWork(() => User.count({ where: { role: 'manager', disabledAt: null } }))).toBe(1);
  await unitOfWork(() => User.update({ role: 'manager' }, { where: { publicId: manager.publicId } }));
});

test('only a manager at a browser sees or changes people', async () => {
  const [technician, designer] = [await lab.person('technician'), await lab.person('designer')];
  const token = { ...manager.actor, via: { kind: 'token', scopes: ['read', 'upload'] } as const };
  const { id, version } = await invite();
  for (const actor of [technician.actor, designer.actor, token]) {
    await expect(people.listPeople(actor, { limit: 10 })).rejects.toThrow(Forbidden);
    await expect(people.readPerson(actor, id)).rejects.toThrow(Forbidden);
    await expect(people.invitePerson(actor, { ...entry(), organisationId: lab.client.publicId })).rejects.toThrow(
      Forbidden,
    );
    await expect(people.inviteAgain(actor, id)).rejects.toThrow(Forbidden);
    await expect(people.changePerson(actor, id, version, { name: 'x' })).rejects.toThrow(Forbidden);
    await expect(people.disablePerson(actor, id, version, 'x')).rejects.toThrow(Forbidden);
    await expect(people.enablePerson(actor, id, version, 'x')).rejects.toThrow(Forbidden);
  }
  await expect(people.listPeople(null, { limit: 10 })).rejects.toThrow(Unauthenticated);
});

test('the list pages newest first and is of one organisation where asked', async () => {
  const all: PersonView[] = [];
  for (let after: string | undefined; ;) {
    const page = await people.listPeople(manager.actor, { limit: 4, after });
    all.push(...page.items);
    if (page.next === null) break;
    after = page.next;
  }
  expect(all).toHaveLength(await unitOfWork(() => User.count()));
  expect(new Set(all.map(({ id }) => id)).size).toBe(all.length);
  const { items } = await people.listPeople(manager.actor, { limit: 200, organisationId: lab.lab.publicId });
  expect(items.map(({ id }) => id)).toEqual(
    all.filter(({ organisation }) => organisation.id === lab.lab.publicId).map(({ id }) => id),
  );
  await expect(people.listPeople(manager.actor, { limit: 4, organisationId: '0000000000000000' })).rejects.toThrow(
    NotFound,
  );
});

describe('one’s own password', () => {
  test('changes with the old one, keeps this session and ends the others', async () => {
    const who = await lab.person('designer');
    const [here, there] = await Promise.all([1, 2].map(() => signIn({ email: who.email, password: PASSWORD }, HOME)));
    await changeOwnPassword(here!.actor, { current: PASSWORD, password: NEW }, HOME.address);
    const sees = (cookie: string) => actorOf(new Headers({ cookie: cookieOf(cookie) }), HOME.address);
    expect(await sees(here!.cookie)).not.toBeNull();
    expect(await sees(there!.cookie)).toBeNull();
    await signIn({ email: who.email, password: NEW }, HOME);
    const entries = await unitOfWork(() => AuditEntry.findAll({ where: { subjectId: who.publicId } }));
    expect(entries.map(({ action }) => action)).toContain('own password changed');
    for (const { canonical } of entries) expect(canonical).not.toMatch(/copper|s1\$/);
  });

  test('needs the old one, another new one, and counts wrong tries like a sign-in', async () => {
    const who = await lab.person('designer');
    const change = (current: string, password: string, address = '203.0.113.77') =>
      changeOwnPassword(who.actor, { current, password }, address);
    expect(await issuesOf(change('not my password', NEW))).toEqual(['/current']);
    expect(await issuesOf(change(PASSWORD, PASSWORD))).toEqual(['/password']);
    expect(await issuesOf(change(PASSWORD, 'short'))).toEqual(['/password']);
    const wrong = await lab.person('designer');
    const failures = async () =>
      (await unitOfWork(() => Throttle.findByPk(throttleKey('pair', wrong.email, HOME.address))))?.failures ?? 0;
    const tryIt = () => changeOwnPassword(wrong.actor, { current: 'still wrong', password: NEW }, HOME.address);
    expect(await issuesOf(tryIt())).toEqual(['/current']);
    expect(await failures()).toBe(1);
    // the sign-in's own counter: tries there and here are added up, and the next one waits
    const soon = new Date(Date.now() + 1000);
    for (let at = 0; at < RULES.pair.free; at += 1) await admitAttempt(wrong.email, HOME.address, soon);
    await unitOfWork(() =>
      Throttle.update(
        { blockedUntil: new Date(Date.now() + 60_000) },
        { where: { keyHash: throttleKey('pair', wrong.email, HOME.address) } },
      ),
    );
    await expect(tryIt()).rejects.toThrow(Throttled);
    expect(await failures()).toBe(RULES.pair.free + 1);
    await expect(changeOwnPassword(null, { current: PASSWORD, password: NEW }, HOME.address)).rejects.toThrow(
      Unauthenticated,
    );
  });
});
