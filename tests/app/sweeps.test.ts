import { createHash } from 'node:crypto';
import { closePasswordWorkers } from '@/auth/passwordWorker';
import { GET as readCandidates } from '@/app/api/sweeps/[id]/candidates/route';
import { GET as readFile } from '@/app/api/sweeps/[id]/file/route';
import { GET as readWindow } from '@/app/api/sweeps/[id]/window/route';
import { GET as readWorking } from '@/app/api/sweeps/[id]/working/route';
import { GET as readSweep } from '@/app/api/sweeps/[id]/route';
import { POST as keep } from '@/app/api/sweeps/route';
import { POST as preview } from '@/app/api/sweep-files/[id]/preview/route';
import { POST as upload } from '@/app/api/sweep-files/route';
import type { RouteHandler } from '@/http/handle';
import { Evaluation } from '@/models/evaluation';
import { Sweep } from '@/models/sweep';
import { SweepFilePart } from '@/models/sweepFilePart';
import { unitOfWork } from '@/models/unitOfWork';
import type { CandidateView, PreviewView, SweepView, WindowView, WorkingView } from '@/schemas/sweep';
import type { SweepFileView } from '@/schemas/sweepFile';
import { freshDatabase, type TestDatabase } from '../support/database';
import { enterWorld, sweepFile, type World } from '../support/world';

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

function ask(handler: RouteHandler, id: string, more: { query?: string; body?: unknown; key?: string } = {}) {
  const headers = new Headers({ origin: ORIGIN, cookie: world.technician.cookie });
  if (more.body !== undefined) headers.set('content-type', 'application/json');
  if (more.key) headers.set('idempotency-key', more.key);
  const method = handler.operation.method;
  const body = more.body === undefined ? null : JSON.stringify(more.body);
  const request = new Request(`${ORIGIN}/x${more.query ?? ''}`, { method, headers, body });
  return handler(request, { params: Promise.resolve(id ? { id } : {}) });
}

async function send(file: { name: string; bytes: Uint8Array<ArrayBuffer> }): Promise<SweepFileView> {
  const form = new FormData();
  form.append('file', new File([file.bytes], file.name));
  const headers = { origin: ORIGIN, cookie: world.technician.cookie };
  const answer = await upload(new Request(`${ORIGIN}/x`, { method: 'POST', headers, body: form }));
  expect([answer.status, answer.ok ? '' : await answer.text()]).toEqual([201, '']);
  return (await answer.json()) as SweepFileView;
}

const kept = async (answer: Response): Promise<SweepView> => {
  expect([answer.status, answer.ok ? '' : await answer.text()]).toEqual([201, '']);
  return (await answer.json()) as SweepView;
};
const bodyFor = (file: SweepFileView, change: object = {}) => ({
  ...world.choice,
  ...world.about,
  fileId: file.id,
  ...change,
});
const issues = async (answer: Response) => {
  const problem = (await answer.json()) as { errors: { pointer: string; message: string }[] };
  return [answer.status, problem.errors.map(({ pointer }) => pointer)];
};

test('an upload answers what was recognised, and what of it is asked', async () => {
  const { recognition, repeats } = await send(sweepFile({ 200: 55 }, 'another.csv'));
  expect(recognition).toMatchObject({ kind: 'sweep', delimiter: ',', frequency: { unit: 'MHz', points: 9701 } });
  expect(recognition.traces).toMatchObject([{ unit: 'dBuV', detector: 'peak' }]);
  expect(recognition.settings.rbwHz).toBe(120e3);
  expect(repeats).toEqual([]);
});

test('a kept run holds the reading corrected by antenna factor + loss − gain, judged at its limit', async () => {
  const run = await kept(await ask(keep, '', { body: bodyFor(await send(sweepFile({ 144: 60.2 }))) }));
  // 60.2 + 14 + 2 − 30 = 46.2 dBµV/m against 40: 6.2 over, which a peak reading cannot decide against a quasi-peak limit
  expect(run.evaluation.worst).toMatchObject({ frequencyHz: 144e6, verdict: 'needs-final' });
  expect(run.evaluation.worst!.level).toBeCloseTo(46.2, 5);
  expect(run.evaluation.worst!.marginDb).toBeCloseTo(-6.2, 5);
  expect(run.evaluation.verdict).toBe('needs-final');
});

