import { closePasswordWorkers } from '@/auth/passwordWorker';
import { limitAt } from '@/emc/limitLine';
import { Conflict, Forbidden, type Invalid, NotFound } from '@/errors';
import { LimitLineRevision } from '@/models/limitLineRevision';
import { LimitSet } from '@/models/limitSet';
import { unitOfWork } from '@/models/unitOfWork';
import { createLimitSet as createLimitSetOperation } from '@/schemas/bench';
import { enterLimitLineBody } from '@/schemas/tables';
import { verifyChain } from '@/services/audit';
import { createLimitSet, enterLimitLineFile } from '@/services/enterLimitFile';
import { keepSweep } from '@/services/keepSweep';
import { previewLimitLine } from '@/services/limitLineFile';
import { downloadLimitLine, listLimitLines, readLimitLine } from '@/services/limitLines';
import { lineView, listLimitSets, readLimitSet, toCoreLine } from '@/services/limitSets';
import { createSweepFile } from '@/services/sweepFiles';
import { readSweep } from '@/services/sweeps';
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

const hold = async (text: string) =>
  (await createSweepFile(world.manager.actor, { name: 'line.csv', bytes: new TextEncoder().encode(text) })).id;
const SEGMENTS = 'Start MHz;Stop MHz;Limit dBuV/m\n30;230;40\n230;1000;47\n';
const body = (fileId: string, more: object = {}) =>
  enterLimitLineBody.parse({
    ...{ fileId, name: 'Customer line, 3 m, quasi-peak', document: 'CL 7:2026', class: 'B', port: 'enclosure' },
    ...{ unit: 'dBuV/m', detector: 'quasi-peak', bandwidthHz: 120e3, distanceM: 3, source: 'CL 7:2026, table 2' },
    ...{ basis: 'verified', reason: 'asked for by the client', revises: null },
    ...more,
  });
const old = () => world.limitLine;
const revision = (fileId: string, more: object = {}) =>
  body(fileId, { revises: old().publicId, name: old().name, document: old().document, source: 'Table A.4', ...more });

test('a new line is entered from segments; at its step the lower limit governs (47 CFR 15.109(c))', async () => {
  const entered = await enterLimitLineFile(world.manager.actor, body(await hold(SEGMENTS)));
  expect(entered).toMatchObject({
    line: {
      key: 'cl-7-2026-b-enclosure-qp-3m',
      revision: 1,
      enteredBy: { name: 'manager' },
      file: { name: 'line.csv' },
    },
    ...{ sets: [], left: [], runs: 0 },
  });
  const row = await unitOfWork(() => LimitLineRevision.findOne({ where: { publicId: entered.line.id } }));
  const line = toCoreLine(lineView(row!));
  expect([30e6, 230e6, 230.1e6, 1e9].map((hz) => limitAt(line, hz))).toEqual([40, 40, 47, 47]);
  const again = await enterLimitLineFile(world.manager.actor, body(await hold(SEGMENTS)));
  expect(again.line.key).toBe('cl-7-2026-b-enclosure-qp-3m-2');
});

test('what the file does not say is asked; it is not entered before', async () => {
  const fileId = await hold('0,15;66\n0,5;56\n30;56\n');
  const open = await previewLimitLine(world.manager.actor, { fileId, revises: null, frequencyUnit: null, unit: null, between: null }); // prettier-ignore
  expect(open).toMatchObject({ questions: ['frequencyUnit', 'unit', 'between'], segments: null, proposedFrequencyUnit: 'MHz' }); // prettier-ignore
  const mains = { unit: 'dBuV', port: 'ac-mains', distanceM: null, bandwidthHz: 9e3 };
  const enter = (more: object) => enterLimitLineFile(world.manager.actor, body(fileId, { ...mains, ...more }));
  await expect(enter({})).rejects.toMatchObject({ issues: [{ pointer: '/frequencyUnit' }] });
  await expect(enter({ frequencyUnit: 'MHz' })).rejects.toMatchObject({ issues: [{ pointer: '/between' }] });
  const { line } = await enter({ frequencyUnit: 'MHz', between: 'hold' });
  expect(line.segments.map(({ startLimit, stopLimit }) => [startLimit, stopLimit])).toEqual([[66, 66], [56, 56]]); // prettier-ignore
});

