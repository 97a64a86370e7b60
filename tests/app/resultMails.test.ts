import { closePasswordWorkers } from '@/auth/passwordWorker';
import { POST as preview } from '@/app/api/result-mails/preview/route';
import { GET as recipients } from '@/app/api/result-mails/recipients/route';
import { GET as list, POST as send } from '@/app/api/result-mails/route';
import type { RouteHandler } from '@/http/handle';
import { AuditEntry } from '@/models/auditEntry';
import { OutboxMessage } from '@/models/outboxMessage';
import { ResultMail } from '@/models/resultMail';
import { unitOfWork } from '@/models/unitOfWork';
import { User } from '@/models/user';
import type { ResultMailPreview, ResultMailView } from '@/schemas/resultMail';
import type { SweepView } from '@/schemas/sweep';
import { keepSweep } from '@/services/keepSweep';
import { composeResultMail } from '@/services/resultMail';
import { voidSweep } from '@/services/runActs';
import { createSample } from '@/services/samples';
import { createSweepFile } from '@/services/sweepFiles';
import { freshDatabase, type TestDatabase } from '../support/database';
import { enterWorld, sweepFile, type Somebody, type World } from '../support/world';

const ORIGIN = 'http://localhost:3000';
let schema: TestDatabase;
let world: World;
/** A sample of the same client with a run of its own in each polarisation. */
let stateId: string;
let runs: SweepView[];

async function keep(name: string, readings: Record<number, number>, more: object = {}): Promise<SweepView> {
  const file = await createSweepFile(world.technician.actor, sweepFile(readings, name));
  return keepSweep(world.technician.actor, { ...world.choice, ...world.about, stateId, ...more, fileId: file.id });
}

beforeAll(async () => {
  schema = await freshDatabase();
  world = await enterWorld();
  const sample = await createSample(world.technician.actor, world.job.id, {
    serial: 'P2-<b>0400',
    firmware: '',
    description: '',
  });
  stateId = sample.states[0]!.id;
  runs = [
    await keep('h.csv', { 144: 60.2 }),
    await keep('trial.csv', { 144: 70 }, { trial: 'foil on lid' }),
    await keep('voided.csv', { 144: 80 }, { polarisation: 'vertical' }),
  ];
  const voided = runs[2]!;
  await voidSweep(world.manager.actor, voided.id, voided.version, { reason: 'wrong sample' });
}, 120_000);
afterAll(async () => {
  await closePasswordWorkers();
  await schema.close();
});

function ask(
  handler: RouteHandler,
  { body, query = '', key, who = world.manager }: { body?: unknown; query?: string; key?: string; who?: Somebody },
) {
  const headers = new Headers({ origin: ORIGIN, cookie: who.cookie });
  if (body !== undefined) headers.set('content-type', 'application/json');
  if (key) headers.set('idempotency-key', key);
  const { method } = handler.operation;
  return handler(
    new Request(`${ORIGIN}/x${query}`, { method, headers, body: body === undefined ? null : JSON.stringify(body) }),
  );
}
const asked = (more: object = {}) => ({ stateId, recipientIds: [world.designer.actor.publicId], note: '', ...more });
async function previewed(more: object = {}): Promise<ResultMailPreview> {
  const answer = await ask(preview, { body: asked(more) });
  expect([answer.status, answer.ok ? '' : await answer.text()]).toEqual([200, '']);
  return (await answer.json()) as ResultMailPreview;
}
const counted = async () => ({
  mails: (await unitOfWork(() => ResultMail.findAll())).length,
  queued: (await unitOfWork(() => OutboxMessage.findAll({ where: { kind: 'mail-result' } }))).length,
});

