import { closePasswordWorkers } from '@/auth/passwordWorker';
import { GET as readMe, POST as signIn, DELETE as signOut } from '@/app/api/session/route';
import { GET as listSessions } from '@/app/api/sessions/route';
import { DELETE as endSession } from '@/app/api/sessions/[id]/route';
import { unitOfWork } from '@/models/unitOfWork';
import { User } from '@/models/user';
import type { Throttled } from '@/errors';
import { issueToken } from '@/services/apiTokens';
import { admitAttempt } from '@/services/signInAttempts';
import { cookieOf, enterLab, PASSWORD, type TestPerson } from '../auth/people';
import { freshDatabase, type TestDatabase } from '../support/database';

const ORIGIN = 'http://localhost:3000';

let schema: TestDatabase;
let person: Awaited<ReturnType<typeof enterLab>>['person'];
let who: TestPerson;
let count = 0;

beforeAll(async () => {
  schema = await freshDatabase();
  ({ person } = await enterLab());
  who = await person('technician');
});
afterAll(async () => {
  await closePasswordWorkers();
  await schema.close();
});

interface Sent {
  method?: string;
  body?: unknown;
  headers?: Record<string, string | null>;
}

/** A request as a browser on our own page sends it; null takes a header away. Each comes from an address of its own. */
function request(path: string, { method = 'GET', body, headers = {} }: Sent = {}): Request {
  count += 1;
  const all: Record<string, string | null> = {
    'x-forwarded-for': `192.0.2.${count % 250}`,
    ...(method !== 'GET' && { origin: ORIGIN }),
    ...(body !== undefined && { 'content-type': 'application/json' }),
    ...headers,
  };
  const sent = Object.entries(all).filter((entry): entry is [string, string] => entry[1] !== null);
  return new Request(ORIGIN + path, { method, headers: sent, body: body === undefined ? null : JSON.stringify(body) });
}

const enter = (email: string, password = PASSWORD, headers: Sent['headers'] = {}) =>
  signIn(request('/api/session', { method: 'POST', body: { email, password }, headers }));

async function cookieFor({ email }: TestPerson): Promise<string> {
  return cookieOf((await enter(email)).headers.get('set-cookie')!);
}

test('signing in answers who it is and one cookie with its flags', async () => {
  const answer = await enter(who.email);
  expect(answer.status).toBe(200);
  expect(await answer.json()).toMatchObject({ id: who.publicId, email: who.email, role: 'technician' });
  expect(answer.headers.getSetCookie()).toHaveLength(1);
  expect(answer.headers.get('set-cookie')).toMatch(/^stillfield=\S+; Path=\/; Max-Age=604800; HttpOnly; SameSite=Lax$/);
});

test('unknown e-mail, wrong password and disabled person: the same status, headers and bytes', async () => {
  const disabled = await person('technician');
  await unitOfWork(() => User.update({ disabledAt: new Date() }, { where: { publicId: disabled.publicId } }));
  const answers = [
    await enter('nobody@harrowlane.example'),
    await enter(who.email, 'tidal copper mast 42'),
    await enter(disabled.email),
  ];
  const seen = await Promise.all(answers.map(async (a) => [a.status, [...a.headers], await a.text()]));
  expect(seen[0]![0]).toBe(401);
  expect(seen[1]).toEqual(seen[0]);
  expect(seen[2]).toEqual(seen[0]);
  expect(answers[0]!.headers.get('set-cookie')).toBeNull();
});

test('after too many wrong ones: 429 with Retry-After, for an e-mail nobody has as for a known one', async () => {
  const from = '198.51.100.9';
  const answers = [];
  for (const email of ['nobody2@harrowlane.example', (await person('technician')).email]) {
    for (let at = Date.now(), i = 0; i < 12; i++) {
      const wait = await admitAttempt(email, from, new Date(at)).then(
        () => 0,
        (error: Throttled) => error.retryAfterS,
      );
      at += wait * 1000;
    }
    const answer = await enter(email, PASSWORD, { 'x-forwarded-for': from });
    const { type, title, status } = (await answer.json()) as Record<string, unknown>;
    answers.push({ type, title, status });
    expect(Number(answer.headers.get('retry-after'))).toBeGreaterThan(1);
    expect(Number(answer.headers.get('retry-after'))).toBeLessThanOrEqual(900);
  }
  expect(answers[0]).toEqual({ type: '/problems/throttled', title: 'Too many tries', status: 429 });
  expect(answers[1]).toEqual(answers[0]);
});

test('who is signed in is told to that session alone', async () => {
  const cookie = await cookieFor(who);
  expect((await readMe(request('/api/session', { headers: { cookie } }))).status).toBe(200);
  expect((await readMe(request('/api/session'))).status).toBe(401);
  expect((await readMe(request('/api/session', { headers: { cookie: 'stillfield=x' } }))).status).toBe(401);
});

