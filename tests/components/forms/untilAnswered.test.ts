import {
  fieldErrorsOf,
  OFFLINE,
  problemOf,
  retryAfterOf,
  UNREACHABLE,
  waitingFor,
  type Problem,
} from '@/components/forms/problem';
import { send } from '@/components/forms/send';
import { untilAnswered } from '@/components/forms/untilAnswered';

const refused = (status: number, more: Partial<Problem> = {}) => ({
  ok: false as const,
  problem: { ...UNREACHABLE, status, ...more },
});
const done = { ok: true as const };
type Answer = ReturnType<typeof refused> | typeof done;
const waits = [1, 1, 1];

/** Answers these one after another, the last for ever. */
function answers<A>(...list: A[]) {
  let asked = 0;
  return { send: async () => list[Math.min(asked++, list.length - 1)]!, asked: () => asked };
}

describe('what is sent again by itself', () => {
  test.each([
    ['no answer', refused(0)],
    ['a proxy without a server', refused(502)],
    ['a database that is gone', refused(503)],
    ['a proxy that gave up', refused(504)],
  ])('%s, where a repeat is done once', async (_what, first) => {
    const { send: ask, asked } = answers<typeof first | typeof done>(first, first, done);
    expect(await untilAnswered(ask, { once: true, waits })).toEqual(done);
    expect(asked()).toBe(3);
  });

  test.each([
    ['a refusal', { once: true }, refused(400)],
    ['a conflict', { once: true }, refused(409)],
    ['a fault of the server', { once: true }, refused(500)],
    ['being signed out', { once: true }, refused(401)],
    ['too many tries at the door', { once: true }, refused(429)],
    ['no answer to what might be done twice', { once: false }, refused(0)],
    ['a database that went during such a thing', { once: true }, refused(503, { type: '/problems/unavailable' })],
  ])('not %s', async (_what, patience, first) => {
    const { send: ask, asked } = answers<typeof first | typeof done>(first, done);
    expect(await untilAnswered(ask, { ...patience, waits })).toEqual(first);
    expect(asked()).toBe(1);
  });

  test('what might be done twice, where the server says that it may be repeated', async () => {
    const { send: ask } = answers<Answer>(refused(503, { type: '/problems/unavailable', repeatable: true }), done);
    expect(await untilAnswered(ask, { once: false, waits })).toEqual(done);
  });

  test('a file, where the server is busy', async () => {
    const { send: ask } = answers<Answer>(refused(429), done);
    expect(await untilAnswered(ask, { once: true, queues: true, waits })).toEqual(done);
  });
});

test('it ends: after the last wait the last answer is the answer', async () => {
  const { send: ask, asked } = answers(refused(503));
  const told: number[] = [];
  const answer = await untilAnswered(ask, { once: true, waits, onWait: ({ status }) => told.push(status) });
  expect([answer.ok, asked(), told]).toEqual([false, 4, [503, 503, 503]]);
});

test('a signal ends the waiting at once', async () => {
  const stop = new AbortController();
  const { send: ask, asked } = answers(refused(503));
  const waiting = untilAnswered(ask, { once: true, waits: [60_000], signals: [undefined, stop.signal] });
  setTimeout(() => stop.abort(), 10);
  expect([(await waiting).ok, asked()]).toEqual([false, 1]);
});

test('a network that comes back ends the waiting early', async () => {
  const { send: ask, asked } = answers<ReturnType<typeof refused> | typeof done>(refused(0), done);
  const target = new EventTarget();
  const real = { add: globalThis.addEventListener, remove: globalThis.removeEventListener };
  Object.assign(globalThis, {
    addEventListener: target.addEventListener.bind(target),
    removeEventListener: target.removeEventListener.bind(target),
  });
  try {
    const waiting = untilAnswered(ask, { once: true, waits: [60_000] });
    setTimeout(() => target.dispatchEvent(new Event('online')), 10);
    expect([await waiting, asked()]).toEqual([done, 2]);
  } finally {
    Object.assign(globalThis, { addEventListener: real.add, removeEventListener: real.remove });
  }
});

test('a form’s POST carries the same key and the same body each time; a PATCH without an answer is left to the person', async () => {
  const sent: { key: string | null; body: unknown }[] = [];
  const doFetch = (async (_url: string, init: RequestInit) => {
    sent.push({ key: new Headers(init.headers).get('idempotency-key'), body: init.body });
    if (sent.length < 3) throw new TypeError('network');
    return new Response('{}', { status: 201 });
  }) as unknown as typeof fetch;
  const post = { method: 'POST' as const, path: '/api/jobs' };
  expect((await send(post, { a: 1 }, { idempotencyKey: 'key-1234', waits }, doFetch)).ok).toBe(true);
  expect(sent).toEqual(Array.from({ length: 3 }, () => ({ key: 'key-1234', body: '{"a":1}' })));
  sent.length = 0;
  const patch = await send({ method: 'PATCH', path: '/api/jobs/1' }, { a: 1 }, { ifMatch: 1, waits }, doFetch);
  expect([patch.ok, sent.length]).toEqual([false, 1]);
});

test('while it waits it says so, and that what was entered is still here', () => {
  for (const problem of [UNREACHABLE, OFFLINE, refused(503).problem]) {
    const said = waitingFor(problem);
    expect(said).toMatchObject({ waiting: true, detail: expect.stringMatching(/still here.*by itself.*done once/) });
    expect(fieldErrorsOf(said)).toEqual({});
  }
  expect(waitingFor(refused(503).problem).title).toContain('database');
});

test('Retry-After in seconds (RFC 9110 10.2.3) and the server’s word that a thing may be repeated are read', () => {
  expect([retryAfterOf('5'), retryAfterOf(null), retryAfterOf('Fri, 31 Dec 1999 23:59:59 GMT')]).toEqual([
    5,
    null,
    null,
  ]);
  const body = JSON.stringify({ title: 'x', repeatable: true });
  expect(problemOf(503, 'application/problem+json', body).repeatable).toBe(true);
  expect(problemOf(503, 'application/problem+json', '{"title":"x","repeatable":"yes"}').repeatable).toBeUndefined();
});