test('the preview says the finding, the worst margin, the limits with revisions, what is missing, and what it is not', async () => {
  const { subject, text, html, to } = await previewed({ note: 'The lid was open.\nWe will close it.' });
  expect(subject).toMatch(/^Result of LD-40 M0, job HL-\d{4}$/);
  expect(to).toEqual([{ id: world.designer.actor.publicId, name: 'designer', address: 'designer@pellorrin.example' }]);
  // 60.2 + 14 + 2 - 30 dBµV/m against 40 at 144 MHz: 6.2 over, with U = 6 dB for a prescan.
  const said = [
    'Lumen strip driver LD-40, state M0: as received.',
    /Sample S-\d{3}, serial P2-<b>0400\. Job HL-\d{4}, LD-40\./,
    'manager adds:\nThe lid was open.\nWe will close it.',
    /Worst margin: 6\.2 dB over at 144\.000 MHz, against CISPR 32 class B, enclosure, 3 m, quasi-peak, run R-\d\d-\d{3}, U ±6\.0 dB/,
    'Limits: CISPR 32 class B radiated, 3 m, revision 1 (CISPR 32 class B, enclosure, 3 m, quasi-peak, revision 1)',
    'Missing: Vertical polarisation is not measured.',
    `Rests on run ${runs[0]!.number}`,
    'Left out: one trial run and one voided run.',
    'Decision rule: with expanded uncertainty U',
    'This is a pre-compliance record of one sample in the state named, not a certificate.',
    /http:\/\/localhost:3000\/samples\/[0-9a-z]{16}#M0/,
    'manager, Harrow Lane EMC Bench',
  ];
  for (const one of said) expect(text).toMatch(one);
  for (const run of runs.slice(1)) expect(text).not.toContain(run.number);
  expect(text).not.toMatch(/\bpass|\bfail|token|[-−]6\.2/i);
  expect(html).toContain('P2-&#60;b&#62;0400');
  expect(html).not.toContain('<b>0400');
  expect(await counted()).toEqual({ mails: 0, queued: 0 });
});

test('what is sent is what was previewed, word for word, stored with its evaluations and queued in the same unit', async () => {
  const shown = await previewed();
  const answer = await ask(send, { body: asked({ digest: shown.digest }) });
  expect(answer.status).toBe(201);
  const { items } = (await answer.json()) as { items: ResultMailView[] };
  const { subject, text, to, by, evaluationIds, mail } = items[0]!;
  expect({ subject, text }).toEqual({ subject: shown.subject, text: shown.text });
  expect([to.name, by.name, evaluationIds, mail?.state]).toEqual([
    'designer',
    'manager',
    [runs[0]!.evaluation.id],
    'queued',
  ]);
  const [queued] = await unitOfWork(() => OutboxMessage.findAll({ where: { kind: 'mail-result' } }));
  expect([queued!.payload, queued!.messageId]).toEqual([
    { mail: items[0]!.id },
    expect.stringMatching(/^<[0-9a-z]{16}@localhost>$/),
  ]);
  expect(await composeResultMail(queued!.payload)).toEqual({
    to: { name: 'designer', address: 'designer@pellorrin.example' },
    subject: shown.subject,
    text: shown.text,
    html: shown.html,
  });
  const entry = await unitOfWork(() =>
    AuditEntry.findOne({ where: { action: 'result e-mail of M0 queued' }, rejectOnEmpty: true }),
  );
  expect(entry.canonical).toContain(world.designer.actor.publicId);
  expect(entry.canonical).not.toContain('designer@');
});

test('a designer of another organisation, the lab’s own people and the disabled can never be recipients', async () => {
  const before = await counted();
  const { digest } = await previewed();
  const refusedFor = async (recipientIds: string[]) => {
    const answers = [
      await ask(preview, { body: asked({ recipientIds }) }),
      await ask(send, { body: asked({ recipientIds, digest }) }),
    ];
    return Promise.all(
      answers.map(async (answer) => {
        const problem = (await answer.json()) as { errors: { pointer: string; message: string }[] };
        return [answer.status, ...problem.errors.map(({ pointer, message }) => `${pointer} ${message}`)];
      }),
    );
  };
  const message = 'is no designer of Pell & Orrin Lighting who can sign in';
  for (const stranger of [world.outsider, world.technician, world.manager]) {
    const answer = [400, `/recipientIds/1 ${message}`];
    expect(await refusedFor([world.designer.actor.publicId, stranger.actor.publicId])).toEqual([answer, answer]);
  }
  expect(await refusedFor(['0000000000000000'])).toEqual([
    [400, `/recipientIds/0 ${message}`],
    [400, `/recipientIds/0 ${message}`],
  ]);
  const listed = (await (await ask(recipients, { query: `?stateId=${stateId}` })).json()) as {
    items: { name: string }[];
  };
  const { id: organisationId } = world.client;
  const own = await unitOfWork(() => User.findAll({ where: { organisationId, disabledAt: null, role: 'designer' } }));
  expect(listed.items.map(({ name }) => name).sort()).toEqual(own.map(({ name }) => name).sort());
  expect(await counted()).toEqual(before);
});

