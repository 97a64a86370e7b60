import { SERVER } from '@/auth/actor';
import { closePasswordWorkers } from '@/auth/passwordWorker';
import { bcryptInput } from '@/auth/password';
import { CAP_S, RULES, throttleKey } from '@/auth/throttle';
import { NotFound, Throttled, Unauthenticated } from '@/errors';
import { closeDatabase } from '@/models/database';
import { Session } from '@/models/session';
import { Throttle } from '@/models/throttle';
import { unitOfWork } from '@/models/unitOfWork';
import { User } from '@/models/user';
import { actorOf, endSession, listSessions, signIn, SignInRefused, signOut } from '@/services/sessions';
import { admitAttempt, forgiveAttempt, purgeThrottles } from '@/services/signInAttempts';
import { disableUser, setPassword } from '@/services/users';
import bcrypt from 'bcryptjs';
import { cookieOf, enterLab, PASSWORD, type TestPerson } from '../auth/people';
import { freshDatabase, type TestDatabase } from '../support/database';

const HOME = { address: '192.0.2.10', agent: 'Firefox/140.0' };
const HOUR_MS = 3600_000;
const PAGE = { limit: 50 };

let schema: TestDatabase;
let person: Awaited<ReturnType<typeof enterLab>>['person'];

beforeAll(async () => {
  schema = await freshDatabase();
  ({ person } = await enterLab());
});
afterAll(async () => {
  await closePasswordWorkers();
  await schema.close();
});

const open = async (who: TestPerson, from = HOME) => {
  const { cookie, actor } = await signIn({ email: who.email, password: PASSWORD }, from);
  const headers = new Headers({ cookie: cookieOf(cookie) });
  return { actor, sees: () => actorOf(headers, from.address) };
};
const change = (actor: { via: unknown }, values: Partial<Session>) =>
  unitOfWork(() => Session.update(values, { where: { id: (actor.via as { sessionId: number }).sessionId } }));
const refusal = (attempt: Promise<unknown>) => attempt.then(() => null).catch((error: unknown) => error as Error);
const ago = (milliseconds: number) => new Date(Date.now() - milliseconds);

describe('a session', () => {
  test('opens with e-mail in any case and password, and names its person', async () => {
    const who = await person('technician');
    const { cookie } = await signIn({ email: ` ${who.email.toUpperCase()} `, password: PASSWORD }, HOME);
    const seen = await actorOf(new Headers({ cookie: cookieOf(cookie) }), HOME.address);
    expect(seen).toEqual({ ...who.actor, via: { kind: 'session', sessionId: expect.any(Number), assuranceLevel: 1 } });
  });

  test('is kept as a hash: no column holds what the cookie seals', async () => {
    const { actor } = await open(await person('technician'));
    const { sessionId } = actor.via as { sessionId: number };
    const row = await unitOfWork(() => Session.findByPk(sessionId, { rejectOnEmpty: true }));
    expect(row.tokenHash).toMatch(/^[0-9a-f]{64}$/);
    expect(row.address).toBe(HOME.address);
  });

  test('ends 12 hours after its last use; each use moves that on, and is noted with its address', async () => {
    const { actor, sees } = await open(await person('technician'));
    await change(actor, { lastSeenAt: ago(12 * HOUR_MS - 60_000), address: '192.0.2.99' });
    expect(await sees()).not.toBeNull();
    const { sessionId } = actor.via as { sessionId: number };
    const row = await unitOfWork(() => Session.findByPk(sessionId, { rejectOnEmpty: true }));
    expect(Date.now() - row.lastSeenAt.getTime()).toBeLessThan(10_000);
    expect(row.address).toBe(HOME.address);
    await change(actor, { lastSeenAt: ago(12 * HOUR_MS + 1000) });
    expect(await sees()).toBeNull();
  });

  test('writes its last use at most once a minute', async () => {
    const { actor, sees } = await open(await person('technician'));
    const { sessionId } = actor.via as { sessionId: number };
    const lastSeenAt = ago(50_000);
    await change(actor, { lastSeenAt });
    await sees();
    const row = await unitOfWork(() => Session.findByPk(sessionId, { rejectOnEmpty: true }));
    expect(row.lastSeenAt).toEqual(lastSeenAt);
  });

  test('ends 7 days after signing in however much it is used', async () => {
    const { actor, sees } = await open(await person('technician'));
    const { sessionId } = actor.via as { sessionId: number };
    const row = await unitOfWork(() => Session.findByPk(sessionId, { rejectOnEmpty: true }));
    expect(row.expiresAt.getTime() - row.authenticatedAt.getTime()).toBe(7 * 24 * HOUR_MS);
    await change(actor, { expiresAt: ago(1) });
    expect(await sees()).toBeNull();
  });

  test('is over at once when its person is disabled, and role and organisation are read anew', async () => {
    const who = await person('technician');
    const { sees } = await open(who);
    await unitOfWork(() => User.update({ role: 'manager' }, { where: { publicId: who.publicId } }));
    expect((await sees())?.role).toBe('manager');
    await unitOfWork(() => User.update({ disabledAt: new Date() }, { where: { publicId: who.publicId } }));
    expect(await sees()).toBeNull();
    // Also when the person comes back, unless disabling ended the session; disableUser does.
    await unitOfWork(() => User.update({ disabledAt: null }, { where: { publicId: who.publicId } }));
    expect(await sees()).not.toBeNull();
    await person('manager');
    await disableUser(SERVER, who.publicId);
    await unitOfWork(() => User.update({ disabledAt: null }, { where: { publicId: who.publicId } }));
    expect(await sees()).toBeNull();
  });

  test('is over at once when signed out, ended from another one, or the password changes', async () => {
    const who = await person('technician');
    const [first, second, third] = [await open(who), await open(who), await open(who)];
    await signOut(first.actor);
    expect(await first.sees()).toBeNull();
    const listed = await listSessions(third.actor, PAGE);
    expect(listed.items.map(({ current }) => current)).toEqual([true, false]);
    await endSession(third.actor, listed.items[1]!.id);
    expect(await second.sees()).toBeNull();
    expect((await listSessions(third.actor, PAGE)).items).toHaveLength(1);
    await setPassword(SERVER, who.email, 'another tidal copper mast');
    expect(await third.sees()).toBeNull();
    await expect(signIn({ email: who.email, password: PASSWORD }, HOME)).rejects.toThrow(SignInRefused);
    await signIn({ email: who.email, password: 'another tidal copper mast' }, HOME);
  });

  test('of somebody else cannot be listed or ended, and one that is over is not found', async () => {
    const [mine, theirs] = [await open(await person('manager')), await open(await person('designer'))];
    const { id } = (await listSessions(theirs.actor, PAGE)).items[0]!;
    await expect(endSession(mine.actor, id)).rejects.toThrow(NotFound);
    expect(await theirs.sees()).not.toBeNull();
    await endSession(theirs.actor, id);
    await expect(endSession(theirs.actor, id)).rejects.toThrow(NotFound);
    await expect(listSessions(null, PAGE)).rejects.toThrow(Unauthenticated);
  });

  test('lists are paged newest first', async () => {
    const who = await person('technician');
    const opened = [await open(who), await open(who), await open(who)];
    const first = await listSessions(opened[2]!.actor, { limit: 2 });
    const rest = await listSessions(opened[2]!.actor, { limit: 2, after: first.next! });
    expect([first.items.length, rest.items.length, rest.next]).toEqual([2, 1, null]);
    expect(new Set([...first.items, ...rest.items].map(({ id }) => id)).size).toBe(3);
  });
});

