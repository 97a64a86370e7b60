import { closePasswordWorkers } from '@/auth/passwordWorker';
import { oneTimeToken, oneTimeTokenHash } from '@/auth/oneTimeToken';
import { CAP_S, RULES } from '@/auth/throttle';
import { Conflict, Invalid, Throttled } from '@/errors';
import { AuditEntry } from '@/models/auditEntry';
import { OneTimeLink } from '@/models/oneTimeLink';
import { OutboxMessage } from '@/models/outboxMessage';
import { unitOfWork } from '@/models/unitOfWork';
import { User } from '@/models/user';
import { SERVER } from '@/auth/actor';
import { verifyChain } from '@/services/audit';
import { acceptInvitation } from '@/services/invitations';
import { LINK_MS, ownerOfLink, sendLink } from '@/services/oneTimeLinks';
import { ANSWER_MS, readLink, requestPasswordReset, resetPassword } from '@/services/passwordReset';
import { actorOf, signIn } from '@/services/sessions';
import { admitAttempt } from '@/services/signInAttempts';
import { disableUser } from '@/services/users';
import { cookieOf, enterLab, PASSWORD, type TestPerson } from '../auth/people';
import { freshDatabase, type TestDatabase } from '../support/database';

const HOME = { address: '192.0.2.10', agent: 'Firefox/140.0' };
const NEW = 'another tidal copper mast';

let schema: TestDatabase;
let person: Awaited<ReturnType<typeof enterLab>>['person'];
let count = 0;

beforeAll(async () => {
  schema = await freshDatabase();
  ({ person } = await enterLab());
  await person('manager');
});
afterAll(async () => {
  await closePasswordWorkers();
  await schema.close();
});

/** Each request from an address of its own, so that the throttles of one test are not another's. */
const elsewhere = () => `198.51.100.${(count += 1)}`;
const ask = (email: string, address = elsewhere()) => requestPasswordReset(email, address);
const linksOf = (who: TestPerson) =>
  unitOfWork(() => OneTimeLink.findAll({ where: { userId: who.actor.userId }, order: ['id'] }));
const tokenOf = async (who: TestPerson) => {
  const link = (await linksOf(who)).at(-1)!;
  return oneTimeToken(link.kind, link.publicId);
};
const queued = () => unitOfWork(() => OutboxMessage.count({ where: { kind: 'mail-reset' } }));

test('asking makes one link of 30 minutes and queues one e-mail that names it and holds no token', async () => {
  const who = await person('technician');
  expect(await ask(` ${who.email.toUpperCase()} `)).toBe(who.publicId);
  const [link] = await linksOf(who);
  expect(link!.expiresAt.getTime() - link!.createdAt.getTime()).toBe(LINK_MS.reset);
  expect(LINK_MS.reset).toBe(30 * 60_000);
  const mail = await unitOfWork(() => OutboxMessage.findByPk(link!.outboxId!, { rejectOnEmpty: true }));
  expect([mail.kind, mail.state, mail.payload]).toEqual(['mail-reset', 'queued', { link: link!.publicId }]);
  const token = oneTimeToken('reset', link!.publicId);
  expect(token).toMatch(/^[\w-]{43}$/);
  expect(link!.tokenHash).toBe(oneTimeTokenHash(token));
  expect(JSON.stringify([link, mail])).not.toContain(token);
});

test('nobody, a disabled person and a look-alike address are not written to', async () => {
  const disabled = await person('technician');
  await disableUser(SERVER, disabled.publicId);
  const accented = await person('technician');
  const before = await queued();
  expect(await ask('nobody@harrowlane.example')).toBeNull();
  expect(await ask(disabled.email)).toBeNull();
  // the column's collation takes é for e
  expect(await ask(accented.email.replace('e', 'é'))).toBeNull();
  expect(await queued()).toBe(before);
});

test('a known and an unknown address are answered after the same fixed time', async () => {
  const known = await person('technician');
  const took = async (email: string) => {
    const begun = performance.now();
    await ask(email).catch(() => null);
    return performance.now() - begun;
  };
  await took('warm.up@harrowlane.example');
  const times = { known: [] as number[], unknown: [] as number[] };
  for (let round = 0; round < 6; round += 1) {
    times.known.push(await took(round < RULES['reset-account'].free ? known.email : (await person('designer')).email));
    times.unknown.push(await took(`nobody${round}@harrowlane.example`));
  }
  const median = (list: number[]) => [...list].sort((a, b) => a - b)[Math.floor(list.length / 2)]!;
  for (const list of Object.values(times)) expect(Math.min(...list)).toBeGreaterThanOrEqual(ANSWER_MS - 2);
  expect(Math.abs(median(times.known) - median(times.unknown))).toBeLessThan(40);
}, 60_000);

test('asking is throttled per account and per address, whether or not the account exists', async () => {
  const address = elsewhere();
  for (const email of ['nobody.at.all@harrowlane.example', (await person('technician')).email]) {
    for (let free = 0; free < RULES['reset-account'].free; free += 1) await ask(email);
    await ask(email);
    const refused = await ask(email).catch((error: unknown) => error as Throttled);
    expect(refused).toBeInstanceOf(Throttled);
    expect((refused as Throttled).retryAfterS).toBeLessThanOrEqual(CAP_S);
  }
  const flood: unknown[] = [];
  await Promise.all(
    Array.from({ length: RULES['reset-address'].free + 6 }, (_, index) =>
      ask(`many${index}@harrowlane.example`, address).catch((error: unknown) => flood.push(error)),
    ),
  );
  expect(flood.length).toBeGreaterThan(0);
  for (const error of flood) expect(error).toBeInstanceOf(Throttled);
}, 60_000);

