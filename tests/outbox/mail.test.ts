import { QueryTypes } from 'sequelize';
import type { Env } from '@/config/env';
import { database } from '@/models/database';
import { OneTimeLink } from '@/models/oneTimeLink';
import { OutboxMessage } from '@/models/outboxMessage';
import { unitOfWork } from '@/models/unitOfWork';
import { User } from '@/models/user';
import { workOnce } from '@/outbox/worker';
import { mailStateOf } from '@/services/mailState';
import { sendLink } from '@/services/oneTimeLinks';
import { disableUser } from '@/services/users';
import { SERVER } from '@/auth/actor';
import { enterLab } from '../auth/people';
import { freshDatabase, type TestDatabase } from '../support/database';
import { mailServer, refusal, type TestMailServer } from '../support/mailServer';
import { startEntry, testEnvironment } from '../support/server';

/* From the row a transaction wrote to a mail server of the test's own. */

const mockEnv: Partial<Env> = {};
jest.mock('@/config/env', () => {
  const actual = jest.requireActual<{ env(): Env }>('@/config/env');
  return { ...actual, env: () => ({ ...actual.env(), ...mockEnv }) };
});

let schema: TestDatabase;
let lab: Awaited<ReturnType<typeof enterLab>>;
let server: TestMailServer | null = null;

beforeAll(async () => {
  schema = await freshDatabase();
  lab = await enterLab();
});
afterAll(() => schema.close());
beforeEach(() => jest.spyOn(process.stdout, 'write').mockReturnValue(true));
afterEach(async () => {
  jest.restoreAllMocks();
  await server?.close();
  server = null;
  mockEnv.SMTP_URL = undefined;
  await run("UPDATE outbox SET state = 'sent', lease_owner = NULL, leased_until = NULL");
});

const run = (sql: string) => unitOfWork(() => database().query(sql, { type: QueryTypes.RAW }));
const due = () => run("UPDATE outbox SET available_at = UTC_TIMESTAMP(3) WHERE state = 'queued'");

async function listening(...given: Parameters<typeof mailServer>): Promise<TestMailServer> {
  server = await mailServer(...given);
  mockEnv.SMTP_URL = `smtp://127.0.0.1:${server.port}`;
  return server;
}

/** A reset link for somebody new, with its mail in the queue. */
async function asked() {
  const who = await lab.person('technician', { signsIn: false });
  const link = await unitOfWork(() => sendLink('reset', who.actor.userId, new Date()));
  const state = async () => (await mailStateOf([Number(link.outboxId)])).get(Number(link.outboxId))!;
  return { who, link, state };
}

test('a mail is sent once, to the person, with a link whose token no row holds', async () => {
  const { taken } = await listening();
  const { who, link, state } = await asked();
  expect(await state()).toMatchObject({ state: 'queued', attempts: 0, reason: null });
  expect(await workOnce('a')).toBe(true);
  expect(await workOnce('a')).toBe(false);
  expect(taken).toHaveLength(1);
  expect(taken[0]!.recipients).toEqual([who.email]);
  const token = /\/reset#([\w-]{43})\n/.exec(taken[0]!.text)![1]!;
  expect(await state()).toMatchObject({ state: 'sent', attempts: 1, reason: null, doneAt: expect.any(String) });
  const rows = JSON.stringify(
    await unitOfWork(async () => [await OneTimeLink.findAll(), await OutboxMessage.findAll()]),
  );
  expect(rows).toContain(link.publicId);
  expect(rows).not.toContain(token);
});

test('a greylisted mail is tried again and arrives with the same Message-ID and the same link', async () => {
  let tries = 0;
  const { taken } = await listening({}, () => {
    tries += 1;
    if (tries === 1) throw refusal(451, '4.7.1 greylisted, come back');
  });
  const { state } = await asked();
  await workOnce('a');
  const waiting = await state();
  expect(waiting).toMatchObject({ state: 'queued', attempts: 1, nextTryAt: expect.any(String) });
  expect(waiting.reason).toContain('greylisted, come back');
  expect(await workOnce('a')).toBe(false);
  await due();
  await workOnce('a');
  expect(await state()).toMatchObject({ state: 'sent', attempts: 2, reason: null });
  expect(taken).toHaveLength(2);
  expect(taken[1]!.messageId).toBe(taken[0]!.messageId);
  expect(taken[1]!.text).toBe(taken[0]!.text);
});

test('a mailbox that is not there ends it at once, in the words of the mail server', async () => {
  await listening({ onRcptTo: (_address, _session, done) => done(refusal(550, '5.1.1 no such mailbox here')) });
  const { state } = await asked();
  await workOnce('a');
  const refused = await state();
  expect(refused).toMatchObject({ state: 'refused', attempts: 1, doneAt: expect.any(String) });
  expect(refused.reason).toContain('no such mailbox here');
});

test('a mail server that is away is tried again', async () => {
  const gone = await mailServer();
  await gone.close();
  mockEnv.SMTP_URL = `smtp://127.0.0.1:${gone.port}`;
  const { state } = await asked();
  await workOnce('a');
  expect(await state()).toMatchObject({ state: 'queued', attempts: 1, reason: expect.stringMatching(/ECONNREFUSED/) });
});

