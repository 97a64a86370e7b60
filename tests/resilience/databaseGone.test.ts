import { Op } from 'sequelize';
import { closePasswordWorkers } from '@/auth/passwordWorker';
import { closeDatabase } from '@/models/database';
import { Evaluation } from '@/models/evaluation';
import { IdempotencyKey } from '@/models/idempotencyKey';
import { Photo } from '@/models/photo';
import { PhotoPart } from '@/models/photoPart';
import { Product } from '@/models/product';
import { Sweep } from '@/models/sweep';
import { SweepFilePart } from '@/models/sweepFilePart';
import { SweepSegment } from '@/models/sweepSegment';
import { unitOfWork } from '@/models/unitOfWork';
import { OPERATIONS } from '@/schemas/operations';
import { verifyChain } from '@/services/audit';
import { PASSWORD } from '../auth/people';
import { goneDatabase, type GoneDatabase } from '../support/goneDatabase';
import { routesOf } from '../support/routes';
import { enterWorld, pixel, sweepFile, type World } from '../support/world';

/*
 * A MariaDB of this file's own, which flushes each commit to the disk, goes under several clients and comes back:
 * killed, then stopped in order. The handlers are called as the server calls them, over the one pool of this process.
 */

const ORIGIN = 'http://localhost:3000';
const OUT_MS = 2500;
/** From the moment the database answers again to the first request that does. */
const RECOVERED_WITHIN_MS = 5000;

let database: GoneDatabase;
let world: World;
let call: (request: Request) => Promise<Response>;

beforeAll(async () => {
  database = await goneDatabase(3617);
  const secret = 'a session secret that only the tests use';
  Object.assign(process.env, { DATABASE_URL: database.databaseUrl, SESSION_SECRET: secret, APP_ORIGIN: ORIGIN });
  world = await enterWorld();
  call = await routesOf();
}, 180_000);

afterAll(async () => {
  await closePasswordWorkers();
  await closeDatabase();
  await database.remove();
}, 60_000);

interface Asked {
  method?: string;
  body?: unknown;
  file?: { name: string; bytes: Uint8Array<ArrayBuffer> };
  key?: string;
  cookie?: string | null;
  headers?: Record<string, string>;
}

function requestOf(address: string, { method, body, file, key, cookie, headers = {} }: Asked = {}): Request {
  const sent = new Headers({ origin: ORIGIN, ...headers });
  const from = cookie === undefined ? world.technician.cookie : cookie;
  if (from) sent.set('cookie', from);
  if (key) sent.set('idempotency-key', key);
  if (body !== undefined) sent.set('content-type', 'application/json');
  const form = file && new FormData();
  form?.append('file', new File([file!.bytes], file!.name));
  const verb = method ?? (body !== undefined || file ? 'POST' : 'GET');
  return new Request(`${ORIGIN}${address}`, {
    method: verb,
    headers: sent,
    body: form ?? ((body && JSON.stringify(body)) as string),
  });
}
const ask = (address: string, asked?: Asked) => call(requestOf(address, asked));
const pause = (ms: number) => new Promise((resolve) => setTimeout(resolve, ms));

const signIn = () =>
  ask('/api/session', { cookie: null, body: { email: world.technician.actor.email, password: PASSWORD } });
const product = (key: string) =>
  ask('/api/products', { key, body: { organisationId: world.client.publicId, code: key, name: 'under use' } });
const upload = (key: string) => ask('/api/sweep-files', { key, file: sweepFile() });
const keep = (key: string, fileId: string) =>
  ask('/api/sweeps', { key, body: { ...world.choice, ...world.about, fileId } });
const photograph = (key: string) => ask(`/api/sweeps/${world.run.id}/photos`, { key, file: pixel() });

const DONE = ['keep', 'list', 'photograph', 'product', 'session', 'sign-in', 'upload'];
/** Nobody comes to keep what could not be uploaded. */
const REFUSED = DONE.filter((what) => what !== 'keep');

async function until(so: () => boolean, atMostMs: number): Promise<void> {
  for (const end = Date.now() + atMostMs; !so() && Date.now() < end;) await pause(50);
}

interface Seen {
  what: string;
  key: string | null;
  status: number;
  problem: { type?: string; detail?: string; repeatable?: boolean } | null;
  retryAfter: string | null;
  cookieCleared: boolean;
  ms: number;
  reply: { id?: string } | null;
}

