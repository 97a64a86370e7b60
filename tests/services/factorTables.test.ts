import { Op } from 'sequelize';
import { closePasswordWorkers } from '@/auth/passwordWorker';
import { Conflict, Forbidden, type Invalid, Unreadable } from '@/errors';
import { FactorTableRevision } from '@/models/factorTableRevision';
import { SignalPath } from '@/models/signalPath';
import { SignalPathRevision } from '@/models/signalPathRevision';
import { Sweep } from '@/models/sweep';
import { unitOfWork } from '@/models/unitOfWork';
import { enterFactorTableBody } from '@/schemas/tables';
import { historyOf, verifyChain } from '@/services/audit';
import { enterFactorTables } from '@/services/enterFactorTables';
import { listEquipment, readEquipment } from '@/services/equipment';
import { previewFactorTable } from '@/services/factorTableFile';
import { downloadFactorTable, listFactorTables, readFactorTable } from '@/services/factorTables';
import { keepSweep } from '@/services/keepSweep';
import { createSweepFile } from '@/services/sweepFiles';
import { readSweep } from '@/services/sweeps';
import { readWorking } from '@/services/sweepWorking';
import { freshDatabase, type TestDatabase } from '../support/database';
import { enterWorld, sweepFile, type World } from '../support/world';

let schema: TestDatabase;
let world: World;
/** Runs that used the first revision of the cable's table. */
let runsBefore = 0;

beforeAll(async () => {
  schema = await freshDatabase();
  world = await enterWorld();
}, 120_000);
afterAll(async () => {
  await closePasswordWorkers();
  await schema.close();
});

const hold = (text: string, name = 'table.csv') =>
  createSweepFile(world.manager.actor, { name, bytes: new TextEncoder().encode(text) });
const cable = () => world.items[1]!;
const NAME = 'CBL-1 table 1';
const newest = () => unitOfWork(() => FactorTableRevision.findOne({ where: { name: NAME }, order: [['revision', 'DESC']] })); // prettier-ignore

async function body(fileId: string, more: object = {}) {
  return enterFactorTableBody.parse({
    fileId,
    equipmentId: cable().equipmentId,
    tables: [{ index: 0, name: NAME, quantity: null, revises: (await newest())!.publicId }],
    calibration: { certificate: 'C-2', laboratory: 'invented', calibratedOn: '2021-03-04', dueOn: '2098-01-01' },
    source: 'certificate C-2, page 3',
    reason: 'yearly calibration',
    ...more,
  });
}
const keep = async () => {
  const file = await createSweepFile(world.technician.actor, sweepFile());
  return keepSweep(world.technician.actor, { ...world.choice, ...world.about, fileId: file.id });
};
const cableLoss = async (runId: string) => {
  const { terms } = await readWorking(world.technician.actor, runId, { frequencyHz: 144e6, trace: 0 });
  return terms.find(({ name }) => name.includes('loss'))!.figure;
};

test('the preview shows the table beside the one before: difference in figures, jumps, a narrower range', async () => {
  const { id } = await hold('Frequency (MHz);Loss (dB)\n20;1,9\n144;2,6\n300;6,1\n900;6,4\n');
  const preview = await previewFactorTable(world.manager.actor, {
    fileId: id,
    equipmentId: cable().equipmentId,
    frequencyUnit: null,
    tables: [{ index: 0, name: NAME, quantity: null, polarisation: null, distanceM: null }],
  });
  expect(preview).toMatchObject({ refusal: null, frequencyUnit: 'MHz', questions: [] });
  expect(preview.paths.map(({ code, revision }) => [code, revision])).toEqual([['P-1', 1]]);
  const [table] = preview.tables;
  expect(table!.before).toMatchObject({ revision: 1, valueDb: [2, 2] });
  expect(table!.before!.difference).toMatchObject({ atHz: 900e6 });
  expect(table!.before!.difference!.largestDb).toBeCloseTo(4.4, 12);
  const said = table!.remarks.map(({ kind, fromHz, toHz }) => [kind, fromHz, toHz]);
  expect(said).toEqual([
    ['no-factor-above', 900e6, 1e9],
    ['gap-between-rows', 20e6, 144e6],
    ['jump', 144e6, 300e6],
  ]);
  expect((await newest())!.revision).toBe(1);
});