test('the same reading as a quasi-peak final is over', async () => {
  const traces = [{ index: 0, name: 'QP', unit: 'dBuV', detector: 'quasi-peak', rbwHz: 120e3 }];
  const body = bodyFor(await send(sweepFile({ 144: 60.2 })), { purpose: 'final', traces });
  const run = await kept(await ask(keep, '', { body }));
  expect(run.evaluation.verdict).toBe('over');
  expect(run.remarks).toContain('The file states a peak detector for QP; it was read as quasi-peak by hand.');
});

test('one polarisation never makes the port under; both do', async () => {
  const state = world.sample.states[0]!;
  const { createState } = await import('@/services/samples');
  const view = await createState(world.technician.actor, world.sample.id, { description: 'quiet', planned: false });
  const stateId = view.states.at(-1)!.id;
  expect(stateId).not.toBe(state.id);
  const quiet = await send(sweepFile({}));
  const first = await kept(await ask(keep, '', { body: bodyFor(quiet, { stateId }) }));
  expect(first.evaluation.verdict).toBe('under');
  expect(first.portVerdict).toMatchObject({ verdict: 'not-covered' });
  expect(first.portVerdict.missing).toMatchObject([{ what: 'position', position: 'vertical' }]);
  const body = bodyFor(quiet, { stateId, polarisation: 'vertical' });
  const second = await kept(await ask(keep, '', { body }));
  expect(second.portVerdict).toMatchObject({ verdict: 'under', missing: [] });
});

test('one height never makes the port under', async () => {
  const { createState } = await import('@/services/samples');
  const view = await createState(world.technician.actor, world.sample.id, { description: 'fixed', planned: false });
  const quiet = await send(sweepFile({}));
  const change = { stateId: view.states.at(-1)!.id, heightSwept: false };
  await kept(await ask(keep, '', { body: bodyFor(quiet, change) }));
  const body = bodyFor(quiet, { ...change, polarisation: 'vertical' });
  const { portVerdict } = await kept(await ask(keep, '', { body }));
  expect(portVerdict).toMatchObject({ verdict: 'not-covered', missing: [{ what: 'height' }, { what: 'height' }] });
});

const correctedFile = () => {
  const { bytes } = sweepFile({ 144: 60.2 });
  const text = `Corrected for,cable loss\n${new TextDecoder().decode(bytes)}`;
  return { name: 'corrected.csv', bytes: new TextEncoder().encode(text) };
};

test('where the file says that it is corrected, nothing is added before somebody has said what', async () => {
  const file = await send(correctedFile());
  expect(file.recognition.correctedFor).toMatchObject([{ line: 1 }]);
  expect(await issues(await ask(keep, '', { body: bodyFor(file) }))).toEqual([400, ['/alreadyCorrected']]);
  const left = await kept(await ask(keep, '', { body: bodyFor(file, { alreadyCorrected: ['CBL-1'] }) }));
  expect(left.evaluation.worst!.level).toBeCloseTo(44.2, 5);
  const added = await kept(await ask(keep, '', { body: bodyFor(file, { alreadyCorrected: [] }) }));
  expect(added.remarks.join()).toMatch(/Line 1 says .* nothing was left out/);
});

test('an RBW said otherwise than the file states it is remarked', async () => {
  const traces = [{ ...world.choice.traces[0]!, rbwHz: 1e6 }];
  const run = await kept(await ask(keep, '', { body: bodyFor(await send(sweepFile({})), { traces }) }));
  expect(run.remarks.join()).toMatch(/RBW of 120000 Hz/);
});

test('a run is judged with the path revision of the moment it was measured, and not of the future', async () => {
  const file = await send(sweepFile({}));
  const tomorrow = new Date(Date.now() + 86_400_000).toISOString();
  expect(await issues(await ask(keep, '', { body: bodyFor(file, { measuredAt: tomorrow }) }))).toEqual([
    400,
    ['/measuredAt'],
  ]);
  const long = new Date('2020-06-01T00:00:00Z').toISOString();
  expect(await issues(await ask(keep, '', { body: bodyFor(file, { measuredAt: long }) }))).toEqual([400, ['/pathId']]);
});

