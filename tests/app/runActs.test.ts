import { createHash } from 'node:crypto';
import { closePasswordWorkers } from '@/auth/passwordWorker';
import { GET as listEvaluations, POST as evaluate } from '@/app/api/sweeps/[id]/evaluations/route';
import { GET as readFile } from '@/app/api/sweeps/[id]/file/route';
import { POST as refile } from '@/app/api/sweeps/[id]/refile/route';
import { POST as restore } from '@/app/api/sweeps/[id]/restore/route';
import { GET as readSweep } from '@/app/api/sweeps/[id]/route';
import { POST as voidRun } from '@/app/api/sweeps/[id]/void/route';
import { GET as readWorking } from '@/app/api/sweeps/[id]/working/route';
import { GET as listSweeps } from '@/app/api/sweeps/route';
import type { RouteHandler } from '@/http/handle';
import { Equipment } from '@/models/equipment';
import { Evaluation } from '@/models/evaluation';
import { EvaluationCandidate } from '@/models/evaluationCandidate';
import { EvaluationLayer } from '@/models/evaluationLayer';
import { LimitLineRevision } from '@/models/limitLineRevision';
import { SignalPath } from '@/models/signalPath';
import { SignalPathRevision } from '@/models/signalPathRevision';
import { Sweep } from '@/models/sweep';
import { unitOfWork } from '@/models/unitOfWork';
import type { EvaluationItem } from '@/schemas/runActs';
import type { SweepView, WorkingView } from '@/schemas/sweep';
import { historyOf, verifyChain } from '@/services/audit';
import { enterCalibration } from '@/services/enterEquipment';
import { enterLimitLine, enterLimitSet } from '@/services/enterLimits';
import { enterSignalPath } from '@/services/enterSignalPath';
import { changeJob, createJob, readJob } from '@/services/jobs';
import { keepSweep } from '@/services/keepSweep';
import { createProduct } from '@/services/products';
import { createSample, createState, readSample } from '@/services/samples';
import { createSweepFile } from '@/services/sweepFiles';
import { freshDatabase, type TestDatabase } from '../support/database';
import { enterWorld, sweepFile, type Somebody, type World } from '../support/world';

/* Corrections of kept runs: re-file, void and restore, re-evaluate. Nothing is deleted by any of them. */

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

interface Ask {
  as?: Somebody;
  body?: unknown;
  version?: number;
  key?: string;
  query?: string;
}

function ask(handler: RouteHandler, id: string, { as = world.technician, body, version, key, query = '' }: Ask = {}) {
  const headers = new Headers({ origin: ORIGIN, cookie: as.cookie });
  if (body !== undefined) headers.set('content-type', 'application/json');
  if (version !== undefined) headers.set('if-match', `"${version}"`);
  if (key) headers.set('idempotency-key', key);
  const { method } = handler.operation;
  const request = new Request(`${ORIGIN}/x${query}`, { method, headers, body: body ? JSON.stringify(body) : null });
  return handler(request, { params: Promise.resolve(id ? { id } : {}) });
}

async function done<T = SweepView>(answer: Response, status = 200): Promise<T> {
  expect([answer.status, answer.status === status ? '' : await answer.text()]).toEqual([status, '']);
  return (await answer.json()) as T;
}

let files = 0;
let limitSetId: string | undefined;
async function keepRun(change: object = {}, readings: Record<number, number> = { 144: 60.2 }): Promise<SweepView> {
  const { actor } = world.technician;
  const file = await createSweepFile(actor, sweepFile(readings, `acts-${++files}.csv`));
  return keepSweep(actor, {
    ...world.choice,
    ...world.about,
    fileId: file.id,
    ...(limitSetId && { limitSetId }),
    ...change,
  });
}

