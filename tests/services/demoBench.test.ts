import { proposedLimitSet } from '@/app/(lab)/sweeps/new/proposed';
import { instantOf, dateOf } from '@fixtures/demo/dates';
import { equipment } from '@fixtures/demo/equipment';
import { limitSets } from '@fixtures/demo/limitSets';
import { paths } from '@fixtures/demo/paths';
import { organisations, users } from '@fixtures/demo/people';
import type { Actor } from '@/auth/actor';
import { closePasswordWorkers } from '@/auth/passwordWorker';
import { enterPublishedLimits } from '@/ops/publishedLimits';
import { seedEquipment, seedPaths } from '@/ops/seedBench';
import { seedPeople } from '@/ops/seedPeople';
import { unitOfWork } from '@/models/unitOfWork';
import { listLimitLines } from '@/services/limitLines';
import { listLimitSets } from '@/services/limitSets';
import { listPaths } from '@/services/signalPaths';
import { freshDatabase, type TestDatabase } from '../support/database';

const DAY = '2026-11-18';
const at = (day: number) => new Date(instantOf(DAY, { day, time: '08:00' }));
let schema: TestDatabase;
let manager: Actor;

beforeAll(async () => {
  schema = await freshDatabase();
  await unitOfWork(async () => {
    manager = (await seedPeople(organisations, users, at(-400))).actor('anselm');
    await enterPublishedLimits(manager, limitSets, at(-399));
    await seedPaths(manager, await seedEquipment(manager, equipment, (day) => dateOf(DAY, day), at), at);
  });
}, 120_000);
afterAll(async () => {
  await closePasswordWorkers();
  await schema.close();
});

test('every published limit line and set is entered in its own unit; what the demo uses is proposed', async () => {
  const sets = (await listLimitSets(manager, { limit: 200 })).items;
  expect(sets).toHaveLength(limitSets.length);
  const paths = (await listPaths(manager, { limit: 50 })).items;
  const proposed = (port: 'enclosure' | 'ac-mains', span: [number, number], code: string) => {
    const path = paths.find((one) => one.code === code);
    return sets.find(({ id }) => id === proposedLimitSet(sets, port, span, path))!.name;
  };
  expect(proposed('enclosure', [30e6, 1e9], 'P-3')).toBe('CISPR 32 class B radiated, 3 m');
  expect(proposed('ac-mains', [150e3, 30e6], 'P-1')).toBe('CISPR 32 class B, mains');
  const lines = (await listLimitLines(manager, { limit: 200 })).items;
  expect(new Set(lines.map(({ unit }) => unit))).toEqual(new Set(['dBuV', 'dBuV/m', 'dBuA', 'dBpW']));
  const clamp = sets.find(({ name }) => name.includes('clamp'))!;
  expect(clamp.lines.map(({ unit, segments }) => [unit, segments[0]!.over])).toEqual([
    ['dBpW', 'linear-frequency'],
    ['dBpW', 'linear-frequency'],
  ]);
  // The list of an upload sheet and of the limits sheet shows all sets on one page.
  expect(sets.length).toBeLessThanOrEqual(50);
});

test('paths by current probe and split by frequency are there with their terms and ranges', async () => {
  const all = (await listPaths(manager, { limit: 50 })).items;
  const path = (code: string) => all.find((one) => one.code === code)!;
  expect(all).toHaveLength(paths.length);
  expect(path('P-5').terms.map(({ identifier, sign }) => `${sign} ${identifier}`)).toEqual(['− PR-1', '+ CBL-04']);
  expect(path('P-5')).toMatchObject({ lowHz: 10e3, highHz: 30e6 });
  expect(path('P-6')).toMatchObject({ lowHz: 30e6, highHz: 1e9 });
  expect(path('P-2')).toMatchObject({ lowHz: 30e6, highHz: 300e6 });
});