test('an upload that housekeeping takes away while it is being kept is kept whole', async () => {
  const file = await send(sweepFile({ 105: 41 }));
  const { Upload } = await import('@/models/upload');
  const purge = async () => {
    await new Promise((resolve) => setTimeout(resolve, 30));
    await unitOfWork(() => Upload.destroy({ where: { publicId: file.id } }));
  };
  const [answer] = await Promise.all([ask(keep, '', { body: bodyFor(file) }), purge()]);
  if (answer!.status === 201) {
    const run = (await answer!.json()) as SweepView;
    expect((await ask(readFile, run.id)).status).toBe(200);
  } else {
    expect(answer!.status).toBe(404);
  }
});

test('a term that the reading already holds is shown and not added', async () => {
  const body = bodyFor(await send(sweepFile({ 144: 60.2 })), { alreadyCorrected: ['CBL-1'] });
  const run = await kept(await ask(keep, '', { body }));
  expect(run.evaluation.worst!.level).toBeCloseTo(44.2, 5);
  const answer = await ask(readWorking, run.id, { query: '?frequencyHz=144e6&trace=0' });
  const working = (await answer.json()) as WorkingView;
  const cable = working.terms.find((term) => term.source.startsWith('CBL-1'))!;
  expect(cable).toMatchObject({ applied: false, figure: 2 });
});

test('a Working adds up to the level of the candidate, to the last bit, and names its sources', async () => {
  const { run } = world;
  const answer = await ask(readWorking, run.id, { query: '?frequencyHz=144e6&trace=0' });
  const working = (await answer.json()) as WorkingView;
  expect(working.level).toBe(run.evaluation.worst!.level);
  expect(working.marginDb).toBe(run.evaluation.worst!.marginDb);
  const sum = working.terms.reduce((level, term) => level + (term.sign === '−' ? -term.figure : term.figure), 0);
  expect(sum).toBeCloseTo(working.level!, 9);
  expect(working.terms.map((term) => term.calibration?.certificate ?? null)).toEqual([
    null,
    'C-ANT-1',
    'C-CBL-1',
    'C-PRE-1',
  ]);
  expect(working.limitSource).toMatch(/CISPR 32/);
});

test('values that are field strength take no factor', async () => {
  const traces = [{ index: 0, name: 'Peak', unit: 'dBuV/m', detector: 'peak', rbwHz: 120e3 }];
  const body = bodyFor(await send(sweepFile({ 144: 33 })), { valuesHold: 'field', traces });
  const run = await kept(await ask(keep, '', { body }));
  expect(run.evaluation.worst).toMatchObject({ level: 33 });
});

test('the original is answered byte for byte, as an attachment in a sandbox', async () => {
  const file = sweepFile({ 144: 60.2 }, 'Messung µ 1.csv');
  const run = await kept(await ask(keep, '', { body: bodyFor(await send(file)) }));
  const answer = await ask(readFile, run.id);
  expect(Buffer.from(await answer.arrayBuffer()).equals(Buffer.from(file.bytes))).toBe(true);
  expect(answer.headers.get('content-disposition')).toMatch(
    /^attachment; .*filename\*=UTF-8''Messung%20%C2%B5%201\.csv/,
  );
  expect(answer.headers.get('content-security-policy')).toMatch(/sandbox/);
  expect(run.file.sha256).toBe(createHash('sha256').update(file.bytes).digest('hex'));
});

test('a file that was kept before names the run it was kept as', async () => {
  const again = await send(sweepFile());
  expect(again.repeats.map(({ number }) => number)).toContain(world.run.number);
});