test('the preview shows the difference beside the revision before, the sets that name it, and what a file states', async () => {
  const fileId = await hold(
    `Detector;quasi-peak\nBandwidth;120 kHz\nDistance;3 m\n${SEGMENTS.replace('30;230;40', '30;230;39')}`,
  );
  const asked = { fileId, revises: old().publicId, frequencyUnit: null, unit: null, between: null };
  const preview = await previewLimitLine(world.manager.actor, asked);
  expect(preview).toMatchObject({
    ...{ refusal: null, questions: [], unit: 'dBuV/m', holes: [] },
    stated: { detector: 'quasi-peak', bandwidthHz: 120e3, distanceM: 3, name: null },
    before: { revision: 1, difference: { largestDb: -1, atHz: 30e6 } },
    sets: [{ id: world.limitSet.publicId, revision: 1 }],
  });
  const { refusal } = await previewLimitLine(world.manager.actor, {
    ...asked,
    fileId: await hold(`${SEGMENTS}see note 3\n`),
  });
  expect(refusal).toMatchObject({ line: 4, found: 'see note 3' });
});

test('a revised line: chosen sets follow, the old set leaves the choice and stays readable, runs keep theirs', async () => {
  const { manager, technician, designer } = world;
  const fileId = await hold(SEGMENTS.replace('30;230;40', '30;230;39'));
  const entered = await enterLimitLineFile(manager.actor, revision(fileId, { setIds: [world.limitSet.publicId] }));
  expect(entered.line).toMatchObject({ key: old().lineKey, revision: 2, newest: true });
  expect(entered.sets).toMatchObject([{ name: world.limitSet.name, revision: 2, withdrawnAt: null }]);
  expect(entered.runs).toBeGreaterThan(0);

  const offered = (await listLimitSets(technician.actor, { limit: 50 })).items;
  expect(offered.map(({ id }) => id)).toEqual([entered.sets[0]!.id]);
  expect(offered[0]!.lines.map(({ id }) => id)).toEqual([entered.line.id]);
  const all = (await listLimitSets(technician.actor, { limit: 50, withdrawn: 'with' })).items;
  expect(all.map(({ revision: n, withdrawnAt }) => [n, withdrawnAt === null])).toEqual([[2, true], [1, false]]); // prettier-ignore
  expect((await readLimitSet(technician.actor, world.limitSet.publicId)).withdrawnAt).not.toBeNull();

  expect((await readSweep(manager.actor, world.run.id)).limitSet.lines.map(({ id }) => id)).toEqual([old().publicId]);
  const file = await createSweepFile(technician.actor, sweepFile());
  const run = { ...world.choice, ...world.about, fileId: file.id };
  await expect(keepSweep(technician.actor, run)).rejects.toMatchObject({
    issues: [{ pointer: '/limitSetId', message: expect.stringContaining('revision 2 of CISPR 32 class B radiated') }],
  });
  const later = await keepSweep(technician.actor, { ...run, limitSetId: entered.sets[0]!.id });
  expect(later.limitSet.lines.map(({ id }) => id)).toEqual([entered.line.id]);

  const record = await readLimitLine(technician.actor, entered.line.id);
  expect(record).toMatchObject({ runs: { count: 1 }, before: { revision: 1, difference: { largestDb: -1 } } });
  expect(record.revisions.map(({ revision: n }) => n)).toEqual([2, 1]);
  expect((await readLimitLine(technician.actor, old().publicId)).runs.count).toBe(entered.runs);

  // A client keeps reading the set its run was judged by, and no other.
  const own = (await listLimitSets(designer.actor, { limit: 50 })).items.map(({ id }) => id);
  expect(own).toContain(world.limitSet.publicId);
  expect((await listLimitSets(world.outsider.actor, { limit: 50 })).items).toEqual([]);
  await expect(readLimitSet(world.outsider.actor, world.limitSet.publicId)).rejects.toThrow(NotFound);
  expect(await verifyChain('lab')).toBeNull();
});

test('a set that is not chosen is named and stays; an old revision cannot be revised again', async () => {
  const fileId = await hold(SEGMENTS.replace('30;230;40', '30;230;38'));
  await expect(enterLimitLineFile(world.manager.actor, revision(fileId))).rejects.toThrow(Conflict);
  const newest = await unitOfWork(() => LimitLineRevision.findOne({ where: { lineKey: old().lineKey }, order: [['revision', 'DESC']] })); // prettier-ignore
  const entered = await enterLimitLineFile(world.manager.actor, revision(fileId, { revises: newest!.publicId }));
  expect(entered).toMatchObject({ line: { revision: 3 }, sets: [], left: [{ revision: 2, withdrawnAt: null }] });
  const sets = await unitOfWork(() => LimitSet.count({ where: { withdrawnAt: null } }));
  expect(sets).toBe(1);
});