describe('signing in', () => {
  test('says the same and takes as long for an unknown e-mail, a wrong password, a disabled person and no password', async () => {
    const known = await person('technician');
    const disabled = await person('technician');
    await unitOfWork(() => User.update({ disabledAt: new Date() }, { where: { publicId: disabled.publicId } }));
    const unset = await person('technician', { signsIn: false });
    const cases: [string, string, string][] = [
      ['unknown', 'nobody@harrowlane.example', PASSWORD],
      ['password', known.email, 'tidal copper mast 42'],
      ['disabled', disabled.email, PASSWORD],
      ['password', unset.email, PASSWORD],
    ];
    const took: number[] = [];
    const said: unknown[] = [];
    for (const [reason, email, password] of cases) {
      const begun = performance.now();
      const error = await refusal(signIn({ email, password }, { ...HOME, address: '192.0.2.11' }));
      took.push(performance.now() - begun);
      expect(error).toBeInstanceOf(SignInRefused);
      expect((error as SignInRefused).reason).toBe(reason);
      said.push(error!.message);
    }
    expect(new Set(said).size).toBe(1);
    // Each is one bcrypt; a machine that is busy with other things doubles a time, a missing hash is a factor of 30.
    expect(Math.max(...took) / Math.min(...took)).toBeLessThan(8);
  });

  test('takes no other spelling of an e-mail that the database would call equal', async () => {
    const who = await person('technician');
    const accented = who.email.replace('o', '\u00f3');
    expect(await unitOfWork(() => User.count({ where: { email: accented } }))).toBe(1);
    const error = await refusal(signIn({ email: accented, password: PASSWORD }, HOME));
    expect((error as SignInRefused).reason).toBe('unknown');
  });

  test('renews a hash of another cost', async () => {
    const who = await person('technician');
    const cheap = `s1$${bcrypt.hashSync(bcryptInput(PASSWORD), 5)}`;
    await unitOfWork(() => User.update({ passwordHash: cheap }, { where: { publicId: who.publicId } }));
    await open(who);
    const row = await unitOfWork(() => User.findOne({ where: { publicId: who.publicId }, rejectOnEmpty: true }));
    expect(row.passwordHash).toMatch(/^s1\$\$2b\$12\$/);
    await open(who);
  });
});

