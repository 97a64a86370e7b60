import { closePasswordWorkers } from '@/auth/passwordWorker';
import { addProductClock, withdrawProductClock } from '@/services/clocks';
import { closeImportWorkers } from '@/services/importWorkers';
import { keepSweep } from '@/services/keepSweep';
import { readLikelySources } from '@/services/likelySources';
import { createSweepFile } from '@/services/sweepFiles';
import { freshDatabase, type TestDatabase } from '../support/database';
import { enterWorld, sweepFile, type World } from '../support/world';

let schema: TestDatabase;
let world: World;
beforeAll(async () => {
  schema = await freshDatabase();
  world = await enterWorld();
}, 120_000);
afterAll(async () => {
  await closeImportWorkers();
  await closePasswordWorkers();
  await schema.close();
});

const declare = (name: string, frequencyHz: number, kind: 'clock' | 'converter' = 'clock', tolerancePpm = 100) =>
  addProductClock(world.technician.actor, world.product.id, {
    name,
    kind,
    frequencyHz,
    tolerancePpm,
    spread: null,
    note: '',
  });
/** 14 + 2 − 30 dB on the path: 52 dBµV reads 38 dBµV/m against 40, 60 reads 46 against 47; neither is under by U. */
const near = (mhz: number) => (mhz < 230 ? 52 : 60);
async function kept(mhz: number[], name: string) {
  const { actor } = world.technician;
  const readings = Object.fromEntries(mhz.map((one) => [one, near(one)]));
  const { id: fileId } = await createSweepFile(actor, sweepFile(readings, name));
  return keepSweep(actor, { ...world.choice, ...world.about, fileId });
}

test('declared clock, found family and the unexplained: each emission has its place', async () => {
  const harmonics = [5, 7, 11, 12].map((n) => n * 12);
  const family = [2, 3, 4, 5, 6, 7, 9, 10].map((n) => Math.round(n * 263) / 10);
  const run = await kept([...harmonics, ...family, 441.7], 'sources.csv');
  const clock = await declare('controller clock', 12e6);
  const found = await readLikelySources(world.designer.actor, run.id);
  expect(found).toMatchObject({ productId: world.product.id, looked: 13, total: 13, explained: 12 });
  expect(found.clocks).toMatchObject([{ id: clock.id, name: 'controller clock', frequencyHz: 12e6, untelling: 0 }]);
  expect(found.clocks[0]!.harmonics.map(({ harmonic }) => harmonic)).toEqual([5, 7, 11, 12]);
  expect(found.families).toHaveLength(1);
  expect(found.families[0]!.fundamentalHz).toBeCloseTo(26.3e6, -4);
  expect(found.families[0]!.members.map(({ harmonic }) => harmonic)).toEqual([2, 3, 4, 5, 6, 7, 9, 10]);
  expect(found.families[0]!.byChance).toBeLessThan(0.01);
  expect(found.unexplained).toMatchObject([{ frequencyHz: 441.7e6 }]);
  // The same frequencies once the clock is withdrawn: its four are left to the search.
  await withdrawProductClock(world.technician.actor, clock.id, clock.version, { reason: 'for the next test' });
  const without = await readLikelySources(world.technician.actor, run.id);
  expect(without.clocks).toEqual([]);
  expect(without.explained).toBeLessThan(13);
});

test('an emission on the harmonics of two declared clocks names both', async () => {
  const run = await kept([120, 156], 'overlap.csv');
  const a = await declare('controller', 12e6);
  const b = await declare('audio', 40e6);
  const { clocks } = await readLikelySources(world.technician.actor, run.id);
  const of = (id: string) => clocks.find((clock) => clock.id === id)!.harmonics;
  expect(of(a.id)).toMatchObject([
    { harmonic: 10, also: [b.id] },
    { harmonic: 13, also: [] },
  ]);
  expect(of(b.id)).toMatchObject([{ harmonic: 3, also: [a.id] }]);
  for (const { id, version } of [a, b])
    await withdrawProductClock(world.technician.actor, id, version, { reason: 'x' });
});

test('both sidebands of a converter are explained, one alone is not', async () => {
  const { actor } = world.technician;
  const readings = { 151: 58, 150: 52, 152: 52, 190: 58, 191: 52 };
  const { id: fileId } = await createSweepFile(actor, sweepFile(readings, 'sidebands.csv'));
  const run = await keepSweep(actor, { ...world.choice, ...world.about, fileId });
  const converter = await declare('converter', 1e6, 'converter');
  const { sidebands, clocks } = await readLikelySources(actor, run.id);
  const mirrored = sidebands.filter((one) => one.mirrored).map(({ frequencyHz, order }) => [frequencyHz, order]);
  expect(mirrored).toEqual([
    [150e6, -1],
    [152e6, 1],
  ]);
  expect(sidebands.filter((one) => !one.mirrored).map(({ frequencyHz }) => frequencyHz)).toEqual([191e6]);
  expect(sidebands.every(({ converterId }) => converterId === converter.id)).toBe(true);
  expect(clocks[0]!.kind).toBe('converter');
  await withdrawProductClock(actor, converter.id, converter.version, { reason: 'x' });
});

test('harmonics closer together than the bandwidth say nothing, and are not counted as an explanation', async () => {
  const run = await kept([120.5, 156.3], 'dense.csv');
  const clock = await declare('bridge', 18e3, 'converter');
  const found = await readLikelySources(world.technician.actor, run.id);
  expect(found).toMatchObject({ explained: 0, clocks: [{ harmonics: [], untelling: 2 }] });
  await withdrawProductClock(world.technician.actor, clock.id, clock.version, { reason: 'x' });
});

test('of many emissions the worst sixty are looked at, on another thread, and how many there are is said', async () => {
  const run = await kept(
    Array.from({ length: 90 }, (_, i) => Math.round((31.3 + i * 10.7) * 10) / 10).filter((mhz) => mhz < 1000),
    'many.csv',
  );
  const found = await readLikelySources(world.technician.actor, run.id);
  expect([found.looked, found.total]).toEqual([60, 90]);
}, 60_000);

test('a run of another client is not found', async () => {
  await expect(readLikelySources(world.outsider.actor, world.run.id)).rejects.toMatchObject({ kind: 'not-found' });
});