test('another detector, unit or distance is another line, not a revision; another unit than the file’s is refused', async () => {
  const newest = await unitOfWork(() => LimitLineRevision.findOne({ where: { lineKey: old().lineKey }, order: [['revision', 'DESC']] })); // prettier-ignore
  const fileId = await hold(SEGMENTS);
  const refused = (more: object) =>
    enterLimitLineFile(world.manager.actor, revision(fileId, { revises: newest!.publicId, ...more })).catch(
      (error: Invalid) => error.issues.map(({ pointer }) => pointer),
    );
  expect(await refused({ detector: 'average', distanceM: 10 })).toEqual(['/detector', '/distanceM']);
  expect(await refused({ unit: 'dBuV' })).toEqual(['/unit']);
  expect(await refused({ setIds: [world.limitSet.publicId] })).toEqual(['/setIds/0']);
});

test('downloaded and uploaded again it is the same line', async () => {
  const { items } = await listLimitLines(world.technician.actor, { limit: 50 });
  for (const line of items) {
    const { text, name } = await downloadLimitLine(world.technician.actor, line.id);
    expect(name).toBe(`${line.name}, revision ${line.revision}.csv`);
    const asked = { fileId: await hold(text), revises: line.id, frequencyUnit: null, unit: null, between: null };
    const preview = await previewLimitLine(world.manager.actor, asked);
    expect(preview.segments).toEqual(line.segments);
    expect(preview.before!.difference!.largestDb).toBe(0);
    const { key, document, class: of, port, detector, bandwidthHz, distanceM, source, basis } = line;
    expect(preview.stated).toEqual({ key, name: line.name, document, class: of, port, detector, bandwidthHz, distanceM, source, basis }); // prettier-ignore
  }
  expect(items.length).toBeGreaterThan(2);
});

test('a set is made of newest lines of its distance and port, once each; its next revision withdraws it', async () => {
  const { manager } = world;
  const { items } = await listLimitLines(manager.actor, { limit: 50 });
  const [mains] = items.filter(({ unit }) => unit === 'dBuV');
  const radiated = items.filter(({ unit }) => unit === 'dBuV/m').map(({ id }) => id);
  const set = (more: object) =>
    createLimitSetOperation.body!.parse({
      ...{ name: 'Customer set', port: 'enclosure', distanceM: 3, lineIds: radiated.slice(0, 1), reason: 'new client' },
      ...more,
    });
  const refused = (more: object) =>
    createLimitSet(manager.actor, set(more)).catch((error: Invalid) => error.issues.map(({ pointer }) => pointer));
  expect(await refused({ lineIds: [old().publicId] })).toEqual(['/lineIds/0']);
  expect(await refused({ lineIds: [radiated[0], radiated[0], mains!.id] })).toEqual(['/lineIds/1', '/lineIds/2', '/lineIds/2']); // prettier-ignore
  expect(await refused({ name: world.limitSet.name })).toEqual(['/name']);
  const made = await createLimitSet(manager.actor, set({}));
  expect(made).toMatchObject({ name: 'Customer set', revision: 1, withdrawnAt: null });
  const next = await createLimitSet(manager.actor, set({ revises: made.id, lineIds: radiated.slice(0, 2) }));
  expect(next).toMatchObject({ revision: 2, lines: [{ id: radiated[0] }, { id: radiated[1] }] });
  expect((await readLimitSet(manager.actor, made.id)).withdrawnAt).not.toBeNull();
});

test('only a manager previews and enters; a designer reads no lines', async () => {
  const fileId = await hold(SEGMENTS);
  for (const who of [world.technician, world.designer]) {
    await expect(enterLimitLineFile(who.actor, body(fileId))).rejects.toThrow(Forbidden);
    const asked = { fileId, revises: null, frequencyUnit: null, unit: null, between: null };
    await expect(previewLimitLine(who.actor, asked)).rejects.toThrow(Forbidden);
  }
  await expect(readLimitLine(world.designer.actor, old().publicId)).rejects.toThrow(Forbidden);
  await expect(listLimitLines(world.designer.actor, { limit: 5 })).rejects.toThrow(Forbidden);
  const found = await listLimitLines(world.technician.actor, { limit: 50, find: 'cl radiated qp' });
  expect(found.items.length).toBeGreaterThan(0);
});