describe('throttling', () => {
  const failAs = (email: string, address: string) => admitAttempt(email, address, new Date());
  /** Strangers at forty addresses, each trying the moment the wait is over. */
  const besiege = async (email: string) => {
    let at = Date.now();
    for (let i = 0; i < 40; i++) {
      const error = await refusal(admitAttempt(email, `203.0.113.${i}`, new Date(at)));
      if (error instanceof Throttled) at += error.retryAfterS * 1000;
    }
  };
  const failures = async (key: string) => (await unitOfWork(() => Throttle.findByPk(key)))?.failures ?? 0;

  test('counts tries that come at the same moment: one more than the free ones get in, not thirty', async () => {
    const [email, address] = ['rush@harrowlane.example', '198.51.100.1'];
    const tries = await Promise.all(Array.from({ length: 30 }, () => refusal(failAs(email, address))));
    expect(tries.filter((error) => error === null)).toHaveLength(RULES.pair.free + 1);
    expect(tries.filter((error) => error !== null).every((error) => error instanceof Throttled)).toBe(true);
    expect(await failures(throttleKey('pair', email, address))).toBe(RULES.pair.free + 1);
  });

  test('counts one account from thirty addresses at the same moment', async () => {
    const email = 'botnet@harrowlane.example';
    const tries = await Promise.all(
      Array.from({ length: 30 }, (_, i) => refusal(failAs(email, `198.51.100.${100 + i}`))),
    );
    expect(tries.filter((error) => error === null)).toHaveLength(RULES.account.free + 1);
    expect(await failures(throttleKey('account', email))).toBe(RULES.account.free + 1);
  });

  test('counts one address over many accounts', async () => {
    const address = '198.51.100.2';
    for (let i = 0; i <= RULES.address.free; i++) await failAs(`spray${i}@harrowlane.example`, address);
    await expect(failAs('spray-last@harrowlane.example', address)).rejects.toThrow(Throttled);
    await failAs('spray-last@harrowlane.example', '198.51.100.3');
  });

  test('strangers who try for ever keep no owner out who comes from where they signed in before', async () => {
    const who = await person('technician');
    const home = { ...HOME, address: '198.51.100.5' };
    await open(who, home);
    await besiege(who.email);
    const elsewhere = await refusal(
      signIn({ email: who.email, password: PASSWORD }, { ...HOME, address: '203.0.113.200' }),
    );
    expect(elsewhere).toBeInstanceOf(Throttled);
    expect((elsewhere as Throttled).retryAfterS).toBeLessThanOrEqual(CAP_S);
    await open(who, home);
  });

  test('a new password forgets what strangers did', async () => {
    const who = await person('technician');
    await besiege(who.email);
    const away = { ...HOME, address: '203.0.113.201' };
    await expect(signIn({ email: who.email, password: PASSWORD }, away)).rejects.toThrow(Throttled);
    await setPassword(SERVER, who.email, 'another tidal copper mast');
    await signIn({ email: who.email, password: 'another tidal copper mast' }, away);
  });

  test('a right password clears what was held at that address, and costs the account and the address nothing', async () => {
    const who = await person('technician');
    const from = { ...HOME, address: '198.51.100.6' };
    for (let i = 0; i < 3; i++) await failAs(who.email, from.address);
    await open(who, from);
    expect(await failures(throttleKey('pair', who.email, from.address))).toBe(0);
    expect(await failures(throttleKey('account', who.email))).toBe(3);
    expect(await failures(throttleKey('address', from.address))).toBe(3);
    await open(who, from);
    expect(await failures(throttleKey('address', from.address))).toBe(3);
  });

  test('a try that got no answer is not held against anybody', async () => {
    const [email, address] = ['queue@harrowlane.example', '198.51.100.7'];
    for (let i = 0; i < RULES.pair.free; i++) await failAs(email, address);
    const blocked = await failAs(email, address);
    await forgiveAttempt(blocked);
    await failAs(email, address);
    expect(await failures(throttleKey('pair', email, address))).toBe(RULES.pair.free + 1);
  });

  test('rows that say nothing any more are removed', async () => {
    const keyHash = throttleKey('address', 'long ago');
    const lastFailureAt = ago(31 * 24 * HOUR_MS);
    await unitOfWork(() => Throttle.create({ keyHash, failures: 3, lastFailureAt }));
    expect(await purgeThrottles(new Date())).toBe(1);
    expect(await purgeThrottles(new Date())).toBe(0);
  });

  // Last: it takes the modules of the tests above away.
  test('survives a restart of the process', async () => {
    const who = await person('technician');
    const address = '198.51.100.4';
    for (let i = 0; i <= RULES.pair.free + 3; i++) {
      await refusal(failAs(who.email, address));
      const key = throttleKey('pair', who.email, address);
      await unitOfWork(() => Throttle.update({ blockedUntil: null }, { where: { keyHash: key } }));
    }
    await failAs(who.email, address);
    await closeDatabase();
    jest.resetModules();
    const again = await import('@/services/sessions');
    const error = await refusal(again.signIn({ email: who.email, password: PASSWORD }, { ...HOME, address }));
    expect((error as Throttled).kind).toBe('throttled');
    expect((error as Throttled).retryAfterS).toBeGreaterThan(10);
    const { closeDatabase: closeAgain } = await import('@/models/database');
    await closeAgain();
  });
});
