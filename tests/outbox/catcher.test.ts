import type { Env } from '@/config/env';
import { NotFound } from '@/errors';
import { deliver } from '@/mail/transport';
import { CaughtMail } from '@/models/caughtMail';
import { unitOfWork } from '@/models/unitOfWork';
import { KEPT_AT_MOST, keepLetter, lettersShown, listLetters } from '@/services/mailbox';
import { freshDatabase, type TestDatabase } from '../support/database';
import { freePort, startEntry, testEnvironment } from '../support/server';

/* The demo's mail server as its own process, and who may read what it caught. */

const mockEnv: Partial<Env> = { STILLFIELD_DEMO: true };
jest.mock('@/config/env', () => {
  const actual = jest.requireActual<{ env(): Env }>('@/config/env');
  return { ...actual, env: () => ({ ...actual.env(), ...mockEnv }) };
});

let schema: TestDatabase;
beforeAll(async () => (schema = await freshDatabase()));
afterAll(() => schema.close());

const MAIL = {
  to: { name: 'Teo Lind', address: 'teo.lind@pellorrin.example' },
  subject: 'Grüße, 6.2 dB over',
  text: 'Choose:\nhttp://localhost:3000/reset#abc\n\n<b>not bold</b>\n',
  html: '<p>x</p>',
};

test('the catcher takes a mail on loopback, keeps its plain text, and drains on SIGTERM', async () => {
  const port = await freePort();
  const environment = { ...testEnvironment(schema, 3000), STILLFIELD_DEMO: '1', MAIL_CATCHER_PORT: String(port) };
  const catcher = startEntry('src/ops/mailCatcher.ts', [], environment);
  for (const until = Date.now() + 30_000; !catcher.words().includes('catcher running') && Date.now() < until;) {
    await new Promise((resolve) => setTimeout(resolve, 50));
  }
  mockEnv.MAIL_CATCHER_PORT = port;
  await deliver(MAIL, '<one@localhost>', 'Harrow Lane EMC Bench');
  const { items } = await listLetters({ limit: 10 });
  expect(items).toEqual([
    expect.objectContaining({ to: MAIL.to.address, subject: MAIL.subject, text: MAIL.text, at: expect.any(String) }),
  ]);
  expect(items[0]!.from).toContain('Harrow Lane EMC Bench');
  catcher.process.kill('SIGTERM');
  expect(await catcher.ended).toBe(0);
}, 60_000);

test('letters are shown in the demo only, and only while no mail server is configured', async () => {
  const shown = async (given: Partial<Env>) => {
    Object.assign(mockEnv, { STILLFIELD_DEMO: true, SMTP_URL: undefined }, given);
    const listed = await listLetters({ limit: 1 }).then(
      () => true,
      (error: unknown) => !(error instanceof NotFound),
    );
    expect(lettersShown()).toBe(listed);
    return listed;
  };
  expect(await shown({})).toBe(true);
  expect(await shown({ STILLFIELD_DEMO: false })).toBe(false);
  expect(await shown({ SMTP_URL: 'smtp://127.0.0.1:25' })).toBe(false);
  Object.assign(mockEnv, { STILLFIELD_DEMO: true, SMTP_URL: undefined });
});

test('the oldest go when there are too many; pages go newest first; each leaves after two weeks', async () => {
  const at = new Date();
  await unitOfWork(() =>
    CaughtMail.bulkCreate(
      Array.from({ length: KEPT_AT_MOST + 20 }, (_, index) => ({
        publicId: `many${String(index).padStart(12, '0')}`,
        messageId: `<${index}>`,
        sender: '',
        recipient: '',
        subject: String(index),
        text: '',
        expiresAt: at,
        createdAt: at,
      })),
    ),
  );
  await keepLetter(Buffer.from('Subject: newest\r\n\r\nx'), { from: 'a@b.example', to: ['c@d.example'] }, at);
  expect(await unitOfWork(() => CaughtMail.count())).toBe(KEPT_AT_MOST);
  const first = await listLetters({ limit: 2 });
  const second = await listLetters({ limit: 2, after: first.next! });
  const subjects = [...first.items, ...second.items].map(({ subject }) => subject);
  expect(subjects).toEqual(['newest', ...[1, 2, 3].map((back) => String(KEPT_AT_MOST + 20 - back))]);
  const newest = await unitOfWork(() => CaughtMail.findOne({ where: { subject: 'newest' }, rejectOnEmpty: true }));
  expect(newest.expiresAt.getTime() - at.getTime()).toBe(14 * 24 * 3600_000);
});

test('a letter of any bytes is kept in bounds', async () => {
  const huge = Buffer.concat([Buffer.from(`Subject: ${'x'.repeat(5000)}\r\n\r\n`), Buffer.alloc(900_000, 0x61)]);
  await keepLetter(huge, { from: 'a@b.example', to: Array.from({ length: 50 }, (_, at) => `many${at}@d.example`) });
  await keepLetter(Buffer.from([0, 255, 254, 13, 10, 13, 10, 200]), { from: '', to: [] });
  const [binary, long] = (await listLetters({ limit: 2 })).items;
  expect(long!.subject).toHaveLength(500);
  expect(long!.text).toHaveLength(200_000);
  expect(binary!.text.length).toBeLessThan(5);
});
