import { QueryTypes } from 'sequelize';
import { database } from '@/models/database';
import { Sweep } from '@/models/sweep';
import { unitOfWork } from '@/models/unitOfWork';
import type { SweepView } from '@/schemas/sweep';
import type { SweepFileView } from '@/schemas/sweepFile';
import { verifyChain } from '@/services/audit';
import { PASSWORD } from '../auth/people';
import { freshDatabase, type TestDatabase } from '../support/database';
import { type RunningEntry, type RunningServer, startEntry, startApi, testEnvironment } from '../support/server';
import { enterWorld, pixel, sweepFile, type World } from '../support/world';

/* Two web processes and two outbox processes on one database: whichever answers, the answer is the same. */

let schema: TestDatabase;
let world: World;
let servers: RunningServer[];
let outboxes: RunningEntry[];

beforeAll(async () => {
  schema = await freshDatabase();
  world = await enterWorld();
  servers = await Promise.all([startApi(schema), startApi(schema)]);
  outboxes = [1, 2].map(() => startEntry('src/outbox/main.ts', [], testEnvironment(schema, 3000)));
}, 300_000);
afterAll(async () => {
  for (const { process } of outboxes) process.kill('SIGTERM');
  await Promise.all([...servers.map((server) => server.stop()), ...outboxes.map(({ ended }) => ended)]);
  await schema.close();
}, 60_000);

interface Asked {
  method?: string;
  body?: unknown;
  file?: { name: string; bytes: Uint8Array<ArrayBuffer> };
  key?: string;
  cookie?: string;
  headers?: Record<string, string>;
}

/** Asks the first or the second web process, as a browser on its address would. */
function ask(which: 0 | 1, address: string, { method, body, file, key, cookie, headers }: Asked = {}) {
  const { origin } = servers[which]!;
  const form = file && new FormData();
  form?.append('file', new File([file!.bytes], file!.name));
  return fetch(origin + address, {
    method: method ?? (body === undefined && !file ? 'GET' : 'POST'),
    headers: {
      origin,
      ...(cookie && { cookie }),
      ...(key && { 'idempotency-key': key }),
      ...(body !== undefined && { 'content-type': 'application/json' }),
      ...headers,
    },
    body: form ?? (body === undefined ? undefined : JSON.stringify(body)),
  });
}
const done = async <T>(answer: Promise<Response>): Promise<T> => {
  const got = await answer;
  if (!got.ok) throw new Error(`${got.status} ${await got.text()}`);
  return (await got.json()) as T;
};

async function signIn(which: 0 | 1, email = world.technician.actor.email, password = PASSWORD) {
  const answer = await ask(which, '/api/session', { body: { email, password } });
  return { status: answer.status, cookie: answer.headers.get('set-cookie')?.split(';')[0] ?? '', answer };
}

test('who signs in on one is known to the other, and who signs out on the other is unknown to both', async () => {
  const { status, cookie } = await signIn(0);
  expect(status).toBe(200);
  expect((await ask(1, '/api/session', { cookie })).status).toBe(200);
  expect((await ask(1, '/api/session', { method: 'DELETE', cookie })).status).toBe(204);
  expect([
    (await ask(0, '/api/session', { cookie })).status,
    (await ask(1, '/api/session', { cookie })).status,
  ]).toEqual([401, 401]);
}, 60_000);

