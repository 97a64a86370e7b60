import { z } from 'zod';
import { PATCH as changeState } from '@/app/api/states/[id]/route';
import { POST as createState } from '@/app/api/samples/[id]/states/route';
import { GET as readSample } from '@/app/api/samples/[id]/route';
import { POST as createProduct } from '@/app/api/products/route';
import { POST as signIn } from '@/app/api/session/route';
import { closePasswordWorkers } from '@/auth/passwordWorker';
import { handle } from '@/http/handle';
import { DatabaseGone } from '@/models/databaseGone';
import { Product } from '@/models/product';
import { unitOfWork } from '@/models/unitOfWork';
import { operation } from '@/schemas/operation';
import { createProduct as createProductOperation } from '@/schemas/job';
import { createProduct as enterProduct } from '@/services/products';
import { freshDatabase, type TestDatabase } from '../support/database';
import { enterWorld, type World } from '../support/world';

const ORIGIN = 'http://localhost:3000';

let schema: TestDatabase;
let world: World;

beforeAll(async () => {
  schema = await freshDatabase();
  world = await enterWorld();
}, 120_000);
afterAll(async () => {
  await closePasswordWorkers();
  await schema.close();
});

const JSON_TYPE = { 'content-type': 'application/json', origin: ORIGIN };
const asTechnician = (more: Record<string, string> = {}) => ({
  ...JSON_TYPE,
  cookie: world.technician.cookie,
  ...more,
});
const post = (body: unknown, headers: Record<string, string>, method = 'POST') =>
  new Request(`${ORIGIN}/x`, { method, headers, body: JSON.stringify(body) });
const at = (id: string) => ({ params: Promise.resolve({ id }) });

describe('a JSON body without a stated length', () => {
  /** Sends `chunk` as often as it is asked for, at most `times`. */
  function inChunks(chunk: string, times: number) {
    const sent = { chunks: 0, cancelled: false };
    const body = new ReadableStream({
      pull(controller) {
        if (sent.chunks === times) return controller.close();
        sent.chunks += 1;
        controller.enqueue(new TextEncoder().encode(chunk));
      },
      cancel: () => void (sent.cancelled = true),
    });
    const init = { method: 'POST', headers: JSON_TYPE, body, duplex: 'half' };
    return { sent, request: new Request(`${ORIGIN}/api/session`, init as RequestInit) };
  }

  test('beyond 1 MB it is answered 413, before sign-in too, and the rest is not read', async () => {
    const { sent, request } = inChunks('x'.repeat(64 * 1024), 1000);
    expect((await signIn(request)).status).toBe(413);
    expect(sent.cancelled).toBe(true);
    expect(sent.chunks).toBeLessThan(20);
  });

  test('a short one is read whole, also where a chunk ends inside a letter', async () => {
    const echo = operation({
      id: 'echo',
      method: 'POST',
      path: '/x',
      summary: '',
      permission: null,
      status: 200,
      body: z.strictObject({ said: z.string() }),
      reply: z.strictObject({ said: z.string() }),
    });
    const bytes = new TextEncoder().encode('{"said":"µV"}');
    const body = new ReadableStream({
      start(controller) {
        controller.enqueue(bytes.subarray(0, 10));
        controller.enqueue(bytes.subarray(10));
        controller.close();
      },
    });
    const init = { method: 'POST', headers: JSON_TYPE, body, duplex: 'half' } as RequestInit;
    const answer = await handle(echo, async ({ body: given }) => given)(new Request(`${ORIGIN}/x`, init));
    expect(await answer.json()).toEqual({ said: 'µV' });
  });
});