test('a window holds the extremes of the points it is computed from', async () => {
  const answer = await ask(readWindow, world.run.id, { query: '?fromHz=100e6&toHz=200e6&columns=16' });
  const [trace] = ((await answer.json()) as WindowView).traces;
  expect(Math.max(...(trace!.levelMax as number[]))).toBeCloseTo(46.2, 4);
  expect(Math.min(...(trace!.marginMin as number[]))).toBeCloseTo(-6.2, 4);
  expect(trace!.frequencyHz.length).toBeLessThanOrEqual(16);
});

test('candidates are paged worst first, each once', async () => {
  const first = (await (await ask(readCandidates, world.run.id, { query: '?limit=1' })).json()) as {
    total: number;
    items: CandidateView[];
    next: string | null;
  };
  expect(first.items).toMatchObject([{ rank: 1, frequencyHz: 144e6 }]);
  expect(first.next === null).toBe(first.total === 1);
});

test('a preview judges as keeping would, and keeps nothing', async () => {
  const file = await send(sweepFile({ 144: 60.2 }));
  const before = await unitOfWork(() => Sweep.count());
  const shown = (await (await ask(preview, file.id, { body: world.choice })).json()) as PreviewView;
  expect(shown.verdict).toBe('needs-final');
  expect(shown.worst!.marginDb).toBeCloseTo(-6.2, 5);
  expect(await unitOfWork(() => Sweep.count())).toBe(before);
});

test('the same Idempotency-Key keeps one run and answers it twice', async () => {
  const body = bodyFor(await send(sweepFile({ 100: 50 })));
  const before = await unitOfWork(() => Sweep.count());
  const key = 'one-press-of-keep';
  const [one, two] = await Promise.all([ask(keep, '', { body, key }), ask(keep, '', { body, key })]);
  const third = await ask(keep, '', { body, key });
  const ids = await Promise.all([one, two, third].map(async (answer) => ((await answer!.json()) as SweepView).id));
  expect(new Set(ids).size).toBe(1);
  expect(third.headers.get('idempotency-replayed')).toBe('true');
  expect(await unitOfWork(() => Sweep.count())).toBe(before + 1);
});

test('the same key with another body is a conflict', async () => {
  const file = await send(sweepFile({ 101: 50 }));
  const key = 'a-key-used-for-two';
  expect((await ask(keep, '', { body: bodyFor(file), key })).status).toBe(201);
  expect((await ask(keep, '', { body: bodyFor(file, { operatingMode: 'dimmed' }), key })).status).toBe(409);
});

test('runs kept at the same moment get numbers without gaps or doubles', async () => {
  const file = await send(sweepFile({ 102: 50 }));
  const answers = await Promise.all(Array.from({ length: 8 }, () => ask(keep, '', { body: bodyFor(file) })));
  const numbers = await Promise.all(answers.map(async (answer) => Number((await kept(answer)).number.split('-')[2])));
  numbers.sort((a, b) => a - b);
  expect(numbers).toEqual(numbers.map((_, i) => numbers[0]! + i));
});

const refusals: [string, object, [number, string[]]][] = [
  ['an unknown key', { colour: 'red' }, [400, ['/colour']]],
  [
    'a relative unit',
    { traces: [{ index: 0, name: 'x', unit: 'dB', detector: 'peak', rbwHz: null }] },
    [400, ['/traces/0/unit']],
  ],
  ['no polarisation on a radiated run', { polarisation: null }, [400, ['/polarisation']]],
  ['a distance the limit set is not for', { distanceM: 10 }, [400, ['/distanceM']]],
  ['a path item that is not on the path', { alreadyCorrected: ['LIM-9'] }, [400, ['/alreadyCorrected/0']]],
  [
    'a trace the file does not hold',
    { traces: [{ index: 4, name: 'x', unit: 'dBuV', detector: 'peak', rbwHz: 1e3 }] },
    [400, ['/traces/0/index']],
  ],
  ['two entries at once', { polarisation: null, distanceM: null }, [400, ['/polarisation', '/distanceM']]],
];
test.each(refusals)('%s is refused with a pointer, and nothing is half-written', async (_what, change, expected) => {
  const file = await send(sweepFile({ 103: 50 }));
  const count = () =>
    unitOfWork(async () => [await Sweep.count(), await Evaluation.count(), await SweepFilePart.count()]);
  const before = await count();
  expect(await issues(await ask(keep, '', { body: bodyFor(file, change) }))).toEqual(expected);
  expect(await count()).toEqual(before);
});

