import fc from 'fast-check';
import {
  CAP_S,
  remembered,
  RULES,
  secondsBlocked,
  throttleKey,
  throttleKeys,
  type ThrottleState,
  waitAfter,
  withFailure,
} from '@/auth/throttle';

const START = new Date('2026-12-01T08:00:00Z');
const after = (seconds: number) => new Date(START.getTime() + seconds * 1000);
const fresh = (): ThrottleState => ({ failures: 0, lastFailureAt: START, blockedUntil: null });

test.each([
  [1, 0],
  [5, 0],
  [6, 1],
  [7, 2],
  [8, 4],
  [15, 512],
  [16, CAP_S],
  [1_000_000, CAP_S],
])('failure %i of one account from one address blocks %i s', (failures, seconds) => {
  expect(waitAfter(failures, RULES.pair)).toBe(seconds);
});

test('a failure is forgotten for each quiet quarter of an hour', () => {
  const state = { failures: 7, lastFailureAt: START, blockedUntil: null };
  expect([0, 899, 900, 1800, 7 * 900, 1e6].map((s) => remembered(state, RULES.pair, after(s)))).toEqual([
    7, 7, 6, 5, 0, 0,
  ]);
});

test('property: whatever happened, nobody waits longer than the cap', () => {
  const gaps = fc.array(fc.integer({ min: 0, max: 100_000 }), { maxLength: 200 });
  fc.assert(
    fc.property(gaps, fc.constantFrom(...Object.values(RULES)), (seconds, rule) => {
      let state = fresh();
      let now = 0;
      for (const gap of seconds) {
        now += gap;
        state = withFailure(state, rule, after(now));
        if (secondsBlocked(state, after(now)) > CAP_S) return false;
      }
      return secondsBlocked(state, after(now + CAP_S)) === 0;
    }),
  );
});

test('a clock that was set back does not lengthen a wait', () => {
  const blocked = { failures: 20, lastFailureAt: after(1e6), blockedUntil: after(1e6 + CAP_S) };
  expect(secondsBlocked(blocked, START)).toBe(CAP_S);
  expect(remembered(blocked, RULES.pair, START)).toBe(20);
});

test('someone who tries again the moment a wait is over gets about 110 guesses at an account in a day', () => {
  let state = fresh();
  let tries = 0;
  for (let now = 0; now < 86_400; now += Math.max(1, secondsBlocked(state, after(now)))) {
    state = withFailure(state, RULES.pair, after(now));
    tries++;
  }
  expect(tries).toBeGreaterThan(90);
  expect(tries).toBeLessThan(125);
});

test('a familiar address shares no account-wide count with strangers', () => {
  const of = (familiar: boolean) => throttleKeys('a@lab.example', '192.0.2.1', familiar).map(({ key }) => key);
  const common = of(true).filter((key) => of(false).includes(key));
  expect(common).toEqual([throttleKey('address', '192.0.2.1')]);
});

test('keys name nobody, and parts do not run together', () => {
  expect(throttleKey('pair', 'a@lab.example', '192.0.2.1')).toMatch(/^[0-9a-f]{64}$/);
  expect(throttleKey('pair', 'ab', 'c')).not.toBe(throttleKey('pair', 'a', 'bc'));
});
