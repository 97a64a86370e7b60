import { closePasswordWorkers } from '@/auth/passwordWorker';
import type { SweepChoice } from '@/schemas/sweep';
import { keepSweep } from '@/services/keepSweep';
import { readReceiverCheck } from '@/services/receiverCheck';
import { createSweepFile } from '@/services/sweepFiles';
import { freshDatabase, type TestDatabase } from '../support/database';
import { enterWorld, type World } from '../support/world';

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

/** Readings of `level` in dBµV at the frequencies given in MHz. */
function file(name: string, mhz: number[], level: (mhz: number) => number, preamble: string[] = []) {
  const rows = mhz.map((one) => `${one.toFixed(4)},${level(one).toFixed(2)}`);
  const text = ['RBW,120 kHz', 'Detector,Peak', ...preamble, 'Frequency (MHz),Level (dBuV)', ...rows, ''].join('\n');
  return { name, bytes: new TextEncoder().encode(text) };
}
async function checked(sent: { name: string; bytes: Uint8Array<ArrayBuffer> }, change: Partial<SweepChoice> = {}) {
  const { actor } = world.technician;
  const { id: fileId } = await createSweepFile(actor, sent);
  const run = await keepSweep(actor, { ...world.choice, ...world.about, ...change, fileId });
  return readReceiverCheck(world.designer.actor, run.id);
}
const swept = (fromMhz: number, toMhz: number, stepMhz: number) =>
  Array.from({ length: Math.round((toMhz - fromMhz) / stepMhz) + 1 }, (_, i) => fromMhz + i * stepMhz);
type Check = Awaited<ReturnType<typeof readReceiverCheck>>;
const inBand = (check: Check, band: string, what: string) =>
  check.traces[0]!.parts.find((part) => part.band === band)!.findings.find((finding) => finding.what === what);
const whole = (check: Check, what: string) => check.traces[0]!.whole.find((finding) => finding.what === what);

test('CISPR 16-1-1:2019 Table 1: 120 kHz is right in bands C and D; a step of 100 kHz is wider than half of it', async () => {
  const check = await readReceiverCheck(world.technician.actor, world.run.id);
  expect(check.traces[0]!.parts.map(({ band }) => band)).toEqual(['C', 'D']);
  expect(inBand(check, 'C', 'bandwidth')).toMatchObject({ outcome: 'ok', figures: { askedHz: 120e3 } });
  const step = inBand(check, 'C', 'step')!;
  expect(step).toMatchObject({ outcome: 'fails', figures: { greatestStepHz: 60e3 } });
  // |H|² of a Gaussian 6 dB down at half its bandwidth: 20 log10(2) · (100/120)²
  expect((step.figures as { readsLowDb: number }).readsLowDb).toBeCloseTo(4.18, 2);
});

test('what the file does not state is unknown and says so', async () => {
  const check = await readReceiverCheck(world.technician.actor, world.run.id);
  for (const what of ['video-bandwidth', 'dwell', 'scan-time']) {
    expect(inBand(check, 'C', what)).toMatchObject({ outcome: 'unknown', because: expect.stringMatching(/not/) });
  }
  expect(whole(check, 'overload')).toMatchObject({
    outcome: 'unknown',
    figures: { highestDbuv: expect.closeTo(60.2) },
  });
});

test('a peak reading can show under a quasi-peak limit, an average one cannot', async () => {
  const check = await readReceiverCheck(world.technician.actor, world.run.id);
  expect(inBand(check, 'C', 'detector')).toMatchObject({ outcome: 'ok', figures: { relation: 'at-or-above' } });
  const traces = [{ index: 0, name: 'AV', unit: 'dBuV' as const, detector: 'average' as const, rbwHz: 120e3 }];
  const average = await checked(
    file('average.csv', swept(30, 1000, 0.05), () => 20),
    { traces },
  );
  expect(inBand(average, 'C', 'detector')).toMatchObject({ outcome: 'fails', figures: { relation: 'at-or-below' } });
  expect(inBand(average, 'C', 'video-bandwidth')).toBeUndefined();
});

test('the floor is at least 6 dB below the limit where it is, and named by range where it is not', async () => {
  // 14 + 2 − 30 dB on the path: 30 dBµV reads 16 dBµV/m, 49 reads 35; limits are 40 and 47 dBµV/m
  const quiet = await readReceiverCheck(world.technician.actor, world.run.id);
  expect(whole(quiet, 'noise-floor')).toMatchObject({
    outcome: 'ok',
    figures: { leastDistanceDb: expect.closeTo(24) },
  });
  const loud = await checked(file('loud.csv', swept(30, 1000, 0.05), (mhz) => (mhz > 100 && mhz < 200 ? 49 : 30)));
  const floor = whole(loud, 'noise-floor')!;
  expect(floor).toMatchObject({ outcome: 'fails', figures: { leastDistanceDb: expect.closeTo(5), notKnown: [] } });
  const { tooHigh } = floor.figures as { tooHigh: { fromHz: number; toHz: number }[] };
  expect(tooHigh).toHaveLength(1);
  expect(tooHigh[0]!.fromHz / 100e6).toBeCloseTo(1, 1);
  expect(tooHigh[0]!.toHz / 200e6).toBeCloseTo(1, 1);
});

test('of an uneven sweep each band has its own largest step', async () => {
  const mhz = [...swept(30, 300, 0.05), ...swept(300.1, 1000, 0.1)];
  const check = await checked(file('uneven.csv', mhz, () => 30));
  expect(inBand(check, 'C', 'step')).toMatchObject({ outcome: 'ok', figures: { stepHz: expect.closeTo(50e3, -1) } });
  expect(inBand(check, 'D', 'step')).toMatchObject({
    outcome: 'fails',
    figures: { stepHz: expect.closeTo(100e3, -1) },
  });
});

test('a dwell the file states is compared with the least of the band', async () => {
  const short = await checked(file('dwell.csv', swept(30, 1000, 0.05), () => 30, ['Dwell time,0.01 ms']));
  expect(inBand(short, 'C', 'dwell')).toMatchObject({ outcome: 'fails', figures: { dwellS: 1e-5, leastS: 6e-5 } });
  const long = await checked(file('dwell2.csv', swept(30, 1000, 0.05), () => 30, ['Dwell time,10 ms']));
  expect(inBand(long, 'C', 'dwell')).toMatchObject({ outcome: 'ok' });
});

test('a list of single readings has no step and no floor, and says why', async () => {
  const check = await checked(file('spots.csv', [31, 75, 144, 210], () => 30));
  expect(inBand(check, 'C', 'step')).toMatchObject({ outcome: 'unknown', because: expect.stringContaining('Single') });
  expect(whole(check, 'noise-floor')).toMatchObject({ outcome: 'unknown' });
});

test('a run of another client is not found', async () => {
  await expect(readReceiverCheck(world.outsider.actor, world.run.id)).rejects.toMatchObject({ kind: 'not-found' });
});