/** A sample of the other client, in a job of its own. */
async function strangersSample() {
  const boss = world.manager.actor;
  const product = await createProduct(boss, {
    organisationId: world.stranger.publicId,
    code: `TP-${++files}`,
    name: 'Pump controller',
    description: '',
  });
  const job = await createJob(boss, { productId: product.id, title: 'TP', decisionRule: 'guarded-by-u' });
  const sample = await createSample(boss, job.id, { serial: `T-${files}`, firmware: '', description: '' });
  return { job, sample, stateId: sample.states[0]!.id };
}

const stateOfOwn = async (description: string, planned = false) =>
  (await createState(world.technician.actor, world.sample.id, { description, planned })).states.at(-1)!;

describe('re-filing', () => {
  test('a run keeps number, file and evaluation; it leaves one port’s verdict and joins the other’s', async () => {
    const [from, to] = [await stateOfOwn('gasket'), await stateOfOwn('gasket and clip')];
    const stays = await keepRun({ stateId: from.id });
    const run = await keepRun({ stateId: from.id, polarisation: 'vertical' });
    const body = { stateId: to.id, reason: 'the clip was on' };
    const moved = await done(await ask(refile, run.id, { body, version: run.version }));
    expect(moved).toMatchObject({
      number: run.number,
      file: run.file,
      state: { id: to.id },
      version: run.version + 1,
      evaluation: { id: run.evaluation.id },
    });
    expect(moved.portVerdict.runs.map(({ id }) => id)).toEqual([run.id]);
    const left = await done(await ask(readSweep, stays.id));
    expect(left.portVerdict.runs.map(({ id }) => id)).toEqual([stays.id]);
  });

  test('both jobs’ chains get an entry and hold', async () => {
    const { job, stateId } = await strangersSample();
    const run = await keepRun();
    await done(await ask(refile, run.id, { body: { stateId, reason: 'mixed up' }, version: run.version }));
    const [here] = await historyOf(world.manager.actor, 'sweep', run.id);
    const [there] = await historyOf(world.manager.actor, 'job', world.job.id);
    expect([here!.action, there!.action]).toEqual([
      `run ${run.number} re-filed`,
      `run ${run.number} re-filed to job ${job.number}`,
    ]);
    expect(await verifyChain(`job-${world.job.id}`)).toBeNull();
    expect(await verifyChain(`job-${job.id}`)).toBeNull();
  });

  test('moved to another client, the first client finds it no more and the other does', async () => {
    const { stateId } = await strangersSample();
    const run = await keepRun();
    expect((await ask(readSweep, run.id, { as: world.designer })).status).toBe(200);
    await done(await ask(refile, run.id, { body: { stateId, reason: 'mixed up' }, version: run.version }));
    for (const handler of [readSweep, readFile, listEvaluations]) {
      expect((await ask(handler, run.id, { as: world.designer })).status).toBe(404);
      expect((await ask(handler, run.id, { as: world.outsider })).status).toBe(200);
    }
    const { items } = await done<{ items: { id: string }[] }>(
      await ask(listSweeps, '', { as: world.designer, query: '?limit=200' }),
    );
    expect(items.map(({ id }) => id)).not.toContain(run.id);
  });

  test('refused: the state it has, a planned state, a closed job on either side, a stale version', async () => {
    const run = await keepRun();
    const { version } = run;
    const move = async (stateId: string, at = version) =>
      (await ask(refile, run.id, { body: { stateId, reason: 'r' }, version: at })).status;
    const { job, stateId } = await strangersSample();
    expect(await move(run.state.id)).toBe(409);
    expect(await move((await stateOfOwn('ferrite', true)).id)).toBe(409);
    expect(await move('0000000000000000')).toBe(400);
    expect(await move(stateId, version + 1)).toBe(412);

    const close = { state: 'closed' as const, stateReason: 'reported' };
    await changeJob(world.manager.actor, job.id, job.version, close);
    expect(await move(stateId)).toBe(409);
    const own = await readJob(world.manager.actor, world.job.id);
    const closed = await changeJob(world.manager.actor, own.id, own.version, close);
    expect(await move(world.other.states[0]!.id)).toBe(409);
    await changeJob(world.manager.actor, own.id, closed.version, { state: 'open', stateReason: null });
    expect((await done(await ask(readSweep, run.id))).state.id).toBe(run.state.id);
  });
});