describe('the main job, every request at the other process', () => {
  let cookie: string;
  let file: SweepFileView;
  let run: SweepView;
  beforeAll(async () => {
    cookie = (await signIn(0)).cookie;
  }, 60_000);

  test('uploaded on one, judged and kept on the other, read on the first', async () => {
    file = await done(ask(0, '/api/sweep-files', { cookie, file: sweepFile() }));
    await done(ask(1, `/api/sweep-files/${file.id}/preview`, { cookie, body: world.choice }));
    const body = { ...world.choice, ...world.about, fileId: file.id };
    run = await done(ask(1, '/api/sweeps', { cookie, body, key: 'two-keep-1' }));
    const read = await done<SweepView>(ask(0, `/api/sweeps/${run.id}`, { cookie }));
    expect([read.number, read.evaluation.worst!.marginDb]).toEqual([run.number, run.evaluation.worst!.marginDb]);
    const [one, other] = await Promise.all(
      [0, 1].map((which) => ask(which as 0 | 1, `/api/sweeps/${run.id}/file`, { cookie })),
    );
    expect(Buffer.from(await one!.arrayBuffer()).equals(Buffer.from(await other!.arrayBuffer()))).toBe(true);
  }, 60_000);

  test('a repeat under its key is one run, at the other process and at both at once', async () => {
    const body = { ...world.choice, ...world.about, fileId: file.id };
    const again = await ask(0, '/api/sweeps', { cookie, body, key: 'two-keep-1' });
    expect([again.headers.get('idempotency-replayed'), ((await again.json()) as SweepView).id]).toEqual([
      'true',
      run.id,
    ]);
    const before = await unitOfWork(() => Sweep.count());
    const both = await Promise.all(
      [0, 1, 0, 1].map((which) => ask(which as 0 | 1, '/api/sweeps', { cookie, body, key: 'two-keep-2' })),
    );
    const replies = (await Promise.all(both.map((answer) => answer.json()))) as SweepView[];
    expect(both.map(({ status }) => status)).toEqual([201, 201, 201, 201]);
    expect(new Set(replies.map(({ id }) => id)).size).toBe(1);
    expect(await unitOfWork(() => Sweep.count())).toBe(before + 1);
  }, 60_000);

  test('runs kept at both at once have numbers of their own, and the audit chain of the job holds', async () => {
    const files = await Promise.all(
      [0, 1].map((which) =>
        done<SweepFileView>(ask(which as 0 | 1, '/api/sweep-files', { cookie, file: sweepFile() })),
      ),
    );
    const kept = await Promise.all(
      files.map(({ id }, i) =>
        done<SweepView>(
          ask((1 - i) as 0 | 1, '/api/sweeps', { cookie, body: { ...world.choice, ...world.about, fileId: id } }),
        ),
      ),
    );
    expect(new Set(kept.map(({ number }) => number)).size).toBe(2);
    expect(await verifyChain(`job-${world.job.id}`)).toBeNull();
  }, 60_000);

  test('a photograph sent to both under one key is one; its bytes come from either', async () => {
    const sent = await Promise.all(
      [0, 1].map((which) =>
        done<{ id: string }>(
          ask(which as 0 | 1, `/api/sweeps/${run.id}/photos`, { cookie, file: pixel(), key: 'two-photo-1' }),
        ),
      ),
    );
    expect(sent[0]!.id).toBe(sent[1]!.id);
    const etags = await Promise.all(
      [0, 1].map(async (which) =>
        (await ask(which as 0 | 1, `/api/photos/${sent[0]!.id}/image`, { cookie })).headers.get('etag'),
      ),
    );
    expect(etags[0]).toBe(etags[1]);
  }, 60_000);

  test('a record changed at one on an old version is refused at the other', async () => {
    const change = (which: 0 | 1, version: number, description: string) =>
      ask(which, `/api/products/${world.product.id}`, {
        method: 'PATCH',
        cookie,
        body: { description },
        headers: { 'if-match': `"${version}"` },
      });
    const answers = await Promise.all([
      change(0, world.product.version, 'one'),
      change(1, world.product.version, 'other'),
    ]);
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 412]);
  });
});

test('two bookings of one position at one time, asked of both at once: one is taken, the other told of the clash', async () => {
  const { cookie } = await signIn(1, world.manager.actor.email);
  const at = (hour: number) => ({ startsAt: `2031-03-04T${hour}:00:00Z`, endsAt: `2031-03-04T${hour + 2}:00:00Z` });
  for (const hour of [10, 13, 16]) {
    const answers = await Promise.all(
      [0, 1].map((which) => ask(which as 0 | 1, '/api/bookings', { cookie, body: { ...world.slot, ...at(hour) } })),
    );
    expect(answers.map(({ status }) => status).sort()).toEqual([201, 409]);
  }
}, 60_000);

test('wrong passwords count together: whoever is shut out at one is shut out at the other', async () => {
  const email = world.outsider.actor.email;
  let tries = 0;
  let shut: Response | null = null;
  while (shut === null && tries < 30) {
    const { status, answer } = await signIn((tries % 2) as 0 | 1, email, 'wrong by far');
    tries += 1;
    if (status === 429) shut = answer;
  }
  expect(shut?.headers.get('retry-after')).toMatch(/^\d+$/);
  const other = await Promise.all([signIn(0, email, 'wrong by far'), signIn(1, email, 'wrong by far')]);
  expect(other.map(({ status }) => status)).toEqual([429, 429]);
}, 120_000);

test('each message in the outbox is done once, by one of the two outboxes', async () => {
  const MESSAGES = 30;
  for (let index = 0; index < MESSAGES; index += 1) {
    await unitOfWork(() =>
      database().query(
        `INSERT INTO outbox (kind, payload, state, available_at, attempts, message_id, created_at)
          VALUES ('housekeeping', '{}', 'queued', UTC_TIMESTAMP(3), 0, 'two-${index}', UTC_TIMESTAMP(3))`,
        { type: QueryTypes.RAW },
      ),
    );
  }
  const counted = async () => {
    const [row] = await unitOfWork(() =>
      database().query<{ sent: string; attempts: string }>(
        "SELECT COALESCE(SUM(state = 'sent'), 0) AS sent, SUM(attempts) AS attempts FROM outbox WHERE message_id LIKE 'two-%'",
        { type: QueryTypes.SELECT },
      ),
    );
    return { sent: Number(row?.sent), attempts: Number(row?.attempts) };
  };
  for (const end = Date.now() + 60_000; (await counted()).sent < MESSAGES && Date.now() < end;) {
    await new Promise((resolve) => setTimeout(resolve, 100));
  }
  expect(await counted()).toEqual({ sent: MESSAGES, attempts: MESSAGES });
  const words = outboxes.map((each) => each.words());
  const done = words.flatMap((text) => text.split('\n').filter((line) => line.includes('"message done"')));
  const ids = done.map((line) => (JSON.parse(line) as { id: string }).id);
  expect(new Set(ids).size).toBe(ids.length);
}, 120_000);