test('what the file leaves open is asked, and not entered before it is answered', async () => {
  const { id } = await hold('1;2;\n30;0,4;\n100;0,8;\n300;1,4;\n'.replaceAll(';\n', '\n').replace('1;2\n', ''));
  const choice = { fileId: id, equipmentId: cable().equipmentId, frequencyUnit: null };
  const table = { index: 0, name: NAME, quantity: null, polarisation: null, distanceM: null };
  const { questions } = await previewFactorTable(world.manager.actor, { ...choice, tables: [table] });
  expect(questions.map(({ key }) => key)).toEqual(['frequencyUnit', 'lossOrGain']);
  await expect(enterFactorTables(world.manager.actor, await body(id))).rejects.toThrow(Unreadable);
  const answered = { frequencyUnit: 'MHz' };
  await expect(enterFactorTables(world.manager.actor, await body(id, answered))).rejects.toMatchObject({
    issues: [{ pointer: '/tables/0/quantity' }],
  });
});

test('a refused file names its line, what was found and what was expected, in the preview and when entering', async () => {
  const { id } = await hold('Frequency (MHz);Loss (dB)\n30;1\n100;2\n100;3\n300;3\n');
  const { refusal } = await previewFactorTable(world.manager.actor, {
    fileId: id,
    equipmentId: cable().equipmentId,
    frequencyUnit: null,
    tables: [],
  });
  expect(refusal).toMatchObject({ line: 4, found: '100000000 Hz twice', expected: 'each frequency once' });
  await expect(enterFactorTables(world.manager.actor, await body(id))).rejects.toMatchObject({ line: 4 });
});

test('entering is a new revision; paths follow, later runs use it, earlier runs keep theirs', async () => {
  const before = await newest();
  const { id } = await hold('Frequency (MHz);Gain (dB)\n20;-3,5\n1000;-3,5\n');
  const meanwhile = await keep();
  runsBefore = await unitOfWork(() => Sweep.count({ where: { evaluationId: { [Op.not]: null } } }));
  const entered = await enterFactorTables(world.manager.actor, await body(id));
  expect(entered.tables).toMatchObject([
    {
      ...{ name: NAME, revision: 2, newest: true, quantity: 'loss', reason: 'yearly calibration' },
      ...{ enteredBy: { name: 'manager' }, file: { name: 'table.csv' } },
      calibration: { certificate: 'C-2', calibratedOn: '2021-03-04' },
    },
  ]);
  expect(entered.paths.map(({ code, revision }) => [code, revision])).toEqual([['P-1', 2]]);
  // A certificate of 2021 that is entered now: what ran since then used the table before.
  expect(entered.outdated).toMatchObject({ sinceDay: '2021-03-04', count: runsBefore, revisions: [{ name: NAME, revision: 1, count: runsBefore }] }); // prettier-ignore
  expect(entered.outdated!.runs.map((run) => run.number)).toContain(meanwhile.number);

  const later = await keep();
  expect(await cableLoss(world.run.id)).toBeCloseTo(2, 9);
  expect(await cableLoss(later.id)).toBeCloseTo(3.5, 9);
  expect(later.path!.revision).toBe(2);
  expect((await readSweep(world.manager.actor, world.run.id)).path!.revision).toBe(1);

  // Nothing of the older revision was touched.
  const kept = await unitOfWork(() => FactorTableRevision.findByPk(before!.id));
  expect(kept!.toJSON()).toEqual(before!.toJSON());
  const path = await unitOfWork(() => SignalPath.findOne({ where: { code: 'P-1' } }));
  const revisions = await unitOfWork(() => SignalPathRevision.findAll({ where: { signalPathId: path!.id }, order: [['revision', 'ASC']] })); // prettier-ignore
  expect(revisions.map((one) => one.items[1]!.tables.any)).toEqual([before!.publicId, entered.tables[0]!.id]);
  expect(revisions[1]!.items[0]).toEqual(revisions[0]!.items[0]);

  const history = await historyOf(world.manager.actor, 'equipment', cable().equipmentId);
  expect(history[0]).toMatchObject({ action: `${NAME} revision 2 entered`, by: 'manager' });
  expect((await historyOf(world.manager.actor, 'path', path!.publicId))[0]!.action).toMatch(
    /^signal path P-1 revision 2/,
  );
  expect(await verifyChain('lab')).toBeNull();
});

