import bcrypt from 'bcryptjs';
import fc from 'fast-check';
import { bcryptInput, COST, hashPassword, passwordIssues, verifyPassword } from '@/auth/password';
import { closePasswordWorkers, QUEUE_LIMIT, runBcrypt, WORKERS } from '@/auth/passwordWorker';
import { Throttled } from '@/errors';

afterAll(closePasswordWorkers);

const LONG = 'every sweep of the tall antenna was measured twice before the lab closed for the night ';

test('a stored password is scheme 1 around bcrypt at cost 12, and answers to itself alone', async () => {
  const stored = await hashPassword('tidal copper mast 41');
  expect(stored).toMatch(/^s1\$\$2b\$12\$[./A-Za-z0-9]{53}$/);
  expect(COST).toBeGreaterThanOrEqual(12);
  expect(await verifyPassword('tidal copper mast 41', stored)).toEqual({ ok: true, needsRehash: false });
  expect(await verifyPassword('tidal copper mast 42', stored)).toEqual({ ok: false, needsRehash: false });
});

test('two passphrases that differ only after 72 bytes are two passwords', async () => {
  expect(LONG.length).toBeGreaterThan(72);
  const stored = await hashPassword(`${LONG}a`);
  expect((await verifyPassword(`${LONG}b`, stored)).ok).toBe(false);
  expect((await verifyPassword(`${LONG}a`, stored)).ok).toBe(true);
});

test('property: what bcrypt reads is 64 bytes without NUL and differs whenever the passwords differ', () => {
  const text = fc.string({ unit: 'binary', maxLength: 400 });
  fc.assert(
    fc.property(text, text, (a, b) => {
      const [first, second] = [bcryptInput(a), bcryptInput(b)];
      expect(first).toMatch(/^[A-Za-z0-9+/]{64}$/);
      expect(first === second).toBe(a.normalize('NFKC') === b.normalize('NFKC'));
    }),
  );
});

test('é typed as one character or as two is the same password', async () => {
  const stored = await hashPassword('caf\u00e9 antenna ladder');
  expect((await verifyPassword('cafe\u0301 antenna ladder', stored)).ok).toBe(true);
});

test('a password stored at a lower cost is right and wants a new hash', async () => {
  const stored = `s1$${bcrypt.hashSync(bcryptInput('tidal copper mast 41'), 5)}`;
  expect(await verifyPassword('tidal copper mast 41', stored)).toEqual({ ok: true, needsRehash: true });
});

test.each([null, '', 'tidal copper mast 41', 's9$whatever', bcrypt.hashSync('tidal copper mast 41', 4)])(
  'nothing is right for a stored value of no known scheme: %s',
  async (stored) => {
    expect(await verifyPassword('tidal copper mast 41', stored)).toEqual({ ok: false, needsRehash: false });
  },
);

test('when too many wait the next one is turned away, and those that wait are still answered', async () => {
  const hash = bcrypt.hashSync('x', 4);
  const waiting = Array.from({ length: WORKERS + QUEUE_LIMIT }, () => runBcrypt({ verify: 'x', against: hash }));
  expect(() => runBcrypt({ verify: 'x', against: hash })).toThrow(Throttled);
  expect(await Promise.all(waiting)).toEqual(waiting.map(() => true));
});

test('hashing leaves the event loop free', async () => {
  const begun = performance.now();
  let longest = 0;
  let last = begun;
  const timer = setInterval(() => {
    longest = Math.max(longest, performance.now() - last);
    last = performance.now();
  }, 5);
  await Promise.all([hashPassword('tidal copper mast 41'), hashPassword('tidal copper mast 42')]);
  clearInterval(timer);
  // On the event loop each of the two would be one gap of half the time.
  expect(longest).toBeLessThan(0.4 * (performance.now() - begun));
});

const issuesOf = (password: string, email = 'mira.solt@harrowlane.example') =>
  passwordIssues(password, email).map(({ message }) => message);

test.each([
  ['short one', /at least 12/],
  ['éééééééééé1', /at least 12/],
  ['x'.repeat(1001), /at most 1000/],
  ['password1234', /guessed first/],
  ['P@ssw0rd2026!', /guessed first/],
  ['Stillfield2026', /guessed first/],
  ['stillfield stillfield', /guessed first/],
  ['qwertyuiop12', /guessed first/],
  ['1qaz2wsx3edc', /guessed first/],
  ['123456789012', /guessed first/],
  ['abcabcabcabc', /guessed first/],
  ['correct horse battery staple', /guessed first/],
  ['letmein-letmein', /guessed first/],
  ['Manchester United 1', /guessed first/],
  ['mira.solt tall ladder', /name in the e-mail/],
  ['tall MiraSolt ladder', /name in the e-mail/],
])('refused: %s', (password, why) => {
  const found = issuesOf(password);
  expect(found).toHaveLength(1);
  expect(found[0]).toMatch(why);
});

test.each([
  'harbour kettle ninety',
  'tidal-copper-mast-41',
  'xK9#mQ2$vL7p',
  '83920475610392-summer',
  'qwerty-lantern-ocean-88',
  'blauer stuhl regen',
  'deepest swimming otter',
  'стол окно дождь река',
])('allowed: %s', (password) => {
  expect(issuesOf(password)).toEqual([]);
});
