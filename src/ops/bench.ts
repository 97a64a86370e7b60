/*
 * npm run bench: what a lab waits for, as ratios within one run. One JSON line per figure on standard output; times are
 * medians in milliseconds. Nothing here asserts; machines differ, ratios less.
 */
import { type ChildProcess, spawn, spawnSync } from 'node:child_process';
import { existsSync } from 'node:fs';
import { createServer, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import path from 'node:path';
import Papa from 'papaparse';
import { dateOf } from '@fixtures/demo/dates';
import { equipment } from '@fixtures/demo/equipment';
import { limitSets } from '@fixtures/demo/limitSets';
import { organisations, users } from '@fixtures/demo/people';
import { closeDatabase, database } from '@/models/database';
import { SignalPath } from '@/models/signalPath';
import { unitOfWork } from '@/models/unitOfWork';
import type { Actor } from '@/auth/actor';
import { evaluateNow } from '@/emc/evaluate';
import { readSweep } from '@/ingest/read';
import { recognise } from '@/ingest/recognise';
import { createJob } from '@/services/jobs';
import { gather } from '@/services/judgeFile';
import { keepSweep } from '@/services/keepSweep';
import { toCoreLine } from '@/services/limitSets';
import { createProduct } from '@/services/products';
import { createSample } from '@/services/samples';
import { createSweepFile } from '@/services/sweepFiles';
import type { SweepChoice } from '@/schemas/sweep';
import { enterPublishedLimits } from './publishedLimits';
import { seedEquipment, seedPaths } from './seedBench';
import { seedPeople } from './seedPeople';

const POINTS = 10_000;
const ROUNDS = 15;

const say = (line: Record<string, unknown>) => process.stdout.write(`${JSON.stringify(line)}\n`);
const rounded = (value: number) => Math.round(value * 100) / 100;

async function median(work: () => unknown, rounds = ROUNDS): Promise<number> {
  const times: number[] = [];
  for (let i = 0; i < rounds + 2; i++) {
    const start = performance.now();
    await work();
    if (i >= 2) times.push(performance.now() - start);
  }
  return times.sort((a, b) => a - b)[Math.floor(times.length / 2)]!;
}

/** A peak and an average trace of 30 to 1000 MHz: a floor that wanders, a line every 97 points. */
function sweepText(points: number): string {
  let state = 12345;
  const random = () => ((state = (state * 1103515245 + 12345) % 2147483648) / 2147483648) * 3;
  const step = 970e6 / (points - 1);
  const rows = Array.from({ length: points }, (_, i) => {
    const peak = 22 + random() + (i % 97 === 0 ? 24 : 0);
    return `${(30e6 + i * step).toFixed(1)},${peak.toFixed(3)},${(peak - 4 - random()).toFixed(3)}`;
  });
  return `RBW,120 kHz\nFrequency (Hz),Peak (dBuV),Average (dBuV)\n${rows.join('\n')}\n`;
}

interface Lab {
  actor: Actor;
  choice: SweepChoice;
  stateId: string;
}

async function enterLab(): Promise<Lab> {
  const seedDay = new Date().toISOString().slice(0, 10);
  const at = (day: number) => new Date(`${dateOf(seedDay, day)}T08:00:00Z`);
  return unitOfWork(async () => {
    const people = await seedPeople(organisations, users, at(-400));
    const manager = people.actor('anselm');
    const sets = await enterPublishedLimits(manager, limitSets, at(-399));
    await seedPaths(manager, await seedEquipment(manager, equipment, (day) => dateOf(seedDay, day), at), at);
    const organisationId = people.organisation('pell-orrin').publicId;
    const product = await createProduct(manager, { organisationId, code: 'B-1', name: 'Bench load', description: '' });
    const job = await createJob(manager, { productId: product.id, title: 'bench', decisionRule: 'guarded-by-u' });
    const sample = await createSample(manager, job.id, { serial: '1', firmware: '', description: '' });
    const path = await SignalPath.findOne({ where: { code: 'P-3' }, rejectOnEmpty: true });
    const trace = (index: number, name: string, detector: 'peak' | 'average') =>
      ({ index, name, unit: 'dBuV', detector, rbwHz: 120e3 }) as const;
    return {
      actor: people.actor('mira'),
      stateId: sample.states[0]!.id,
      choice: {
        purpose: 'prescan',
        port: 'enclosure',
        line: null,
        polarisation: 'horizontal',
        distanceM: 3,
        pathId: path.publicId,
        limitSetId: sets.get('cispr32-b-enclosure-3m')!.publicId,
        valuesHold: 'receiver-input',
        alreadyCorrected: [],
        frequencyUnit: 'Hz',
        centreHz: null,
        sweepIndex: 0,
        keepPartial: false,
        traces: [trace(0, 'Peak', 'peak'), trace(1, 'Average', 'average')],
      },
    };
  });
}

async function benchImport({ actor, choice, stateId }: Lab): Promise<string> {
  const text = sweepText(POINTS);
  const bytes = new TextEncoder().encode(text);
  const about = {
    stateId,
    operatingMode: 'bench',
    heightM: null,
    heightSwept: false,
    azimuthDeg: null,
    measuredAt: null,
    trial: null,
  };
  let runId = '';
  const whole = await median(async () => {
    const file = await createSweepFile(actor, { name: 'bench.csv', bytes });
    runId = (await keepSweep(actor, { ...choice, ...about, fileId: file.id })).id;
  });
  const papaparse = await median(() => Papa.parse(text, { dynamicTyping: true }));
  const reading = await median(() => bytes.reduce((sum, byte) => sum ^ byte, 0));
  const recognising = await median(() => recognise(bytes, 'bench.csv'));
  const recognition = recognise(bytes);
  const { terms, lines, path: its } = await unitOfWork(() => gather(recognition, choice, new Date()));
  const read = readSweep(bytes, recognition, { frequencyUnit: 'Hz' });
  const input = {
    ...{ purpose: choice.purpose, port: choice.port, rule: 'guarded-by-u' as const },
    terms: terms.map(({ term }) => term),
    lines: lines.map(toCoreLine),
    uncertainty: its!.revision.uncertainty,
    traces: choice.traces.map((trace, i) => ({
      ...trace,
      ...{ rbwShape: null, vbwHz: null },
      frequencyHz: read.frequencyHz,
      reading: new Float32Array(read.traces[i]!.values),
    })),
  };
  const evaluating = await median(() => evaluateNow(input));
  say({
    bench: 'import',
    points: POINTS,
    traces: 2,
    bytes: bytes.length,
    what: 'recognise, parse, correct, evaluate and store: upload and keep, with a durable commit each',
    ms: rounded(whole),
    aimMs: 300,
    recogniseMs: rounded(recognising),
    evaluateMs: rounded(evaluating),
    papaparseMs: rounded(papaparse),
    readBytesMs: rounded(reading),
    timesPapaparse: rounded(whole / papaparse),
    timesReadBytes: rounded(whole / reading),
  });
  return runId;
}

/** A server of the bare platform that answers one body, to hold the product's own against. */
function bareServer(body: string): Promise<{ origin: string; server: Server }> {
  const server = createServer((_request, response) => {
    response.writeHead(200, { 'content-type': 'application/json' }).end(body);
  });
  return new Promise((resolve) =>
    server.listen(0, '127.0.0.1', () =>
      resolve({ origin: `http://127.0.0.1:${(server.address() as AddressInfo).port}`, server }),
    ),
  );
}

async function startProduct(port: number): Promise<ChildProcess> {
  const root = process.cwd();
  const dist = process.env.NEXT_DIST_DIR || '.next';
  if (!existsSync(path.join(root, dist, 'BUILD_ID'))) {
    const built = spawnSync(process.execPath, ['node_modules/next/dist/bin/next', 'build'], { cwd: root });
    if (built.status !== 0) throw new Error(`next build failed: ${built.stderr}`);
  }
  const child = spawn(process.execPath, ['--import', 'tsx', 'src/ops/server.ts'], {
    cwd: root,
    env: { ...process.env, PORT: String(port), HOST: '127.0.0.1' },
    stdio: 'ignore',
  });
  const until = Date.now() + 60_000;
  while (Date.now() < until) {
    const ready = await fetch(`http://127.0.0.1:${port}/api/ready`).catch(() => null);
    if (ready?.ok) return child;
    await new Promise((resolve) => setTimeout(resolve, 200));
  }
  child.kill('SIGKILL');
  throw new Error('the built product did not get ready');
}

async function benchProduct(runId: string): Promise<void> {
  const origin = process.env.APP_ORIGIN!;
  const child = await startProduct(Number(new URL(origin).port));
  try {
    const { email, passphrase } = users.find(({ key }) => key === 'mira')!;
    const signedIn = await fetch(`${origin}/api/session`, {
      method: 'POST',
      headers: { 'content-type': 'application/json', origin },
      body: JSON.stringify({ email, password: passphrase }),
    });
    const cookie = signedIn.headers.get('set-cookie')!.split(';')[0]!;
    await benchWindow(origin, runId, cookie);
    await benchPaint(origin, runId, cookie);
  } finally {
    child.kill('SIGTERM');
    await new Promise((resolve) => child.once('exit', resolve));
  }
}

async function benchWindow(origin: string, runId: string, cookie: string): Promise<void> {
  const ask = async (url: string) => (await fetch(url, { headers: { cookie } })).text();
  const inside = `${origin}/api/sweeps/${runId}/window?fromHz=100e6&toHz=400e6&columns=1024`;
  const whole = `${origin}/api/sweeps/${runId}/window?fromHz=1e6&toHz=2e9&columns=1024`;
  const body = await ask(inside);
  const { origin: bare, server } = await bareServer(body);
  const bareMs = await median(() => ask(bare), 40);
  const trivialMs = await median(() => ask(`${origin}/api/health`), 40);
  const insideMs = await median(() => ask(inside), 40);
  const wholeMs = await median(() => ask(whole), 40);
  server.close();
  say({
    bench: 'window',
    bytes: body.length,
    insideMs: rounded(insideMs),
    wholeMs: rounded(wholeMs),
    bareServerSameBytesMs: rounded(bareMs),
    trivialRouteMs: rounded(trivialMs),
    timesBareServer: rounded(insideMs / bareMs),
    timesTrivialRoute: rounded(insideMs / trivialMs),
  });
}

async function benchPaint(origin: string, runId: string, cookie: string): Promise<void> {
  const executablePath = ['/usr/bin/chromium', '/usr/bin/chromium-browser'].find((file) => existsSync(file));
  if (!executablePath) {
    say({ bench: 'first paint', left: 'no chromium on this machine' });
    return;
  }
  const { chromium } = await import('playwright-core');
  const browser = await chromium.launch({ executablePath, args: process.getuid?.() === 0 ? ['--no-sandbox'] : [] });
  const context = await browser.newContext({ viewport: { width: 1440, height: 900 } });
  const [name, value] = cookie.split(/=(.*)/s) as [string, string];
  await context.addCookies([{ name, value, url: origin }]);
  const paints: number[] = [];
  const charts: number[] = [];
  for (let i = 0; i < 7; i++) {
    const page = await context.newPage();
    await page.goto(`${origin}/sweeps/${runId}`);
    await page.locator('canvas').first().waitFor();
    charts.push(await page.evaluate(() => performance.now()));
    paints.push(await page.evaluate(() => performance.getEntriesByName('first-contentful-paint')[0]?.startTime ?? 0));
    await page.close();
  }
  await browser.close();
  const middle = (list: number[]) => rounded(list.sort((a, b) => a - b)[3]!);
  say({ bench: 'first paint', sheet: 'sweep', firstPaintMs: middle(paints), traceDrawnMs: middle(charts) });
}

async function bench(): Promise<void> {
  database();
  say({ bench: 'machine', node: process.version, arch: process.arch });
  const lab = await enterLab();
  const runId = await benchImport(lab);
  await closeDatabase();
  await benchProduct(runId);
}

bench().catch((error: unknown) => {
  process.stderr.write(`${error instanceof Error ? error.stack : String(error)}\n`);
  process.exit(1);
});