describe('voiding', () => {
  test('a voided run stays readable with its bytes, is marked, and speaks for nothing; twice is a conflict', async () => {
    const state = await stateOfOwn('voids');
    const run = await keepRun({ stateId: state.id });
    const body = { reason: 'the mast stood still' };
    const voided = await done(await ask(voidRun, run.id, { body, version: run.version }));
    expect(voided.voided).toMatchObject({ reason: body.reason, by: { name: world.technician.actor.name } });
    expect(voided.portVerdict.runs).toEqual([]);
    expect(voided.evaluation.id).toBe(run.evaluation.id);
    expect((await ask(voidRun, run.id, { body, version: voided.version })).status).toBe(409);

    const bytes = new Uint8Array(await (await ask(readFile, run.id)).arrayBuffer());
    expect(createHash('sha256').update(bytes).digest('hex')).toBe(run.file.sha256);
    const { items } = await done<{ items: { id: string; voided: boolean }[] }>(
      await ask(listSweeps, '', { query: `?stateId=${state.id}` }),
    );
    expect(items).toMatchObject([{ id: run.id, voided: true }]);
    expect((await readSample(world.manager.actor, world.sample.id)).states.at(-1)!.runs).toBe(1);
  });

  test('restoring gives it its voice back, with a reason; restoring twice is a conflict', async () => {
    const state = await stateOfOwn('restored');
    const run = await keepRun({ stateId: state.id });
    const voided = await done(await ask(voidRun, run.id, { body: { reason: 'a' }, version: run.version }));
    const back = await done(await ask(restore, run.id, { body: { reason: 'b' }, version: voided.version }));
    expect(back.voided).toBeNull();
    expect(back.portVerdict).toEqual(run.portVerdict);
    expect((await ask(restore, run.id, { body: { reason: 'b' }, version: back.version })).status).toBe(409);
    const history = await historyOf(world.manager.actor, 'sweep', run.id);
    expect(history.map(({ action }) => action)).toEqual([
      `run ${run.number} restored`,
      `run ${run.number} voided`,
      `run ${run.number} kept`,
    ]);
  });

  test('each act needs its reason', async () => {
    const run = await keepRun();
    for (const handler of [voidRun, restore, evaluate]) {
      expect((await ask(handler, run.id, { body: { reason: ' ' }, version: run.version })).status).toBe(400);
    }
  });
});

interface Listed {
  items: EvaluationItem[];
  newer: string[];
}
const evaluationsOf = async (id: string, as = world.technician) => done<Listed>(await ask(listEvaluations, id, { as }));
const again = async (id: string, key?: string) =>
  done<{ evaluation: EvaluationItem; sweep: SweepView }>(
    await ask(evaluate, id, { body: { reason: 'to be sure' }, key }),
    201,
  );

const storedOf = (publicId: string) =>
  unitOfWork(async () => {
    const row = await Evaluation.findOne({ where: { publicId }, rejectOnEmpty: true });
    const where = { evaluationId: row.id };
    const candidates = await EvaluationCandidate.findAll({ where, order: [['rank', 'ASC']] });
    const layers = await EvaluationLayer.findAll({ where, order: [['traceIndex', 'ASC']] });
    return {
      candidates: candidates.map((one) => ({ ...one.get({ plain: true }), evaluationId: 0 })),
      layers: layers.map(({ layer }) => layer.toString('hex')),
    };
  });

