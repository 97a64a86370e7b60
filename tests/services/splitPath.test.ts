import { closePasswordWorkers } from '@/auth/passwordWorker';
import type { FactorQuantity } from '@/emc/kinds';
import { enterFactorTableBody } from '@/schemas/tables';
import { enterCalibration, enterEquipment } from '@/services/enterEquipment';
import { enterFactorTables } from '@/services/enterFactorTables';
import { enterLimitLine, enterLimitSet } from '@/services/enterLimits';
import { enterSignalPath } from '@/services/enterSignalPath';
import { evaluateSweep } from '@/services/evaluations';
import { previewFactorTable } from '@/services/factorTableFile';
import { downloadFactorTable, readFactorTable } from '@/services/factorTables';
import { keepSweep } from '@/services/keepSweep';
import { listPaths } from '@/services/signalPaths';
import { createSweepFile } from '@/services/sweepFiles';
import { readWorking } from '@/services/sweepWorking';
import { freshDatabase, type TestDatabase } from '../support/database';
import { enterWorld, sweepFile, type World } from '../support/world';

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

const step = (expandedDb: number) => [{ startHz: 1e3, stopHz: 1e9, expandedDb }];
const uncertainty = { prescan: step(4), final: step(3) };

async function item(identifier: string, quantity: FactorQuantity, rows: [hz: number, db: number][]) {
  const boss = world.manager.actor;
  const row = await enterEquipment(boss, { identifier, role: 'antenna', description: identifier, state: 'in-use' });
  const [table] = await enterCalibration(boss, row, {
    certificate: `C-${identifier}`,
    laboratory: 'invented',
    calibratedOn: '2020-01-02',
    dueOn: '2099-01-01',
    tables: [
      {
        name: `${identifier} table 1`,
        quantity,
        polarisation: null,
        distanceM: null,
        source: 'made for tests',
        frequenciesHz: rows.map(([hz]) => hz),
        valuesDb: rows.map(([, db]) => db),
      },
    ],
  });
  const tables = { horizontal: null, vertical: null, any: table!.publicId };
  return { equipmentId: row.publicId, role: 'antenna', term: quantity.replaceAll('-', ' '), quantity, tables };
}

const enter = (
  code: string,
  port: 'enclosure' | 'wired-network',
  items: Parameters<typeof enterSignalPath>[1]['items'],
) =>
  // prettier-ignore
  enterSignalPath(world.manager.actor, {
    code,
    name: code,
    port,
    position: 'A',
    items,
    uncertainty,
    uncertaintySource: 'made for tests',
  });
const pathOf = async (code: string) =>
  (await listPaths(world.technician.actor, { limit: 50 })).items.find((path) => path.code === code)!;

test('one antenna to 300 MHz and another above: levels, coverage and Working follow the range', async () => {
  const low = await item('ANT-L', 'antenna-factor', [
    [20e6, 10],
    [1e9, 10],
  ]);
  const high = await item('ANT-H', 'antenna-factor', [
    [20e6, 20],
    [1e9, 20],
  ]);
  await enter('P-S', 'enclosure', [
    { ...low, toHz: 300e6 },
    { ...high, fromHz: 300e6, toHz: 900e6 },
  ]);
  const path = await pathOf('P-S');
  expect(path).toMatchObject({ lowHz: 20e6, highHz: 900e6 });

  const file = await createSweepFile(world.technician.actor, sweepFile({}, 'split.csv'));
  const run = await keepSweep(world.technician.actor, {
    ...world.choice,
    ...world.about,
    pathId: path.id,
    fileId: file.id,
  });
  // No factor from 900 MHz on: that is not under, it is not covered.
  expect(run.evaluation.gaps).toMatchObject([{ because: 'no-factor', toHz: 1e9 }]);
  const level = async (frequencyHz: number) => {
    const working = await readWorking(world.technician.actor, run.id, { frequencyHz, trace: 0 });
    return { level: working.level, added: working.terms.filter(({ applied }) => applied).map(({ figure }) => figure) };
  };
  expect(await level(200e6)).toEqual({ level: 40, added: [30, 10] });
  expect(await level(400e6)).toEqual({ level: 50, added: [30, 20] });
  expect(await level(300e6)).toEqual({ level: 50, added: [30, 20] });
  expect((await level(950e6)).level).toBeNull();

  // The antennas are changed over elsewhere from now on; what was measured before keeps its own ranges.
  await enter('P-S', 'enclosure', [
    { ...low, toHz: 500e6 },
    { ...high, fromHz: 500e6, toHz: 900e6 },
  ]);
  await evaluateSweep(world.technician.actor, run.id, { reason: 'another edge' });
  expect(await level(400e6)).toEqual({ level: 50, added: [30, 20] });
});

test('what could be no path is refused when it is entered, not when a run is kept', async () => {
  const rows: [number, number][] = [
    [20e6, 10],
    [1e9, 10],
  ];
  const [one, two] = [await item('ANT-A', 'antenna-factor', rows), await item('ANT-B', 'antenna-factor', rows)];
  const probe = await item('PR-A', 'transfer-impedance', rows);
  const refused = (items: Parameters<typeof enter>[2], message: RegExp) =>
    expect(enter('P-X', 'enclosure', items)).rejects.toMatchObject({
      issues: [{ pointer: '/items', message: expect.stringMatching(message) }],
    });
  await refused([one, two], /Two antenna factors/);
  await refused([{ ...one, toHz: 301e6 }, { ...two, fromHz: 300e6 }], /Two antenna factors/); // prettier-ignore
  await refused([one, probe], /Two transducers/);
  await refused([{ ...one, fromHz: 300e6, toHz: 200e6 }], /holds from/);
  await refused([{ ...one, fromHz: 30e6 }, { ...probe, toHz: 30e6 }], /a path of its own/); // prettier-ignore
});