test('asking again ends the earlier link', async () => {
  const who = await person('technician');
  await ask(who.email);
  const first = await tokenOf(who);
  await ask(who.email);
  await expect(resetPassword(first, NEW)).rejects.toThrow(Conflict);
  expect(await resetPassword(await tokenOf(who), NEW)).toBe(who.publicId);
});

test('a link tells whose it is, and nothing once it opens nothing', async () => {
  const who = await person('designer');
  await ask(who.email);
  const token = await tokenOf(who);
  expect(await readLink('reset', token)).toMatchObject({
    email: who.email,
    role: 'designer',
    organisation: 'Lumenwright',
  });
  await expect(readLink('invitation', token)).rejects.toThrow(Conflict);
  await expect(readLink('reset', 'x'.repeat(43))).rejects.toThrow(Conflict);
});

test('a used link sets the password, ends every session and link, forgets failures, and is recorded without a secret', async () => {
  const who = await person('technician');
  const { cookie } = await signIn({ email: who.email, password: PASSWORD }, HOME);
  const sees = () => actorOf(new Headers({ cookie: cookieOf(cookie) }), HOME.address);
  expect(await sees()).not.toBeNull();
  const strangers = Array.from({ length: RULES.account.free + 1 }, (_, at) => `203.0.113.${at}`);
  for (const address of strangers) await admitAttempt(who.email, address, new Date()).catch(() => null);
  await expect(admitAttempt(who.email, '203.0.113.200', new Date())).rejects.toThrow(Throttled);
  await ask(who.email);
  const token = await tokenOf(who);
  await resetPassword(token, NEW);
  expect(await sees()).toBeNull();
  expect((await linksOf(who)).every(({ usedAt, endedAt }) => usedAt || endedAt)).toBe(true);
  await signIn({ email: who.email, password: NEW }, { ...HOME, address: '203.0.113.201' });
  await expect(signIn({ email: who.email, password: PASSWORD }, HOME)).rejects.toThrow();
  await expect(resetPassword(token, 'a third tidal copper mast')).rejects.toThrow(Conflict);
  const entries = await unitOfWork(() => AuditEntry.findAll({ where: { subjectId: who.publicId }, order: ['seq'] }));
  const entry = entries.at(-1)!;
  expect([entry.action, entry.actorId]).toEqual(['password set by e-mailed link', who.actor.userId]);
  for (const secret of [token, oneTimeTokenHash(token), NEW, 's1$', who.email])
    expect(entry.canonical).not.toContain(secret);
  expect(await verifyChain('lab')).toBeNull();
});

test('of two that use a link at once, one wins', async () => {
  const who = await person('technician');
  await ask(who.email);
  const token = await tokenOf(who);
  const passwords = ['first of the two masts', 'second of the two masts'];
  const done = await Promise.allSettled(passwords.map((password) => resetPassword(token, password)));
  expect(done.map(({ status }) => status).sort()).toEqual(['fulfilled', 'rejected']);
  const lost = done.find((result): result is PromiseRejectedResult => result.status === 'rejected')!;
  expect(lost.reason).toBeInstanceOf(Conflict);
  const winner = passwords[done.findIndex(({ status }) => status === 'fulfilled')]!;
  await signIn({ email: who.email, password: winner }, HOME);
});

test('a password that may not be used leaves the link as it was', async () => {
  const who = await person('technician');
  await ask(who.email);
  const token = await tokenOf(who);
  await expect(resetPassword(token, 'short')).rejects.toThrow(Invalid);
  await expect(resetPassword(token, `${who.email.split('@')[0]} and so on and on`)).rejects.toThrow(Invalid);
  await resetPassword(token, NEW);
});

test('a link that has run out, of somebody disabled since, or of the other kind opens nothing', async () => {
  const who = await person('technician');
  await ask(who.email);
  const token = await tokenOf(who);
  const [link] = await linksOf(who);
  const late = new Date(link!.expiresAt.getTime() + 1);
  await unitOfWork(() => ownerOfLink('reset', token, new Date(late.getTime() - 2)));
  await expect(unitOfWork(() => ownerOfLink('reset', token, late))).rejects.toThrow(Conflict);
  await expect(acceptInvitation({ token, password: NEW }, HOME)).rejects.toThrow(Conflict);
  await disableUser(SERVER, who.publicId);
  await unitOfWork(() => User.update({ disabledAt: null }, { where: { publicId: who.publicId } }));
  // disabling ended it, so coming back does not revive it
  await expect(resetPassword(token, NEW)).rejects.toThrow(Conflict);
});

test('the token is another one for each kind, link and secret', async () => {
  const who = await person('technician');
  await unitOfWork(() => sendLink('reset', who.actor.userId, new Date()));
  const [link] = await linksOf(who);
  const tokens = [
    oneTimeToken('reset', link!.publicId),
    oneTimeToken('invitation', link!.publicId),
    oneTimeToken('reset', '0'.repeat(16)),
  ];
  expect(new Set(tokens).size).toBe(3);
});