test('somebody who was disabled, or moved to another client, after the press of the button is not sent it', async () => {
  const { digest } = await previewed();
  const answer = await ask(send, { body: asked({ digest }) });
  const { items } = (await answer.json()) as { items: ResultMailView[] };
  const compose = () => composeResultMail({ mail: items[0]!.id });
  const person = { where: { publicId: world.designer.actor.publicId } };
  await unitOfWork(() => User.update({ disabledAt: new Date() }, person));
  await expect(compose()).rejects.toMatchObject({ kind: 'conflict' });
  await unitOfWork(() => User.update({ disabledAt: null, organisationId: world.stranger.id }, person));
  await expect(compose()).rejects.toMatchObject({ kind: 'conflict' });
  await unitOfWork(() => User.update({ organisationId: world.client.id }, person));
  expect((await compose()).to.name).toBe('designer');
});

test('pressed twice with one key it is one sending; pressed again it is a new one', async () => {
  const before = await counted();
  const { digest } = await previewed();
  const body = asked({ digest });
  const twice = await Promise.all([1, 2].map(() => ask(send, { body, key: 'result-key-0001' })));
  expect(twice.map(({ status }) => status)).toEqual([201, 201]);
  const [one, two] = (await Promise.all(twice.map((answer) => answer.json()))) as { sendingId: string }[];
  expect(one!.sendingId).toBe(two!.sendingId);
  expect(await counted()).toEqual({ mails: before.mails + 1, queued: before.queued + 1 });
  await ask(send, { body });
  expect(await counted()).toEqual({ mails: before.mails + 2, queued: before.queued + 2 });
});

test('when the result has changed since the preview nothing is sent', async () => {
  const { digest } = await previewed();
  const before = await counted();
  const run = await keep('v.csv', { 144: 45 }, { polarisation: 'vertical' });
  const stale = await ask(send, { body: asked({ digest }) });
  expect([stale.status, ((await stale.json()) as { detail: string }).detail]).toEqual([
    409,
    'The result has changed since you looked at it. Look at the e-mail again, then send it.',
  ]);
  expect(await counted()).toEqual(before);
  const { text } = await previewed();
  expect(text).toContain(`Rests on runs ${runs[0]!.number}, ${run.number}`);
});

test('a state that nothing speaks for has no result', async () => {
  const sample = await createSample(world.technician.actor, world.job.id, {
    serial: 'P2-0401',
    firmware: '',
    description: '',
  });
  const answer = await ask(preview, { body: asked({ stateId: sample.states[0]!.id }) });
  expect([answer.status, ((await answer.json()) as { detail: string }).detail]).toEqual([
    409,
    'Nothing speaks for M0 yet: upload its runs first, then send the result.',
  ]);
});

test('the list tells what became of each: sent, refused with the server’s words; only the lab reads it', async () => {
  const [first, second] = await unitOfWork(() => ResultMail.findAll({ order: [['id', 'DESC']], limit: 2 }));
  const doneAt = new Date('2026-12-01T14:02:00Z');
  await unitOfWork(async () => {
    await OutboxMessage.update({ state: 'sent', doneAt, attempts: 1 }, { where: { id: first!.outboxId } });
    const lastError = '550 5.1.1 no such mailbox';
    await OutboxMessage.update(
      { state: 'refused', doneAt, lastError, attempts: 1 },
      { where: { id: second!.outboxId } },
    );
  });
  const answer = await ask(list, { query: `?stateId=${stateId}&limit=2`, who: world.technician });
  const { items, next } = (await answer.json()) as { items: ResultMailView[]; next: string | null };
  expect(items.map(({ mail }) => [mail!.state, mail!.doneAt, mail!.reason])).toEqual([
    ['sent', '2026-12-01T14:02:00.000Z', null],
    ['refused', '2026-12-01T14:02:00.000Z', '550 5.1.1 no such mailbox'],
  ]);
  expect(next).not.toBeNull();
  expect((await ask(list, { who: world.designer })).status).toBe(403);
});

test('the words that were sent cannot be changed afterwards: the application has no right to', async () => {
  await expect(unitOfWork(() => ResultMail.update({ text: 'other' }, { where: {} }))).rejects.toThrow(/denied/);
});