test('a run of a planned state is refused', async () => {
  const { createState } = await import('@/services/samples');
  const view = await createState(world.technician.actor, world.sample.id, { description: 'ferrite', planned: true });
  const body = bodyFor(await send(sweepFile()), { stateId: view.states.at(-1)!.id });
  expect((await ask(keep, '', { body })).status).toBe(409);
});

test('a truncated file is answered as refused with its line, and keeping it is refused with the same', async () => {
  const { bytes } = sweepFile();
  const cut = await send({ name: 'cut.csv', bytes: bytes.slice(0, bytes.lastIndexOf(44, 6000) + 1) });
  expect(cut.recognition.kind).toBe('refused');
  expect(cut.recognition.refusal!.line).toBeGreaterThan(100);
  const answer = await ask(keep, '', { body: bodyFor(cut) });
  expect([answer.status, ((await answer.json()) as { line: number }).line]).toEqual([
    422,
    cut.recognition.refusal!.line,
  ]);
});

test('a file over 100 MB is answered 413 with the limit named', async () => {
  const headers = {
    origin: ORIGIN,
    cookie: world.technician.cookie,
    'content-type': 'multipart/form-data; boundary=x',
  };
  const request = new Request(`${ORIGIN}/x`, {
    method: 'POST',
    headers: { ...headers, 'content-length': String(120 * 1024 * 1024) },
    body: 'x',
  });
  const answer = await upload(request);
  expect(answer.status).toBe(413);
  expect(await answer.text()).toMatch(/100 MB/);
});

test('an empty file and no file are refused with the place', async () => {
  const form = new FormData();
  form.append('other', 'x');
  const headers = { origin: ORIGIN, cookie: world.technician.cookie };
  const answer = await upload(new Request(`${ORIGIN}/x`, { method: 'POST', headers, body: form }));
  expect(await issues(answer)).toEqual([400, ['/file']]);
});

test('what a run was judged by is pinned: a later revision of its path changes nothing', async () => {
  const before = (await (await ask(readSweep, world.run.id)).json()) as SweepView;
  const { enterSignalPath } = await import('@/services/enterSignalPath');
  const { SignalPathRevision } = await import('@/models/signalPathRevision');
  const revision = await unitOfWork(() => SignalPathRevision.findOne({ rejectOnEmpty: true }));
  await enterSignalPath(world.manager.actor, {
    code: 'P-1',
    name: 'radiated at 3 m',
    port: 'enclosure',
    position: 'A',
    items: revision.items.slice(0, 1),
    uncertainty: { prescan: [], final: [] },
    uncertaintySource: 'made for tests',
  });
  const after = (await (await ask(readSweep, world.run.id)).json()) as SweepView;
  expect(after).toEqual({ ...before, portVerdict: after.portVerdict });
  const window = await ask(readWindow, world.run.id, { query: '?fromHz=140e6&toHz=150e6&columns=64' });
  expect(Math.max(...((await window.json()) as WindowView).traces[0]!.levelMax.map(Number))).toBeCloseTo(46.2, 4);
});

test('a path with a lapsed calibration takes no run', async () => {
  const { enterCalibration } = await import('@/services/enterEquipment');
  const { Equipment } = await import('@/models/equipment');
  const antenna = await unitOfWork(() => Equipment.findOne({ where: { identifier: 'ANT-1' }, rejectOnEmpty: true }));
  const lapsed = { certificate: 'C-late', laboratory: 'invented', calibratedOn: '2021-01-02', dueOn: '2022-01-02' };
  const file = await send(sweepFile({ 104: 50 }));
  expect((await ask(preview, file.id, { body: world.choice })).status).toBe(200);
  await enterCalibration(world.manager.actor, antenna, { ...lapsed, tables: [] });
  const answer = await ask(keep, '', { body: bodyFor(file) });
  expect([answer.status, await answer.text()]).toEqual([409, expect.stringContaining('ANT-1 lapsed on 2022-01-02')]);
});