test('a current probe makes dBuA, judged against a limit in dBuA (CISPR 32 class B, wired network: 30 dBuA, from memory)', async () => {
  const boss = world.manager.actor;
  const line = await enterLimitLine(boss, {
    key: 'current',
    name: 'CISPR 32 class B, wired network, current, quasi-peak',
    document: 'CISPR 32',
    class: 'B',
    port: 'wired-network',
    source: 'made for tests',
    basis: 'from memory',
    detector: 'quasi-peak',
    bandwidthHz: 9000,
    unit: 'dBuA',
    distanceM: null,
    segments: [{ startHz: 500e3, stopHz: 30e6, startLimit: 30, stopLimit: 30, over: 'log-frequency' }],
  });
  const set = await enterLimitSet(boss, { name: 'current', port: 'wired-network', distanceM: null, lines: [line] });
  await enter('P-I', 'wired-network', [
    await item('PR-1', 'transfer-impedance', [
      [150e3, 14],
      [30e6, 14],
    ]),
  ]);
  const path = await pathOf('P-I');
  expect(path.terms).toMatchObject([{ sign: '−' }]);
  const rows = Array.from({ length: 7376 }, (_, i) => `${(0.5 + i * 0.004).toFixed(4)},${i === 1000 ? 49 : 20}`);
  const text = ['RBW,9 kHz', 'Detector,Quasi-peak', 'Frequency (MHz),Level (dBuV)', ...rows, ''].join('\n');
  const file = await createSweepFile(world.technician.actor, {
    name: 'probe.csv',
    bytes: new TextEncoder().encode(text),
  });
  const run = await keepSweep(world.technician.actor, {
    ...world.choice,
    ...world.about,
    port: 'wired-network',
    polarisation: null,
    distanceM: null,
    heightM: null,
    heightSwept: false,
    azimuthDeg: null,
    pathId: path.id,
    limitSetId: set.publicId,
    traces: [{ index: 0, name: 'Quasi-peak', unit: 'dBuV', detector: 'quasi-peak', rbwHz: 9000 }],
    fileId: file.id,
  });
  // 49 dBuV − 14 dBΩ = 35 dBuA, 5 over 30 dBuA and beyond U of 4 dB.
  expect(run.evaluation).toMatchObject({ verdict: 'over', worst: { frequencyHz: 4.5e6 } });
  expect(run.evaluation.worst!.marginDb).toBeCloseTo(-5, 5);
  const working = await readWorking(world.technician.actor, run.id, { frequencyHz: 4.5e6, trace: 0 });
  expect(working).toMatchObject({ levelUnit: 'dBuA' });
  expect(working.terms[1]).toMatchObject({ sign: '−', unit: 'dBΩ', figure: 14 });
});

test('tables of every quantity are uploaded; a loop asks which field, a contradicted unit is refused', async () => {
  const boss = world.manager.actor;
  const loop = await item('LOOP-9', 'magnetic-antenna-factor', [[9e3, 18], [30e6, -16]]); // prettier-ignore
  const hold = (text: string) => createSweepFile(boss, { name: 'loop.csv', bytes: new TextEncoder().encode(text) });
  const table = { index: 0, name: 'LOOP-9 new', quantity: null, polarisation: null, distanceM: null };
  const body = (fileId: string, quantity: FactorQuantity | null, revises: string | null = null) =>
    enterFactorTableBody.parse({
      fileId,
      equipmentId: loop.equipmentId,
      tables: [{ ...table, quantity, revises }],
      calibration: { certificate: 'C-9', laboratory: 'invented', calibratedOn: '2021-03-04', dueOn: null },
      source: 'certificate C-9',
      reason: 'first calibration',
    });
  const unclear = await hold('Frequency (MHz);Magnetic factor (dB/m)\n0.009;18.1\n1;-15.8\n30;-16.6\n');
  const preview = await previewFactorTable(boss, {
    fileId: unclear.id,
    equipmentId: loop.equipmentId,
    frequencyUnit: null,
    tables: [table],
  });
  expect(preview.questions).toMatchObject([{ key: 'quantity', text: expect.stringMatching(/51\.5 dB more/) }]);
  expect(preview.tables[0]!.remarks.map(({ kind }) => kind)).not.toContain('mixed-signs');
  await expect(enterFactorTables(boss, body(unclear.id, null))).rejects.toMatchObject({
    issues: [{ pointer: '/tables/0/quantity', message: expect.stringMatching(/what its figures are/) }],
  });

  const said = await hold('Frequency (MHz);Magnetic factor (dB(S/m))\n0.009;18.4\n1;-15.6\n30;-16.4\n');
  await expect(enterFactorTables(boss, body(said.id, 'loss'))).rejects.toMatchObject({
    issues: [{ pointer: '/tables/0/quantity', message: 'is a magnetic antenna factor: the table is in dB(S/m)' }],
  });
  const { tables } = await enterFactorTables(boss, body(said.id, null));
  expect(tables).toMatchObject([{ quantity: 'magnetic-antenna-factor', rows: 3 }]);
  expect(await readFactorTable(boss, tables[0]!.id)).toMatchObject({ valueDb: [18.4, -15.6, -16.4] });
  const { text } = await downloadFactorTable(boss, tables[0]!.id);
  expect(text).toContain('Magnetic antenna factor (dB(S/m))');
});