test('its sheet lists what uses each revision, and what is left to evaluate again', async () => {
  const { technician } = world;
  const { items } = await listFactorTables(technician.actor, { limit: 50, equipmentId: cable().equipmentId });
  const named = items.filter(({ name }) => name === NAME);
  expect(named.map(({ revision, newest: last }) => [revision, last])).toEqual([
    [2, true],
    [1, false],
  ]);
  const [second, first] = await Promise.all(named.map(({ id }) => readFactorTable(technician.actor, id)));
  expect(second).toMatchObject({ valueDb: [3.5, 3.5], runs: { count: 1 }, before: { revision: 1 } });
  expect(second!.paths).toMatchObject([{ code: 'P-1', revision: 2, current: true }]);
  expect(second!.outdated!.count).toBe(runsBefore);
  expect(first).toMatchObject({ runs: { count: runsBefore }, outdated: null, before: null });
  expect(first!.paths).toMatchObject([{ code: 'P-1', revision: 1, current: false }]);
  const record = await readEquipment(technician.actor, cable().equipmentId);
  expect(record.calibrations.map(({ certificate }) => certificate)).toEqual(['C-2', 'C-CBL-1']);
  expect(record.paths).toMatchObject([{ code: 'P-1', revision: 2 }]);
});

test('downloaded and uploaded again it is the same table', async () => {
  const held = await newest();
  const { text, name } = await downloadFactorTable(world.technician.actor, held!.publicId);
  expect(name).toBe(`${NAME}, revision 2.csv`);
  const { id } = await hold(text);
  const again = await enterFactorTables(world.manager.actor, await body(id));
  const row = await newest();
  expect(row!.revision).toBe(3);
  expect([row!.frequenciesHz, row!.valuesDb]).toEqual([held!.frequenciesHz, held!.valuesDb]);
  expect(again.paths).toMatchObject([{ code: 'P-1', revision: 3 }]);
});

test('two polarisations of one file are entered together under one calibration, and the path follows once', async () => {
  const { id } = await hold('Frequency [MHz];AF horizontal [dB/m];AF vertical [dB/m]\n20;10;11\n1000;20;21\n');
  const antenna = world.items[0]!.equipmentId;
  const first = await enterFactorTables(world.manager.actor, {
    ...(await body(id)),
    equipmentId: antenna,
    tables: [
      { index: 0, name: 'AF H', quantity: null, polarisation: 'horizontal', distanceM: 3, revises: null },
      { index: 1, name: 'AF V', quantity: null, polarisation: 'vertical', distanceM: 3, revises: null },
    ],
  });
  expect(first.tables.map(({ name, quantity, polarisation }) => [name, quantity, polarisation])).toEqual([
    ['AF H', 'antenna-factor', 'horizontal'],
    ['AF V', 'antenna-factor', 'vertical'],
  ]);
  expect([first.paths, first.outdated]).toEqual([[], null]);
  expect(new Set(first.tables.map(({ calibration }) => calibration!.id)).size).toBe(1);
});