test('without a mail server it waits for ever with a plain reason, and leaves when there is one', async () => {
  const { state } = await asked();
  for (let round = 0; round < 40; round += 1) {
    await due();
    await workOnce('a');
  }
  expect(await state()).toMatchObject({ state: 'queued', attempts: 0, reason: expect.stringMatching(/set SMTP_URL/) });
  const { taken } = await listening();
  await due();
  await workOnce('a');
  expect(taken).toHaveLength(1);
  expect(await state()).toMatchObject({ state: 'sent' });
});

test.each([
  [
    'replaced by a later one',
    async ({ who }: Asked) => void (await unitOfWork(() => sendLink('reset', who.actor.userId, new Date()))),
  ],
  [
    'of somebody disabled meanwhile',
    ({ who }: Asked) => lab.person('manager').then(() => disableUser(SERVER, who.publicId)),
  ],
  [
    'that ran out',
    ({ link }: Asked) =>
      unitOfWork(
        async () =>
          void (await OneTimeLink.update({ expiresAt: new Date(Date.now() - 1) }, { where: { id: link.id } })),
      ),
  ],
  [
    'that was used',
    ({ link }: Asked) =>
      unitOfWork(async () => void (await OneTimeLink.update({ usedAt: new Date() }, { where: { id: link.id } }))),
  ],
])('a link %s is not sent any more', async (_name, happens) => {
  const { taken } = await listening();
  const made = await asked();
  await happens(made);
  await run(`UPDATE outbox SET state = 'sent' WHERE id > ${made.link.outboxId}`);
  await workOnce('a');
  expect(await made.state()).toMatchObject({ state: 'refused', reason: expect.stringMatching(/^Not sent: /) });
  expect(taken).toEqual([]);
});
type Asked = Awaited<ReturnType<typeof asked>>;

test('under another SESSION_SECRET than it was made with, a link that would open nothing is not sent', async () => {
  const { taken } = await listening();
  const { state } = await asked();
  mockEnv.SESSION_SECRET = 'another secret of at least thirty-two characters';
  await workOnce('a');
  delete mockEnv.SESSION_SECRET;
  expect(await state()).toMatchObject({
    state: 'refused',
    reason: expect.stringMatching(/SESSION_SECRET has changed/),
  });
  expect(taken).toEqual([]);
});

test('killed between the sending and the noting of it, a mail is sent twice with the same Message-ID', async () => {
  const started: ReturnType<typeof startEntry>[] = [];
  let kills = 0;
  const { taken, port } = await listening({}, () => {
    if (kills > 0) return;
    kills += 1;
    // The mail is whole and taken; the process that sent it never hears of it.
    started[0]!.process.kill('SIGKILL');
  });
  const { state } = await asked();
  const environment = {
    ...testEnvironment(schema, 3000),
    APP_ORIGIN: 'http://localhost:3000',
    SMTP_URL: `smtp://127.0.0.1:${port}`,
  };
  started.push(startEntry('src/outbox/main.ts', [], environment));
  expect(await started[0]!.ended).toBeNull();
  expect(taken).toHaveLength(1);
  expect(await state()).toMatchObject({ state: 'sending', attempts: 1 });
  // Its lease is respected until it has run out.
  expect(await workOnce('b')).toBe(false);
  await run("UPDATE outbox SET leased_until = UTC_TIMESTAMP(3) - INTERVAL 1 SECOND WHERE state = 'sending'");
  expect(await workOnce('b')).toBe(true);
  expect(await state()).toMatchObject({ state: 'sent', attempts: 2 });
  expect(taken).toHaveLength(2);
  expect(taken[1]!.messageId).toBe(taken[0]!.messageId);
  expect(taken[0]!.messageId).toMatch(/^<[0-9a-z]{16}@localhost>$/);
}, 60_000);

test('two at once send 40 mails, each once', async () => {
  const { taken } = await listening();
  const ids = await unitOfWork(async () => {
    const people = await User.findAll({ limit: 1 });
    const made: number[] = [];
    for (let index = 0; index < 40; index += 1) {
      const { publicId } = await User.create({
        publicId: `bulk${String(index).padStart(12, '0')}`,
        organisationId: people[0]!.organisationId,
        role: 'technician',
        name: `Bulk ${index}`,
        email: `bulk${index}@harrowlane.example`,
      });
      const { id } = await User.findOne({ where: { publicId }, rejectOnEmpty: true });
      made.push(Number((await sendLink('reset', id, new Date())).outboxId));
    }
    return made;
  });
  const left = async () => [...(await mailStateOf(ids)).values()].filter(({ state }) => state !== 'sent').length;
  const loop = async (owner: string) => {
    for (let idle = 0; idle < 5;) idle = (await workOnce(owner)) ? 0 : idle + 1;
  };
  for (let round = 0; round < 5 && (await left()) > 0; round += 1) await Promise.all([loop('one'), loop('two')]);
  expect(await left()).toBe(0);
  expect(taken).toHaveLength(40);
  expect(new Set(taken.map(({ recipients }) => recipients.join())).size).toBe(40);
  expect(new Set(taken.map(({ messageId }) => messageId)).size).toBe(40);
}, 60_000);
