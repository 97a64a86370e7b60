import { closePasswordWorkers } from '@/auth/passwordWorker';
import type { SweepView } from '@/schemas/sweep';
import type { SweepFileView } from '@/schemas/sweepFile';
import { freshDatabase, type TestDatabase } from '../support/database';
import { type RunningServer, runEntry, startServer, testEnvironment } from '../support/server';
import { enterWorld, sweepFile, type World } from '../support/world';

/* The built product as a bench PC uses it: a token from the command, two requests, no cookie and no browser. */

let schema: TestDatabase;
let world: World;
let server: RunningServer;
let token = '';

beforeAll(async () => {
  schema = await freshDatabase();
  world = await enterWorld();
  server = await startServer(schema);
  const environment = testEnvironment(schema, 3000);
  const args = [world.technician.actor.email, 'bench PC', '--scopes', 'upload'];
  const words = await runEntry('src/ops/commands/token-issue.ts', args, environment);
  token = /sfd_[0-9A-Za-z]{40}/.exec(words)![0];
}, 120_000);
afterAll(async () => {
  await server.stop();
  await closePasswordWorkers();
  await schema.close();
});

const ask = (path: string, init: RequestInit & { headers?: Record<string, string> } = {}) =>
  fetch(`${server.origin}${path}`, { ...init, headers: { authorization: `Bearer ${token}`, ...init.headers } });

test('with a token alone, two requests go from a file to its verdict', async () => {
  const { name, bytes } = sweepFile({ 144: 60.2 });
  const form = new FormData();
  form.append('file', new File([bytes], name));
  const sent = await ask('/api/sweep-files', { method: 'POST', body: form });
  expect(sent.status).toBe(201);
  const file = (await sent.json()) as SweepFileView;
  const kept = await ask('/api/sweeps', {
    method: 'POST',
    headers: { 'content-type': 'application/json', 'idempotency-key': 'bench-pc-0001' },
    body: JSON.stringify({ ...world.choice, ...world.about, fileId: file.id }),
  });
  expect(kept.status).toBe(201);
  const run = (await kept.json()) as SweepView;
  expect(run.evaluation.verdict).toBe('needs-final');
  const original = await ask(`/api/sweeps/${run.id}/file`);
  expect(Buffer.from(await original.arrayBuffer()).equals(Buffer.from(bytes))).toBe(true);
});

test('a file cut off in the middle of sending leaves nothing behind', async () => {
  const boundary = 'cut-in-the-middle';
  const stop = new AbortController();
  const body = new ReadableStream({
    start(controller) {
      const head = `--${boundary}\r\nContent-Disposition: form-data; name="file"; filename="cut.csv"\r\n\r\n30.0,20\r\n`;
      controller.enqueue(new TextEncoder().encode(head));
      setTimeout(() => stop.abort(), 200);
    },
  });
  const sending = ask('/api/sweep-files', {
    method: 'POST',
    headers: { 'content-type': `multipart/form-data; boundary=${boundary}` },
    body,
    signal: stop.signal,
    duplex: 'half',
  } as RequestInit & { headers: Record<string, string> });
  await expect(sending).rejects.toThrow();
  await new Promise((resolve) => setTimeout(resolve, 500));
  const { Upload } = await import('@/models/upload');
  const { unitOfWork } = await import('@/models/unitOfWork');
  expect(await unitOfWork(() => Upload.count({ where: { name: 'cut.csv' } }))).toBe(0);
  expect((await ask('/api/sweeps')).status).toBe(200);
});

test('a file larger than 100 MB is answered 413 while it is being sent, and the server goes on', async () => {
  const boundary = 'too-large';
  const chunk = new Uint8Array(1024 * 1024).fill(48);
  let sent = 0;
  const body = new ReadableStream({
    start(controller) {
      const head = `--${boundary}\r\nContent-Disposition: form-data; name="file"; filename="large.csv"\r\n\r\n`;
      controller.enqueue(new TextEncoder().encode(head));
    },
    pull(controller) {
      sent += 1;
      if (sent > 130) controller.close();
      else controller.enqueue(chunk);
    },
  });
  const answer = await ask('/api/sweep-files', {
    method: 'POST',
    headers: { 'content-type': `multipart/form-data; boundary=${boundary}` },
    body,
    duplex: 'half',
  } as RequestInit & { headers: Record<string, string> });
  expect(answer.status).toBe(413);
  expect(await answer.text()).toMatch(/100 MB/);
  expect((await ask('/api/sweeps')).status).toBe(200);
}, 60_000);

test('a JSON body that never ends is answered 413 as well, before anybody has signed in', async () => {
  const chunk = new TextEncoder().encode(' '.repeat(64 * 1024));
  let sent = 0;
  const body = new ReadableStream({
    pull(controller) {
      sent += 1;
      if (sent > 160) controller.close();
      else controller.enqueue(chunk);
    },
  });
  const headers = { 'content-type': 'application/json', origin: server.origin };
  const init = { method: 'POST', headers, body, duplex: 'half' } as RequestInit;
  const answer = await fetch(`${server.origin}/api/session`, init);
  expect(answer.status).toBe(413);
  expect((await ask('/api/sweeps')).status).toBe(200);
});

test('a token does what its scope says and nothing a person at a browser does', async () => {
  const answer = await ask('/api/products', {
    method: 'POST',
    headers: { 'content-type': 'application/json' },
    body: JSON.stringify({ organisationId: world.client.publicId, code: 'X', name: 'X' }),
  });
  expect(answer.status).toBe(403);
  const wrong = await fetch(`${server.origin}/api/sweeps`, { headers: { authorization: 'Bearer sfd_wrong' } });
  expect(wrong.status).toBe(401);
});

test('a run acknowledged before the web process is killed is there afterwards', async () => {
  const before = ((await (await ask('/api/sweeps?limit=200')).json()) as { items: unknown[] }).items.length;
  const { name, bytes } = sweepFile({ 200: 44 });
  const form = new FormData();
  form.append('file', new File([bytes], name));
  const file = (await (await ask('/api/sweep-files', { method: 'POST', body: form })).json()) as SweepFileView;
  const kept = await ask('/api/sweeps', {
    method: 'POST',
    headers: { 'content-type': 'application/json' },
    body: JSON.stringify({ ...world.choice, ...world.about, fileId: file.id }),
  });
  expect(kept.status).toBe(201);
  server.process.kill('SIGKILL');
  server = await startServer(schema);
  const after = (await (await ask('/api/sweeps?limit=200')).json()) as { items: unknown[] };
  expect(after.items).toHaveLength(before + 1);
}, 60_000);