async function see(what: string, key: string | null, work: Promise<Response>): Promise<Seen> {
  const begun = performance.now();
  const answer = await work;
  const text = await answer.text();
  const json = (text === '' ? null : JSON.parse(text)) as never;
  return {
    what,
    key,
    status: answer.status,
    problem: answer.ok ? null : json,
    retryAfter: answer.headers.get('retry-after'),
    cookieCleared: /(^|; )(Max-Age=0|Expires=Thu, 01 Jan 1970)/i.test(answer.headers.get('set-cookie') ?? ''),
    ms: performance.now() - begun,
    reply: answer.ok ? json : null,
  };
}

/** Several clients, each at its own work, until they are told to stop; everything they saw. */
function underUse(round: string) {
  const seen: Seen[] = [];
  let stopped = false;
  const client = async (name: string, turn: (key: string) => Promise<void>) => {
    for (let i = 0; !stopped; i++) {
      await turn(`${round}-${name}-${i}`);
      // One that is refused at once asks again at once; a person does not.
      await pause(20);
    }
  };
  const note = async (what: string, key: string | null, work: Promise<Response>) => {
    const one = await see(what, key, work);
    seen.push(one);
    return one;
  };
  const clients = [
    client('reader', async () => {
      await note('list', null, ask('/api/sweeps'));
      await note('session', null, ask('/api/session'));
    }),
    client('door', async () => void (await note('sign-in', null, signIn()))),
    client('writer', async (key) => void (await note('product', key, product(key)))),
    client('camera', async (key) => {
      await note('photograph', key, photograph(key));
      // A run takes 40.
      await pause(600);
    }),
    client('bench', async (key) => {
      const sent = await note('upload', `${key}-file`, upload(`${key}-file`));
      if (sent.reply?.id) await note('keep', `${key}-keep`, keep(`${key}-keep`, sent.reply.id));
    }),
  ];
  const stop = async () => {
    stopped = true;
    await Promise.all(clients);
  };
  return { seen, stop };
}

const rounds = [
  ['killed', async () => database.kill()],
  ['stopped in order', async () => database.stop()],
] as const;