/** The next revision of the lab's limit line and of the set that names it. */
async function reviseLimits(byDb: number) {
  const [last] = await unitOfWork(() => LimitLineRevision.findAll({ order: [['id', 'DESC']], limit: 1 }));
  const { lineKey: key, ...line } = last!.get({ plain: true });
  const segments = line.segments.map((one) => ({
    ...one,
    startLimit: one.startLimit + byDb,
    stopLimit: one.stopLimit + byDb,
  }));
  const revised = await enterLimitLine(world.manager.actor, {
    ...{ key, segments, name: line.name, document: line.document, class: line.class, port: line.port },
    ...{ detector: line.detector, bandwidthHz: line.bandwidthHz, unit: 'dBuV/m', distanceM: line.distanceM },
    ...{ source: line.source, basis: line.basis },
  });
  const { name, port, distanceM } = world.limitSet;
  return enterLimitSet(world.manager.actor, { name, port, distanceM, lines: [revised] });
}

/** The next revision of the path: ANT-1's table read anew under the same calibration day, or one made later. */
async function revisePath(valueDb: number, calibratedOn: string) {
  const { actor } = world.manager;
  const antenna = await unitOfWork(() => Equipment.findOne({ where: { identifier: 'ANT-1' }, rejectOnEmpty: true }));
  const [table] = await enterCalibration(actor, antenna, {
    ...{ certificate: `C-${valueDb}`, laboratory: 'invented', calibratedOn, dueOn: '2099-01-01' },
    tables: [
      {
        ...{ name: 'ANT-1 table 1', quantity: 'antenna-factor', polarisation: null, distanceM: null },
        ...{ source: 'made for tests', frequenciesHz: [20e6, 1e9], valuesDb: [valueDb, valueDb] },
      },
    ],
  });
  const { path, last } = await unitOfWork(async () => {
    const path = await SignalPath.findOne({ where: { code: 'P-1' }, rejectOnEmpty: true });
    const where = { signalPathId: path.id };
    const last = await SignalPathRevision.findOne({ where, order: [['revision', 'DESC']], rejectOnEmpty: true });
    return { path, last };
  });
  const tables = { horizontal: null, vertical: null, any: table!.publicId };
  const items = last.items.map((item) => (item.equipmentId === antenna.publicId ? { ...item, tables } : item));
  const { code, name, port, position } = path;
  const { uncertainty, uncertaintySource } = last;
  return enterSignalPath(actor, { code, name, port, position, items, uncertainty, uncertaintySource });
}