test('signing out ends the session, takes the cookie and clears what the browser keeps', async () => {
  const cookie = await cookieFor(who);
  const answer = await signOut(request('/api/session', { method: 'DELETE', headers: { cookie } }));
  expect(answer.status).toBe(204);
  expect(answer.headers.get('set-cookie')).toMatch(/^stillfield=; Path=\/; Max-Age=0; HttpOnly; SameSite=Lax$/);
  expect(answer.headers.get('clear-site-data')).toBe('"cache", "storage"');
  expect((await readMe(request('/api/session', { headers: { cookie } }))).status).toBe(401);
});

test('signing in again from a browser that is signed in leaves one session', async () => {
  const someone = await person('technician');
  const first = await cookieFor(someone);
  const second = cookieOf((await enter(someone.email, PASSWORD, { cookie: first })).headers.get('set-cookie')!);
  expect((await readMe(request('/api/session', { headers: { cookie: first } }))).status).toBe(401);
  const listed = await (await listSessions(request('/api/sessions', { headers: { cookie: second } }))).json();
  expect(listed).toMatchObject({ items: [{ current: true }], next: null });
});

test('one ends another session of theirs, and nobody else’s', async () => {
  const [mine, another] = [await cookieFor(who), await cookieFor(who)];
  const stranger = await cookieFor(await person('designer'));
  const listed = (await (await listSessions(request('/api/sessions', { headers: { cookie: another } }))).json()) as {
    items: { id: string; current: boolean }[];
  };
  const { id } = listed.items.find(({ current }) => current)!;
  const end = (cookie: string) =>
    endSession(request(`/api/sessions/${id}`, { method: 'DELETE', headers: { cookie } }), {
      params: Promise.resolve({ id }),
    });
  expect((await end(stranger)).status).toBe(404);
  expect((await end(mine)).status).toBe(204);
  expect((await readMe(request('/api/session', { headers: { cookie: another } }))).status).toBe(401);
  expect((await end(mine)).status).toBe(404);
});

test.each([null, 'null', 'http://localhost:3001', 'https://localhost:3000', 'http://evil.example'])(
  'a write with a cookie from the origin %s is refused',
  async (origin) => {
    const cookie = await cookieFor(who);
    const answer = await signOut(request('/api/session', { method: 'DELETE', headers: { cookie, origin } }));
    expect(answer.status).toBe(403);
    expect((await readMe(request('/api/session', { headers: { cookie } }))).status).toBe(200);
  },
);

test('nobody is signed in from another site’s page; a script without an origin may', async () => {
  expect((await enter(who.email, PASSWORD, { origin: 'http://evil.example' })).status).toBe(403);
  expect((await enter(who.email, PASSWORD, { origin: null })).status).toBe(200);
});

test('a bearer token is all that counts: a good cookie beside a bad token opens nothing', async () => {
  const cookie = await cookieFor(who);
  const { token } = await issueToken(who.email, 'script', ['read']);
  const status = async (authorization: string) =>
    (await readMe(request('/api/session', { headers: { cookie, authorization } }))).status;
  expect(await status('Bearer sfd_wrong')).toBe(401);
  // It holds, but reading sessions is for people at a browser: the cookie does not lend it that.
  expect(await status(`Bearer ${token}`)).toBe(403);
  expect(await status('Basic dXNlcjpwYXNz')).toBe(200);
});

test.each([
  [{ email: '', password: '' }, ['/email', '/password']],
  [{ email: 'x@y.example', password: 'z'.repeat(1001) }, ['/password']],
  [{ email: 'x@y.example', password: 'z', remember: true }, ['/remember']],
])('a body that is none is refused by every pointer: %#', async (body, pointers) => {
  const answer = await signIn(request('/api/session', { method: 'POST', body }));
  expect(answer.status).toBe(400);
  const { errors } = (await answer.json()) as { errors: { pointer: string }[] };
  expect(errors.map(({ pointer }) => pointer)).toEqual(pointers);
});

test('every reply, good or bad, is not stored, not sniffed, not framed', async () => {
  const cookie = await cookieFor(who);
  const replies = [
    await readMe(request('/api/session', { headers: { cookie } })),
    await readMe(request('/api/session')),
    await signIn(request('/api/session', { method: 'POST', body: {} })),
    await signOut(request('/api/session', { method: 'DELETE' })),
  ];
  for (const { headers } of replies) {
    expect(headers.get('cache-control')).toBe('no-store');
    expect(headers.get('x-content-type-options')).toBe('nosniff');
    expect(headers.get('referrer-policy')).toBe('same-origin');
    expect(headers.get('content-security-policy')).toBe(`default-src 'none'; frame-ancestors 'none'; sandbox`);
    expect(headers.get('strict-transport-security')).toBeNull();
  }
});
