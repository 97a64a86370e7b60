import { closePasswordWorkers } from '@/auth/passwordWorker';
import { GET as compare } from '@/app/api/comparisons/route';
import type { ComparisonView } from '@/schemas/comparison';
import type { SweepView } from '@/schemas/sweep';
import { keepSweep } from '@/services/keepSweep';
import { createState } from '@/services/samples';
import { createSweepFile } from '@/services/sweepFiles';
import { freshDatabase, type TestDatabase } from '../support/database';
import { enterWorld, sweepFile, type Somebody, type World } from '../support/world';

/* Two runs of a sample over each other, asked over HTTP. */

const ORIGIN = 'http://localhost:3000';
let schema: TestDatabase;
let world: World;
let m0: SweepView;
let m1: SweepView;

beforeAll(async () => {
  schema = await freshDatabase();
  world = await enterWorld();
  m0 = await keepRun({}, { 144: 60.2, 300: 58, 612.3: 57 });
  const { states } = await createState(world.technician.actor, world.sample.id, {
    description: 'gate resistors',
    planned: false,
  });
  m1 = await keepRun({ stateId: states.at(-1)!.id }, { 144: 54.1, 300: 58.3 });
}, 120_000);
afterAll(async () => {
  await closePasswordWorkers();
  await schema.close();
});

let files = 0;
async function keepRun(change: object, readings: Record<number, number>): Promise<SweepView> {
  const { actor } = world.technician;
  const file = await createSweepFile(actor, sweepFile(readings, `beside-${++files}.csv`));
  return keepSweep(actor, { ...world.choice, ...world.about, fileId: file.id, ...change });
}

function ask(a: string, b: string, query = '', as: Somebody = world.designer) {
  const request = new Request(`${ORIGIN}/x?a=${a}&b=${b}${query}`, { headers: { cookie: as.cookie } });
  return compare(request);
}
async function compared(a: SweepView, b: SweepView, query = ''): Promise<ComparisonView> {
  const answer = await ask(a.id, b.id, query);
  expect([answer.status, answer.ok ? '' : await answer.text()]).toEqual([200, '']);
  return (await answer.json()) as ComparisonView;
}
const moves = ({ about }: ComparisonView) =>
  about!.emissions.map(({ frequencyHz, movedDb }) => [frequencyHz / 1e6, Number(movedDb!.toFixed(4))]);

test('each emission of both runs with its margins and how far it moved, worst of the second run first', async () => {
  const { about, differences } = await compared(m0, m1);
  expect(moves(await compared(m0, m1))).toEqual([
    [144, -6.1],
    [300, 0.3],
    [612.3, -27],
  ]);
  const [first, , last] = about!.emissions;
  expect(first).toMatchObject({ rank: 1, kind: 'peak', limit: 'quasi-peak', pair: 0 });
  expect(first!.a!.marginDb! - first!.b!.marginDb!).toBeCloseTo(-6.1, 5);
  expect([first!.a!.verdict, first!.b!.verdict]).toEqual(['needs-final', 'needs-final']);
  // 612.3 MHz is no candidate of m1: its points there say what is left of it, and no verdict is made of that.
  expect(last!.b).toMatchObject({ verdict: null, uncertaintyDb: null });
  expect(Math.abs(last!.b!.frequencyHz - 612.3e6)).toBeLessThanOrEqual(120e3);
  expect(last!.b!.level).toBeCloseTo(30 + 14 + 2 - 30, 5);
  expect(last!.b!.marginDb).toBeCloseTo(47 - 16, 5);

  const [{ fromHz, toHz, differenceDb }] = differences as [ComparisonView['differences'][0]];
  const at = (hz: number) => differenceDb[fromHz.findIndex((from, i) => from <= hz && toHz[i]! > hz)]!;
  expect(at(144e6)).toBeCloseTo(-6.1, 4);
  expect(at(300e6)).toBeCloseTo(0.3, 4);
  expect(at(200e6)).toBe(0);
  expect(about!.cautions).toEqual([]);
});