test('a revision keeps its quantity and polarisation; dates and calibrations are checked', async () => {
  const { id } = await hold('Frequency (MHz);Gain (dB)\n20;3,5\n1000;3,5\n');
  const refused = async (more: object) =>
    enterFactorTables(world.manager.actor, await body(id, more)).catch((error: Invalid) => error.issues);
  const revises = (await newest())!.publicId;
  const table = { index: 0, name: NAME, quantity: null, polarisation: null, distanceM: null, revises };
  expect(await refused({})).toMatchObject([{ pointer: '/tables/0/quantity' }]);
  expect(await refused({ tables: [{ ...table, quantity: 'loss', polarisation: 'vertical' }] })).toMatchObject([
    { pointer: '/tables/0/polarisation' },
  ]);
  const dated = (calibratedOn: string, dueOn: string) => ({
    calibration: { certificate: 'C', laboratory: 'L', calibratedOn, dueOn },
  });
  expect(await refused(dated('2099-01-01', '2100-01-01'))).toMatchObject([{ pointer: '/calibration/calibratedOn' }]);
  expect(await refused(dated('2021-01-01', '2020-01-01'))).toMatchObject([{ pointer: '/calibration/dueOn' }]);
  const other = (await readEquipment(world.manager.actor, world.items[0]!.equipmentId)).calibrations[0]!.id;
  expect(await refused({ calibration: { id: other } })).toMatchObject([{ pointer: '/calibration/id' }]);
  expect((await newest())!.revision).toBe(3);
});

test('a revision that somebody else entered since the preview refuses; two at once make one', async () => {
  const { id } = await hold('Frequency (MHz);Loss (dB)\n20;1\n1000;2\n');
  const asked = await body(id);
  const both = await Promise.allSettled([1, 2].map(() => enterFactorTables(world.manager.actor, asked)));
  expect(both.map(({ status }) => status).sort()).toEqual(['fulfilled', 'rejected']);
  const refused = both.find((one): one is PromiseRejectedResult => one.status === 'rejected')!;
  expect(refused.reason).toBeInstanceOf(Conflict);
  expect((refused.reason as Error).message).toContain('Look at the difference again');
  expect((await newest())!.revision).toBe(4);
});

test('only a manager previews and enters; a designer reads no equipment', async () => {
  const { id } = await hold('Frequency (MHz);Loss (dB)\n20;1\n1000;2\n');
  const asked = await body(id);
  for (const who of [world.technician, world.designer]) {
    await expect(enterFactorTables(who.actor, asked)).rejects.toThrow(Forbidden);
    await expect(previewFactorTable(who.actor, { ...asked, tables: [] })).rejects.toThrow(Forbidden);
  }
  const table = (await newest())!.publicId;
  for (const read of [readFactorTable, downloadFactorTable]) {
    await expect(read(world.designer.actor, table)).rejects.toThrow(Forbidden);
    await read(world.technician.actor, table);
  }
  await expect(readEquipment(world.designer.actor, cable().equipmentId)).rejects.toThrow(Forbidden);
});

test('lists are paged, and found by the words of the trade', async () => {
  const first = await listFactorTables(world.technician.actor, { limit: 2 });
  const second = await listFactorTables(world.technician.actor, { limit: 50, after: first.next! });
  const ids = [...first.items, ...second.items].map(({ id }) => id);
  expect(new Set(ids).size).toBe(ids.length);
  expect(ids).toHaveLength(await unitOfWork(() => FactorTableRevision.count()));
  const found = await listFactorTables(world.technician.actor, { limit: 50, find: 'preamp' });
  expect(found.items).toEqual([]);
  const cables = await listFactorTables(world.technician.actor, { limit: 50, find: 'cbl loss' });
  expect(new Set(cables.items.map(({ equipment }) => equipment.identifier))).toEqual(new Set(['CBL-1']));
  expect((await listEquipment(world.technician.actor, { limit: 50, find: 'ANT' })).items).toHaveLength(1);
});
