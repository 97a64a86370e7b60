import { request } from 'node:http';
import { connect } from 'node:net';
import { freshDatabase, type TestDatabase } from '../support/database';
import { type RunningServer, startServer } from '../support/server';

let world: TestDatabase;
let server: RunningServer;
beforeAll(async () => {
  world = await freshDatabase();
  server = await startServer(world);
}, 60_000);
afterAll(async () => {
  await server.stop();
  await world.close();
});

const logged = (path: string) =>
  server
    .log()
    .split('\n')
    .filter((line) => line.startsWith('{'))
    .map((line) => JSON.parse(line) as Record<string, unknown>)
    .filter((line) => line.event === 'request' && line.path === path);

test('a client that claims another address is logged under its own', async () => {
  const answer = await fetch(`${server.origin}/nowhere-forged`, { headers: { 'x-forwarded-for': '203.0.113.9' } });
  await answer.text();
  await new Promise((resolve) => setTimeout(resolve, 200));
  expect(logged('/nowhere-forged')).toEqual([expect.objectContaining({ address: '127.0.0.1', method: 'GET' })]);
});

test('a query string is never logged', async () => {
  await (await fetch(`${server.origin}/nowhere-query?token=sesame`)).text();
  await new Promise((resolve) => setTimeout(resolve, 200));
  expect(logged('/nowhere-query')).toHaveLength(1);
  expect(server.log()).not.toContain('sesame');
});

test('after SIGTERM a request in flight is answered, a new one is not accepted, and the process ends with 0', async () => {
  const { port } = new URL(server.origin);
  const body = JSON.stringify({ email: 'nobody@pellorrin.example', password: 'not the passphrase of anybody' });
  const slow = request({
    host: '127.0.0.1',
    port,
    method: 'POST',
    path: '/api/session',
    headers: { 'content-type': 'application/json', 'content-length': body.length, origin: server.origin },
  });
  let early = false;
  const answered = new Promise<number | undefined>((resolve, reject) => {
    slow.once('response', () => (early = true));
    slow.once('response', (response) => response.resume().once('end', () => resolve(response.statusCode)));
    slow.once('error', reject);
  });
  slow.write(body.slice(0, 10));
  await new Promise((resolve) => setTimeout(resolve, 300));
  const ended = server.stop();
  await new Promise((resolve) => setTimeout(resolve, 300));
  const refused = await new Promise((resolve) => {
    const socket = connect(Number(port), '127.0.0.1');
    socket.once('connect', () => resolve('accepted'));
    socket.once('error', (error: NodeJS.ErrnoException) => resolve(error.code));
  });
  expect(refused).toBe('ECONNREFUSED');
  expect(early).toBe(false);
  slow.end(body.slice(10));
  expect([400, 401, 422]).toContain(await answered);
  expect(await ended).toBe(0);
}, 60_000);