describe('re-evaluating', () => {
  test('with nothing changed: another evaluation, the same bits, and it says so', async () => {
    const run = await keepRun();
    const { evaluation, sweep } = await again(run.id);
    expect(evaluation).toMatchObject({ changes: [], repeats: true, current: true, reason: 'to be sure' });
    expect(evaluation.id).not.toBe(run.evaluation.id);
    expect(sweep).toMatchObject({ version: run.version + 1, evaluation: { id: evaluation.id } });
    expect(await storedOf(evaluation.id)).toEqual(await storedOf(run.evaluation.id));
    const { items, newer } = await evaluationsOf(run.id);
    expect(newer).toEqual([]);
    expect(items.map(({ id, current, reason }) => [id, current, reason])).toEqual([
      [evaluation.id, true, 'to be sure'],
      [run.evaluation.id, false, null],
    ]);
  });

  test('a repeat of the same request is answered once', async () => {
    const run = await keepRun();
    const first = await again(run.id, 'key-of-one-evaluation');
    const second = await again(run.id, 'key-of-one-evaluation');
    expect(second).toEqual(first);
    expect((await evaluationsOf(run.id)).items).toHaveLength(2);
  });

  test('a newer limit revision is offered to the lab, used, and named; the old evaluation stays as it was', async () => {
    const run = await keepRun();
    const before = await storedOf(run.evaluation.id);
    const set = await reviseLimits(3);
    limitSetId = set.publicId;
    const offered = ['Limit line CISPR 32 class B, enclosure, 3 m, quasi-peak revision 2 is newer.'];
    const { newer } = await evaluationsOf(run.id);
    expect(newer).toEqual([...offered, `Limit set ${set.name} revision 2 is newer.`]);
    expect((await evaluationsOf(run.id, world.designer)).newer).toEqual([]);

    const { evaluation, sweep } = await again(run.id);
    expect(evaluation.repeats).toBe(false);
    expect(evaluation.changes).toEqual([
      'limit line CISPR 32 class B, enclosure, 3 m, quasi-peak: revision 2, before that revision 1',
      `limit set ${set.name}: revision 2, before that revision 1`,
    ]);
    expect(sweep.limitSet.id).toBe(set.publicId);
    expect(sweep.evaluation.worst!.marginDb).toBeCloseTo(run.evaluation.worst!.marginDb + 3, 6);
    const stored = await unitOfWork(() => Evaluation.findOne({ where: { publicId: evaluation.id } }));
    expect(stored!.inputs.limitSet).toBe(set.publicId);
    expect(await storedOf(run.evaluation.id)).toEqual(before);
    expect((await evaluationsOf(run.id)).newer).toEqual([]);
  });

  test('a table read anew moves level and Working together; one calibrated after the day it was measured does not', async () => {
    const run = await keepRun();
    await revisePath(15.5, '2020-01-02');
    await revisePath(99, '2098-12-31');
    const { newer } = await evaluationsOf(run.id);
    expect(newer).toEqual(['Table ANT-1 table 1 revision 2 is newer.', 'Path P-1 revision 2 is newer.']);
    const { sweep } = await again(run.id);
    expect(sweep.evaluation.worst!.level).toBeCloseTo(run.evaluation.worst!.level + 1.5, 6);
    expect(sweep.path!.revision).toBe(2);
    const working = await done<WorkingView>(await ask(readWorking, run.id, { query: '?frequencyHz=144e6&trace=0' }));
    expect(working.level).toBe(sweep.evaluation.worst!.level);
    expect(working.terms.map(({ figure }) => figure)).toContain(15.5);
    expect(working.terms.map(({ source }) => source)).toContain('ANT-1 table 1, revision 2');
  });

  test('a path that changed its items after the run was measured is not used for it', async () => {
    const measuredAt = new Date().toISOString();
    const run = await keepRun({ measuredAt });
    const { path, last } = await unitOfWork(async () => {
      const path = await SignalPath.findOne({ where: { code: 'P-1' }, rejectOnEmpty: true });
      const last = await SignalPathRevision.findOne({ order: [['revision', 'DESC']], rejectOnEmpty: true });
      return { path, last };
    });
    const { code, name, port, position } = path;
    const { uncertainty, uncertaintySource } = last;
    const items = last.items.slice(0, -1);
    await enterSignalPath(world.manager.actor, { code, name, port, position, items, uncertainty, uncertaintySource });
    const { newer } = await evaluationsOf(run.id);
    expect(newer).toEqual([]);
    const { evaluation } = await again(run.id);
    expect(evaluation.repeats).toBe(true);
  });

  test('a voided run is restored before it is judged again', async () => {
    const run = await keepRun();
    await done(await ask(voidRun, run.id, { body: { reason: 'a' }, version: run.version }));
    expect((await ask(evaluate, run.id, { body: { reason: 'b' } })).status).toBe(409);
    expect((await evaluationsOf(run.id)).newer).toEqual([]);
  });

  test('an evaluation row is never changed: the restricted account may not', async () => {
    await expect(unitOfWork(() => Evaluation.update({ verdict: 'under' }, { where: {} }))).rejects.toThrow(/denied/i);
  });
});

test('a trial speaks for nothing but itself', async () => {
  const state = await stateOfOwn('with trials');
  const own = await keepRun({ stateId: state.id });
  const trial = await keepRun({ stateId: state.id, trial: 'foil on lid' }, { 144: 75 });
  expect(trial).toMatchObject({ trial: 'foil on lid', portVerdict: { runs: [{ id: own.id }] } });
  expect(await unitOfWork(() => Sweep.count({ where: { publicId: trial.id, trial: 'foil on lid' } }))).toBe(1);
});
