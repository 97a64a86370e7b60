import { closePasswordWorkers } from '@/auth/passwordWorker';
import { POST as accept } from '@/app/api/invitations/accept/route';
import { POST as readLink } from '@/app/api/one-time-links/read/route';
import { POST as ask } from '@/app/api/password-reset/route';
import { POST as reset } from '@/app/api/password-reset/use/route';
import { POST as changeOwn } from '@/app/api/account/password/route';
import { GET as readMe } from '@/app/api/session/route';
import { POST as invite } from '@/app/api/people/route';
import { oneTimeToken } from '@/auth/oneTimeToken';
import { OneTimeLink } from '@/models/oneTimeLink';
import { OutboxMessage } from '@/models/outboxMessage';
import { unitOfWork } from '@/models/unitOfWork';
import { User } from '@/models/user';
import { signIn } from '@/services/sessions';
import { cookieOf, enterLab, PASSWORD, type TestPerson } from '../auth/people';
import { freshDatabase, type TestDatabase } from '../support/database';

const ORIGIN = 'http://localhost:3000';
const NEW = 'another tidal copper mast';

let schema: TestDatabase;
let lab: Awaited<ReturnType<typeof enterLab>>;
let log: string[] = [];
let count = 0;

beforeAll(async () => {
  schema = await freshDatabase();
  lab = await enterLab();
});
afterAll(async () => {
  await closePasswordWorkers();
  await schema.close();
});
beforeEach(() => {
  log = [];
  process.env.STILLFIELD_LOG = '1';
  jest.spyOn(process.stdout, 'write').mockImplementation((line) => log.push(String(line)) > 0);
});
afterEach(() => {
  delete process.env.STILLFIELD_LOG;
  jest.restoreAllMocks();
});

function post(body: unknown, headers: Record<string, string> = {}): Request {
  count += 1;
  return new Request(`${ORIGIN}/api/x`, {
    method: 'POST',
    headers: {
      origin: ORIGIN,
      'content-type': 'application/json',
      'x-forwarded-for': `192.0.2.${count % 250}`,
      ...headers,
    },
    body: JSON.stringify(body),
  });
}

const latestToken = (publicId: string) =>
  unitOfWork(async () => {
    const { id: userId } = await User.findOne({ where: { publicId }, rejectOnEmpty: true });
    const link = await OneTimeLink.findOne({ where: { userId }, order: [['id', 'DESC']], rejectOnEmpty: true });
    return oneTimeToken(link.kind, link.publicId);
  });
const cookieFor = async (who: TestPerson) =>
  cookieOf((await signIn({ email: who.email, password: PASSWORD }, { address: '192.0.2.251', agent: 'x' })).cookie);

test('a known and an unknown address get the same 204: status, headers, empty body', async () => {
  const who = await lab.person('technician');
  const seen: unknown[] = [];
  for (const email of [who.email, 'nobody@harrowlane.example']) {
    const answer = await ask(post({ email }));
    seen.push([answer.status, [...answer.headers], await answer.text()]);
  }
  expect(seen[0]).toEqual(seen[1]);
  expect((seen[0] as unknown[])[0]).toBe(204);
  const mails = await unitOfWork(() => OutboxMessage.count({ where: { kind: 'mail-reset' } }));
  expect(mails).toBe(1);
});

test('what is no e-mail address is told so; too many requests are told to wait', async () => {
  expect((await ask(post({ email: 'x' }))).status).toBe(400);
  expect((await ask(post({ email: 'a@b.example\r\nBcc: c@d.example' }))).status).toBe(400);
  expect((await ask(post({ email: 'a@b.example', extra: 1 }))).status).toBe(400);
  const answers = [];
  for (let at = 0; at < 5; at += 1) answers.push(await ask(post({ email: 'flooded@harrowlane.example' })));
  const last = answers.at(-1)!;
  expect([last.status, last.headers.get('content-type')]).toEqual([429, 'application/problem+json']);
  expect(Number(last.headers.get('retry-after'))).toBeGreaterThan(0);
});

test('a request from another site is refused', async () => {
  expect((await ask(post({ email: 'a@b.example' }, { origin: 'https://elsewhere.example' }))).status).toBe(403);
});

test('the whole way leaves no token, password or e-mail in the log', async () => {
  const who = await lab.person('technician');
  await ask(post({ email: who.email }));
  const token = await latestToken(who.publicId);
  const read = await readLink(post({ kind: 'reset', token }));
  expect(await read.json()).toMatchObject({ email: who.email });
  expect((await reset(post({ token, password: NEW }))).status).toBe(204);
  const again = await reset(post({ token, password: NEW }));
  expect([again.status, again.headers.get('content-type')]).toEqual([409, 'application/problem+json']);
  const said = log.join('');
  expect(said).toContain('"event":"reset-asked"');
  expect(said).toContain('"event":"password-set"');
  expect(said).toContain(who.publicId);
  for (const secret of [token, NEW, who.email]) expect(said).not.toContain(secret);
});

test('a token in the wrong form, of nobody, or of the other kind opens nothing', async () => {
  expect((await reset(post({ token: 'short', password: NEW }))).status).toBe(400);
  expect((await reset(post({ token: 'x'.repeat(43), password: NEW }))).status).toBe(409);
  expect((await readLink(post({ kind: 'invitation', token: 'x'.repeat(43) }))).status).toBe(409);
  expect((await accept(post({ token: 'x'.repeat(43), password: NEW }))).status).toBe(409);
});

test('an accepted invitation answers a session cookie; the session before at this browser ends', async () => {
  const manager = await lab.person('manager');
  const cookie = await cookieFor(manager);
  const body = {
    name: 'Odo Fenn',
    email: 'odo@lumenwright.example',
    role: 'designer',
    organisationId: lab.client.publicId,
  };
  const key = { cookie, 'idempotency-key': 'invite-odo-0001' };
  const first = await invite(post(body, key));
  expect(first.status).toBe(201);
  const person = (await first.json()) as { id: string };
  // a lost reply is asked for again: one person, one invitation
  const second = await invite(post(body, key));
  expect([second.status, (await second.json()) as unknown]).toEqual([201, person]);
  expect(await unitOfWork(() => OutboxMessage.count({ where: { kind: 'mail-invitation' } }))).toBe(1);
  const token = await latestToken(person.id);
  const answer = await accept(post({ token, password: NEW }, { cookie }));
  expect(answer.status).toBe(200);
  expect(await answer.json()).toMatchObject({ id: person.id, role: 'designer' });
  const theirs = cookieOf(answer.headers.get('set-cookie')!);
  expect((await readMe(new Request(`${ORIGIN}/api/session`, { headers: { cookie: theirs } }))).status).toBe(200);
  expect((await readMe(new Request(`${ORIGIN}/api/session`, { headers: { cookie } }))).status).toBe(401);
});

test('one’s own password changes over the API and the wrong old one is told at its field', async () => {
  const who = await lab.person('designer');
  const cookie = await cookieFor(who);
  const wrong = await changeOwn(post({ current: 'not it at all', password: NEW }, { cookie }));
  expect([wrong.status, ((await wrong.json()) as { errors: { pointer: string }[] }).errors[0]!.pointer]).toEqual([
    400,
    '/current',
  ]);
  expect((await changeOwn(post({ current: PASSWORD, password: NEW }, { cookie }))).status).toBe(204);
  expect((await readMe(new Request(`${ORIGIN}/api/session`, { headers: { cookie } }))).status).toBe(200);
});