test('turned round everything moves the other way', async () => {
  const [there, back] = [await compared(m0, m1), await compared(m1, m0)];
  const turned = ({ about }: ComparisonView, sign: number) =>
    new Map(about!.emissions.map(({ frequencyHz, movedDb }) => [frequencyHz, 0 + sign * movedDb!]));
  expect(turned(back, -1)).toEqual(turned(there, 1));
  expect(back.differences[0]!.differenceDb.map((db) => 0 - db)).toEqual(
    there.differences[0]!.differenceDb.map((db) => 0 + db),
  );
});

test('a run beside itself differs nowhere', async () => {
  const { differences, about } = await compared(m0, m0);
  expect(new Set(differences[0]!.differenceDb)).toEqual(new Set([0]));
  expect(new Set(about!.emissions.map(({ movedDb }) => movedDb))).toEqual(new Set([0]));
});

test('a window holds both runs’ columns of that range and their difference, and nothing else when only those are asked', async () => {
  const view = await compared(m0, m1, '&fromHz=140e6&toHz=150e6&columns=64&only=columns');
  expect(view).toMatchObject({ fromHz: 140e6, toHz: 150e6, columns: 64, about: null });
  for (const side of [view.a, view.b]) {
    expect(side[0]!.frequencyHz.length).toBe(64);
    expect(Math.min(...side[0]!.frequencyHz)).toBeGreaterThanOrEqual(140e6);
    expect(Math.max(...side[0]!.frequencyHz)).toBeLessThanOrEqual(150e6);
  }
  expect(Math.min(...view.differences[0]!.differenceDb)).toBeCloseTo(-6.1, 4);
});

test('what makes a difference doubtful is said: detector, RBW, polarisation, height, mode', async () => {
  const traces = [{ index: 0, name: 'QP', unit: 'dBuV' as const, detector: 'quasi-peak' as const, rbwHz: 9e3 }];
  const final = await keepRun(
    { purpose: 'final', traces, polarisation: 'vertical', heightSwept: false, operatingMode: 'dimmed' },
    { 144: 50 },
  );
  const { about, differences } = await compared(m0, final);
  expect(about!.cautions).toEqual([
    { what: 'detector', a: 'peak', b: 'quasi-peak' },
    { what: 'rbw', a: 120e3, b: 9e3 },
    { what: 'position', a: 'horizontal', b: 'vertical' },
    { what: 'height', a: 'swept', b: 1 },
    { what: 'mode', a: 'full light', b: 'dimmed' },
  ]);
  expect(differences).toMatchObject([{ a: 0, b: 0, sameDetector: false }]);
});

test('runs in different units have both their columns and no difference', async () => {
  const traces = [{ index: 0, name: 'Peak', unit: 'dBuV/m' as const, detector: 'peak' as const, rbwHz: 120e3 }];
  const plain = await keepRun({ pathId: null }, { 144: 50 });
  const field = await keepRun({ valuesHold: 'field', pathId: null, traces }, { 144: 50 });
  const { about, differences, a, b } = await compared(plain, field);
  expect([differences, about!.emissions, a.length, b.length]).toEqual([[], [], 1, 1]);
  expect(about!.cautions).toContainEqual({ what: 'unit', a: 'dBuV', b: 'dBuV/m' });
});

test('runs of two samples are refused; a run of another organisation is not found', async () => {
  const answer = await ask(m0.id, world.spares[0]!.id);
  expect(answer.status).toBe(400);
  expect(((await answer.json()) as { errors: unknown[] }).errors).toEqual([
    { pointer: '/query/b', message: 'is a run of another sample' },
  ]);
  for (const [a, b] of [
    [m0.id, m1.id],
    [m0.id, '0000000000000000'],
  ]) {
    expect((await ask(a!, b!, '', world.outsider)).status).toBe(404);
  }
  expect((await ask(m0.id, m1.id, '&fromHz=30e6')).status).toBe(400);
  expect((await ask(m0.id, m1.id, '&fromHz=50e6&toHz=40e6')).status).toBe(400);
});

test('a voided run and a trial can still be laid over the others, and it is said which they are', async () => {
  const trial = await keepRun({ stateId: m1.state.id, trial: 'foil on lid' }, { 144: 53 });
  const { about } = await compared(m1, trial);
  expect(about!.b).toMatchObject({ trial: 'foil on lid', state: { label: 'M1' } });
  expect(moves(await compared(m1, trial))[0]).toEqual([144, -1.1]);
});