describe('what a broken request says of itself', () => {
  const promise = z.strictObject({ promised: z.string() });
  const entry = (code: string) => ({ organisationId: world.client.publicId, code, name: 'X', description: '' });
  const count = (code: string) => unitOfWork(() => Product.count({ where: { code } }));
  const detail = async (answer: Response) => ((await answer.json()) as { detail: string }).detail;
  const broken = () =>
    handle({ ...createProductOperation, reply: promise }, ({ actor, body }) => enterProduct(actor, body));

  test('a reply that is not as declared undoes the work that came under a key', async () => {
    const answer = await broken()(post(entry('K-1'), asTechnician({ 'idempotency-key': 'broken-reply-1' })));
    expect([answer.status, await count('K-1')]).toEqual([500, 0]);
    expect(await detail(answer)).toMatch(/^It is not certain.*; a repeat with the same Idempotency-Key is done once\./);
  });

  test('without a key it may be there, and nobody is told otherwise', async () => {
    const answer = await broken()(post(entry('K-2'), asTechnician()));
    expect([answer.status, await count('K-2')]).toEqual([500, 1]);
    expect(await detail(answer)).toMatch(/^It is not certain that this was done\. Look before you repeat it\. /);
  });

  test('a database that goes during a write is 503 without a promise; during a read it is worth another try', async () => {
    const gone = async () => {
      throw new DatabaseGone(new Error('gone'), true);
    };
    const write = await handle(createProductOperation, gone)(post(entry('K-3'), asTechnician()));
    expect([write.status, await write.json()]).toMatchObject([
      503,
      { detail: 'It is not certain that this was done. Look before you repeat it.' },
    ]);
    const read = operation({ id: 'r', method: 'GET', path: '/x', summary: '', permission: null, status: 200 });
    const answer = await handle(read, gone)(new Request(`${ORIGIN}/x`));
    expect([answer.status, await detail(answer)]).toEqual([503, 'This could not be read. Try again in a few seconds.']);
    expect(answer.headers.get('retry-after')).toBe('2');
  });

  test.each([
    ['before its commit nothing was changed', false, /^Nothing was changed\. Try again/],
    [
      'during its commit a repeat under the key is done once',
      true,
      /^It is not certain.*same Idempotency-Key is done once\.$/,
    ],
  ])('under a key, a database that goes %s, and either may be repeated', async (_what, uncertain, words) => {
    const gone = async () => {
      throw new DatabaseGone(new Error('gone'), uncertain);
    };
    const key = { 'idempotency-key': `gone-${uncertain}-1` };
    const answer = await handle(createProductOperation, gone)(post(entry('K-5'), asTechnician(key)));
    expect([answer.status, await answer.json()]).toMatchObject([
      503,
      { repeatable: true, detail: expect.stringMatching(words) },
    ]);
  });

  test('a repeat under a key answers the same bytes', async () => {
    const send = () => createProduct(post(entry('K-4'), asTechnician({ 'idempotency-key': 'same-bytes-1' })));
    const [first, second] = [await send(), await send()];
    expect(await second.text()).toBe(await first.text());
    expect(second.headers.get('idempotency-replayed')).toBe('true');
    expect([second.status, second.headers.get('etag')]).toEqual([201, first.headers.get('etag')]);
  });
});

describe('ETag and If-Match', () => {
  const whole = async () => {
    const answer = await readSample(post(undefined, asTechnician(), 'GET'), at(world.sample.id));
    return { etag: answer.headers.get('etag'), view: (await answer.json()) as World['sample'] };
  };

  test('the record named in the path and the one just created come with their version', async () => {
    const { etag, view } = await whole();
    expect(etag).toBe(`"${view.version}"`);
    const made = await createProduct(
      post({ organisationId: world.client.publicId, code: 'E-1', name: 'X' }, asTechnician()),
    );
    expect(made.headers.get('etag')).toBe('"1"');
  });

  test('a state changes on its own version; the version of its sample is not offered in its place', async () => {
    await createState(post({ description: 'ferrite' }, asTechnician()), at(world.sample.id));
    const state = (await whole()).view.states[1]!;
    const change = (version: number, description: string) =>
      changeState(post({ description }, asTechnician({ 'if-match': `"${version}"` }), 'PATCH'), at(state.id));
    const answer = await change(state.version, 'ferrite on the cable');
    expect([answer.status, answer.headers.get('etag')]).toEqual([200, null]);
    const now = (await whole()).view.states[1]!;
    expect(now.version).toBe(state.version + 1);
    expect((await change(now.version, 'ferrite, two turns')).status).toBe(200);
    expect((await change(now.version, 'too late')).status).toBe(412);
  });

  test('a change without a version is told where to find it', async () => {
    const answer = await changeState(post({ description: 'x' }, asTechnician(), 'PATCH'), at('0000000000000000'));
    expect([answer.status, ((await answer.json()) as { detail: string }).detail]).toEqual([
      428,
      'Name in If-Match the version of the record as your last read showed it, such as "3".',
    ]);
  });
});

test('a refused sign-in is one line in the security log', async () => {
  const lines: string[] = [];
  const write = jest.spyOn(process.stdout, 'write').mockImplementation((text) => lines.push(String(text)) > 0);
  process.env.STILLFIELD_LOG = '1';
  try {
    const answer = await signIn(post({ email: world.technician.actor.email, password: 'wrong wrong' }, JSON_TYPE));
    expect(answer.status).toBe(401);
  } finally {
    delete process.env.STILLFIELD_LOG;
    write.mockRestore();
  }
  const events = lines.map((line) => (JSON.parse(line) as { event: string }).event);
  expect(events).toEqual(['sign-in-refused']);
});