describe.each(rounds)('the database is %s under five clients', (how, stop) => {
  let seen: Seen[];
  let recoveredMs: number;

  test('it goes, and comes back to the same process', async () => {
    const use = underUse(how.slice(0, 4));
    await until(() => DONE.every((what) => use.seen.some((one) => one.what === what && one.status < 300)), 40_000);
    const warn = jest.spyOn(console, 'warn').mockImplementation(() => undefined);
    await stop();
    await pause(OUT_MS);
    await until(() => REFUSED.every((what) => use.seen.some((one) => one.what === what && one.status === 503)), 20_000);
    await database.startAgain();
    const back = performance.now();
    for (const address of ['/api/ready', '/api/sweeps']) {
      while ((await ask(address)).status !== 200 && performance.now() - back < 30_000) await pause(50);
    }
    recoveredMs = performance.now() - back;
    while ((await signIn()).status !== 200 && performance.now() - back < 60_000) await pause(50);
    await pause(3000);
    await use.stop();
    warn.mockRestore();
    seen = use.seen;
  }, 120_000);

  test('it was under use: each kind of work was done, and refused', () => {
    const kinds = (fits: (one: Seen) => boolean) => [...new Set(seen.filter(fits).map(({ what }) => what))].sort();
    expect(kinds(({ status }) => status < 300)).toEqual(DONE);
    expect(kinds(({ status }) => status === 503)).toEqual(expect.arrayContaining(REFUSED));
  });

  test('whatever was not done was answered 503 with Retry-After as a problem, within seconds, and nobody was signed out', () => {
    const refused = seen.filter(({ status }) => status >= 300);
    expect(refused.length).toBeGreaterThan(0);
    expect(
      refused.filter(({ status, retryAfter, problem }) => {
        return !(status === 503 && retryAfter === '2' && problem?.type === '/problems/unavailable');
      }),
    ).toEqual([]);
    expect(refused.filter(({ cookieCleared }) => cookieCleared)).toEqual([]);
    expect(Math.max(...refused.map(({ ms }) => ms))).toBeLessThan(15_000);
  });

  test('it recovers within seconds, without a restart, and the session from before still stands', async () => {
    expect(recoveredMs).toBeLessThan(RECOVERED_WITHIN_MS);
    expect((await ask('/api/session')).status).toBe(200);
  });

  test('every acknowledged write is there', async () => {
    const done = (what: string) => seen.filter((one) => one.what === what && one.status === 201);
    await unitOfWork(async () => {
      const codes = done('product').map(({ key }) => key!);
      expect(await Product.count({ where: { code: codes } })).toBe(codes.length);
      const kept = done('keep').map(({ reply }) => reply!.id!);
      expect(await Sweep.count({ where: { publicId: kept } })).toBe(kept.length);
      const pictures = done('photograph').map(({ reply }) => reply!.id!);
      expect(await Photo.count({ where: { publicId: pictures } })).toBe(pictures.length);
    });
    for (const { reply } of done('upload')) expect((await ask(`/api/sweep-files/${reply!.id}`)).status).toBe(200);
  });

  test('nothing is there by half: each run has its evaluation, its points and its file, each picture both its sizes', async () => {
    await unitOfWork(async () => {
      for (const run of await Sweep.findAll()) {
        expect(await Evaluation.count({ where: { id: run.evaluationId!, sweepId: run.id } })).toBe(1);
        expect(await SweepSegment.count({ where: { sweepId: run.id } })).toBeGreaterThan(0);
        expect(await SweepFilePart.count({ where: { sweepFileId: run.sweepFileId } })).toBeGreaterThan(0);
      }
      for (const { id } of await Photo.findAll()) {
        expect(await PhotoPart.count({ where: { photoId: id }, distinct: true, col: 'size' })).toBe(2);
      }
    });
    const numbers = (await unitOfWork(() => Sweep.findAll())).map(({ number }) => number);
    expect(new Set(numbers).size).toBe(numbers.length);
    expect(await verifyChain(`job-${world.job.id}`)).toBeNull();
    expect(await verifyChain('lab')).toBeNull();
  });

  test('what was refused and is sent again under its key is done once, also where the answer to a commit was lost', async () => {
    const again = seen.filter(({ what, status }) => status === 503 && (what === 'product' || what === 'photograph'));
    for (const { what, key, problem } of again) {
      const repeat = () => (what === 'product' ? product(key!) : photograph(key!));
      const before = await unitOfWork(() => IdempotencyKey.count({ where: { key: key! } }));
      // Said to be unchanged means unchanged.
      if (problem!.detail!.startsWith('Nothing was changed')) expect([key, before]).toEqual([key, 0]);
      const [first, second] = [await repeat(), await repeat()];
      expect([first.status, second.status, await second.text()]).toEqual([201, 201, await first.text()]);
    }
    const codes = again.filter(({ what }) => what === 'product').map(({ key }) => key!);
    expect(await unitOfWork(() => Product.count({ where: { code: codes } }))).toBe(codes.length);
    const keys = seen.filter(({ what }) => what === 'photograph').map(({ key }) => key!);
    const stored = await unitOfWork(() => IdempotencyKey.count({ where: { key: keys } }));
    const replies = await unitOfWork(() => IdempotencyKey.findAll({ where: { key: { [Op.in]: keys } } }));
    expect(new Set(replies.map(({ reply }) => (JSON.parse(reply) as { id: string }).id)).size).toBe(stored);
  }, 60_000);
});

describe('while it is gone', () => {
  beforeAll(async () => {
    await database.stop();
  }, 60_000);
  afterAll(async () => {
    await database.startAgain();
  }, 60_000);

  test('the process is up and not ready', async () => {
    const ready = await ask('/api/ready', { cookie: null });
    expect([ready.status, ready.headers.get('retry-after'), ready.headers.get('content-type')]).toEqual([
      503,
      '2',
      'application/problem+json',
    ]);
    expect((await ask('/api/health', { cookie: null })).status).toBe(200);
  });

  test.each(OPERATIONS.map((op) => [op.id, op] as const))(
    '%s with a cookie is 503 with Retry-After, never 401, and clears no cookie',
    async (_id, op) => {
      const address = op.path.replace(/\{\w+\}/g, '0000000000000000');
      const body = op.method === 'GET' ? undefined : {};
      const asked = op.upload ? { file: pixel() } : { body };
      const headers = { 'if-match': '"1"' };
      const answer = await ask(address, { method: op.method, ...asked, headers });
      expect([answer.status, answer.headers.get('retry-after'), answer.headers.get('set-cookie')]).toEqual([
        503,
        '2',
        null,
      ]);
      expect(await answer.json()).toMatchObject({ type: '/problems/unavailable', repeatable: true });
    },
  );

  test('signing in, without any cookie', async () => {
    const answer = await signIn();
    expect([answer.status, answer.headers.get('retry-after')]).toEqual([503, '2']);
    expect(await answer.json()).toMatchObject({ repeatable: true });
  });

  test('it is said at once, not after a long wait', async () => {
    const begun = performance.now();
    await Promise.all(Array.from({ length: 30 }, () => ask('/api/sweeps')));
    expect(performance.now() - begun).toBeLessThan(8000);
  });
});
