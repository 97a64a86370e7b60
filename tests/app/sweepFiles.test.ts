import { closePasswordWorkers } from '@/auth/passwordWorker';
import { GET as readHeld } from '@/app/api/sweep-files/[id]/route';
import { POST as preview } from '@/app/api/sweep-files/[id]/preview/route';
import { POST as upload } from '@/app/api/sweep-files/route';
import { GET as listRuns, POST as keep } from '@/app/api/sweeps/route';
import { GET as readRun } from '@/app/api/sweeps/[id]/route';
import { GET as readWorking } from '@/app/api/sweeps/[id]/working/route';
import type { RouteHandler } from '@/http/handle';
import { missingText } from '@/format/missing';
import { FileShape } from '@/models/fileShape';
import { Sweep } from '@/models/sweep';
import { unitOfWork } from '@/models/unitOfWork';
import type { PreviewView, SweepView, WorkingView } from '@/schemas/sweep';
import type { SweepFileView } from '@/schemas/sweepFile';
import { createState } from '@/services/samples';
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

async function send(text: string | Uint8Array, name = 'sweep.csv'): Promise<SweepFileView> {
  const form = new FormData();
  form.append('file', new File([typeof text === 'string' ? text : Uint8Array.from(text)], name));
  const headers = { origin: ORIGIN, cookie: world.technician.cookie };
  const answer = await upload(new Request(`${ORIGIN}/x`, { method: 'POST', headers, body: form }));
  return good<SweepFileView>(answer, 201);
}

async function good<T>(answer: Response, status = 200): Promise<T> {
  expect([answer.status, answer.ok ? '' : await answer.text()]).toEqual([status, '']);
  return (await answer.json()) as T;
}
const issues = async (answer: Response) => {
  const problem = (await answer.json()) as { errors: { pointer: string; message: string }[] };
  return [answer.status, problem.errors.map(({ pointer }) => pointer)];
};
const bodyFor = (file: SweepFileView, change: object = {}) => ({
  ...world.choice,
  ...world.about,
  fileId: file.id,
  ...change,
});
const newState = async (description: string) =>
  (await createState(world.technician.actor, world.sample.id, { description, planned: false })).states.at(-1)!.id;

/** The file of the world cut behind the decimal comma or separator of a row. */
function cutFile(levels: Record<number, number> = {}, row = 5000): Uint8Array {
  const text = new TextDecoder().decode(sweepFile(levels).bytes);
  const lines = text.split('\n');
  const at = lines.findIndex((line) => /^\d/.test(line)) + row;
  return new TextEncoder().encode([...lines.slice(0, at), lines[at]!.replace(/,.*$/, '')].join('\n'));
}

describe('a file that breaks off', () => {
  it('is refused, shows its line and what could be kept, and keeps nothing by itself', async () => {
    const before = await unitOfWork(() => Sweep.count());
    const { recognition } = await send(cutFile());
    expect(recognition).toMatchObject({ kind: 'refused', partial: { points: 5000 } });
    expect(recognition.refusal!.line).toBe(recognition.partial!.line);
    expect(recognition.broken!.lines.find(({ line }) => line === recognition.refusal!.line)).toBeDefined();
    expect(await unitOfWork(() => Sweep.count())).toBe(before);
  });

  it('is not kept without saying that it is partial, and a whole file is not kept as partial', async () => {
    const cut = await send(cutFile());
    expect((await ask(keep, '', { body: bodyFor(cut) })).status).toBe(422);
    const whole = await send(sweepFile({}).bytes);
    expect(await issues(await ask(keep, '', { body: bodyFor(whole, { keepPartial: true }) }))).toEqual([
      400,
      ['/keepPartial'],
    ]);
    const prose = await send('nothing to read here\n');
    expect(await issues(await ask(keep, '', { body: bodyFor(prose, { keepPartial: true }) }))).toEqual([
      400,
      expect.arrayContaining(['/keepPartial']),
    ]);
  });

  it('kept in part it is marked, quiet points are not under, and the port says what is missing', async () => {
    const stateId = await newState('cut');
    const file = await send(cutFile());
    const shown = await good<PreviewView>(
      await ask(preview, file.id, { body: { ...world.choice, keepPartial: true } }),
    );
    expect([shown.verdict, shown.counts.under]).toEqual(['not-covered', 0]);
    const run = await good<SweepView>(
      await ask(keep, '', { body: bodyFor(file, { stateId, keepPartial: true }) }),
      201,
    );
    expect(run.partial).toMatchObject({ line: file.recognition.partial!.line, readToHz: run.lastHz });
    expect(run.partial!.message).toMatch(/^Line \d+ .* points were read before it/);
    expect(run.points).toBe(5000);
    expect(run.evaluation.verdict).toBe('not-covered');
    expect(run.evaluation.counts.under).toBe(0);
    expect(run.evaluation.gaps.map(({ because }) => because)).toContain('partial');
    expect(run.portVerdict.verdict).toBe('not-covered');
    expect(run.portVerdict.missing.map(missingText)).toContain(
      'Horizontal polarisation is measured only in part: its file breaks off. Measure it again.',
    );
    const query = `?frequencyHz=${run.firstHz}&trace=0`;
    const working = await good<WorkingView>(await ask(readWorking, run.id, { query }));
    expect([working.verdict, working.because]).toEqual(['not-covered', expect.stringMatching(/kept in part/)]);
    const { items } = await good<{ items: { id: string; partial: boolean }[] }>(
      await ask(listRuns, '', { query: `?stateId=${stateId}` }),
    );
    expect(items).toMatchObject([{ id: run.id, partial: true }]);
  });

  it('what it shows over stays over, and makes the port over', async () => {
    const traces = [{ index: 0, name: 'QP', unit: 'dBuV', detector: 'quasi-peak', rbwHz: 120e3 }];
    const change = { stateId: await newState('cut, over'), keepPartial: true, purpose: 'final', traces };
    const run = await good<SweepView>(
      await ask(keep, '', { body: bodyFor(await send(cutFile({ 144: 60.2 })), change) }),
      201,
    );
    expect([run.evaluation.verdict, run.portVerdict.verdict]).toEqual(['over', 'over']);
    expect(run.evaluation.worst!.marginDb).toBeCloseTo(-6.2, 5);
  });

  it('beside whole runs it takes nothing away, and in place of one it covers nothing', async () => {
    const stateId = await newState('whole and part');
    const whole = await send(sweepFile({}).bytes);
    const part = await send(cutFile());
    const keepAs = async (file: SweepFileView, change: object) =>
      good<SweepView>(await ask(keep, '', { body: bodyFor(file, { stateId, ...change }) }), 201);
    await keepAs(whole, {});
    const half = await keepAs(part, { polarisation: 'vertical', keepPartial: true });
    expect(half.portVerdict).toMatchObject({
      verdict: 'not-covered',
      missing: [{ what: 'partial', position: 'vertical' }],
    });
    const both = await keepAs(whole, { polarisation: 'vertical' });
    expect(both.portVerdict).toMatchObject({ verdict: 'under', missing: [] });
  });
});

describe('the shape of a file', () => {
  /** A file that says nothing of unit, detector or bandwidth. `mark` makes a shape of its own. */
  const bare = (mark: string, level = 30) =>
    [
      `Remark;${mark}`,
      `${mark};on`,
      'X;Y',
      ...Array.from({ length: 60 }, (_, i) => `${(30 + i * 0.1).toFixed(3)};${(level + (i % 5) / 10).toFixed(2)}`),
      '',
    ].join('\n');
  const traces = [{ index: 0, name: 'Y', unit: 'dBuV', detector: 'peak', rbwHz: 120e3 }];

  it('proposes for the next file what was said of the last, with the run it was said of', async () => {
    const first = await send(bare('alpha'));
    expect(first.asBefore).toBeNull();
    const change = { traces, alreadyCorrected: ['CBL-1'], heightSwept: true };
    const run = await good<SweepView>(await ask(keep, '', { body: bodyFor(first, change) }), 201);
    const next = await send(bare('alpha', 41));
    expect(next.recognition.shape).toBe(first.recognition.shape);
    expect(next.asBefore).toMatchObject({
      run: { id: run.id, number: run.number },
      pathId: world.choice.pathId,
      limitSetId: world.choice.limitSetId,
      valuesHold: 'receiver-input',
      alreadyCorrected: ['CBL-1'],
      frequencyUnit: 'MHz',
      traces: [{ index: 0, unit: 'dBuV', detector: 'peak', rbwHz: 120e3 }],
    });
    // A proposal answers nothing by itself: the recognition still asks, and nothing of the file is overridden.
    expect(next.recognition.questions.map(({ key }) => key)).toEqual(
      expect.arrayContaining(['frequencyUnit', 'levelUnit', 'detector', 'rbwHz']),
    );
    expect(next.recognition.traces).toMatchObject([{ unit: null, detector: null }]);
    expect((await send(bare('beta'))).asBefore).toBeNull();
  });

  it('the last one kept counts, one row per shape', async () => {
    const file = await send(bare('gamma'));
    await good(await ask(keep, '', { body: bodyFor(file, { traces }) }), 201);
    const again = { traces: [{ ...traces[0], detector: 'average' }] };
    const run = await good<SweepView>(await ask(keep, '', { body: bodyFor(file, again) }), 201);
    const { asBefore, recognition } = await send(bare('gamma'));
    expect(asBefore).toMatchObject({ run: { number: run.number }, traces: [{ detector: 'average' }] });
    const rows = await unitOfWork(() => FileShape.findAll({ where: { shape: recognition.shape! } }));
    expect(rows.map(({ kept }) => kept)).toEqual([2]);
  });

  it('of a voided run nothing is proposed', async () => {
    const file = await send(bare('delta'));
    const run = await good<SweepView>(await ask(keep, '', { body: bodyFor(file, { traces }) }), 201);
    await unitOfWork(() =>
      Sweep.update({ voidedAt: new Date(), voidReason: 'misread' }, { where: { publicId: run.id } }),
    );
    expect((await send(bare('delta'))).asBefore).toBeNull();
  });

  it('files of one shape kept at the same moment leave one row', async () => {
    const files = await Promise.all(Array.from({ length: 4 }, (_, i) => send(bare('epsilon', 30 + i))));
    const answers = await Promise.all(files.map((file) => ask(keep, '', { body: bodyFor(file, { traces }) })));
    expect(answers.map(({ status }) => status)).toEqual([201, 201, 201, 201]);
    const rows = await unitOfWork(() => FileShape.findAll({ where: { shape: files[0]!.recognition.shape! } }));
    expect(rows.map(({ kept }) => kept)).toEqual([4]);
  });
});

describe('one of several sweeps', () => {
  const rows = Array.from({ length: 60 }, (_, i) => `${(30 + i * 0.1).toFixed(3)};${(30 + (i % 5) / 10).toFixed(2)}`);
  const two = [
    ...['Detector;Peak', 'RBW;120;kHz', 'VBW;300;kHz', 'Frequency [MHz];Level [dBuV]', ...rows],
    ...['Detector;Average', 'RBW;120;kHz', 'VBW;10;Hz', 'Frequency [MHz];Level [dBuV]', ...rows, ''],
  ].join('\n');

  it('is described by its own preamble once it is chosen', async () => {
    const file = await send(two);
    expect(file.recognition).toMatchObject({
      sweeps: [{}, {}],
      traces: [{ detector: null }],
      settings: { vbwHz: null },
    });
    const chosen = async (sweep: number) =>
      (await good<SweepFileView>(await ask(readHeld, file.id, { query: `?sweep=${sweep}` }))).recognition;
    expect(await chosen(0)).toMatchObject({ traces: [{ detector: 'peak' }], settings: { vbwHz: 300e3 } });
    expect(await chosen(1)).toMatchObject({ traces: [{ detector: 'average' }], settings: { vbwHz: 10 } });
    expect(await issues(await ask(readHeld, file.id, { query: '?sweep=2' }))).toEqual([400, ['/query/sweep']]);
  });

  it('is judged with its own filters: behind a narrow VBW a peak is an average and shows nothing', async () => {
    const file = await send(two);
    const traces = [{ index: 0, name: 'Level', unit: 'dBuV', detector: 'peak', rbwHz: 120e3 }];
    const verdicts = [0, 1].map(async (sweepIndex) => {
      const answer = await ask(preview, file.id, { body: { ...world.choice, traces, sweepIndex } });
      return (await good<PreviewView>(answer)).worst!.verdict;
    });
    expect(await Promise.all(verdicts)).toEqual(['under', 'needs-final']);
  });
});

test('each file of a drop is kept in its own transaction: one that fails leaves the others', async () => {
  const files = await Promise.all([0, 1, 2].map((i) => send(sweepFile({ [110 + i]: 40 }).bytes, `drop_${i}.csv`)));
  const change = (i: number) => (i === 1 ? { polarisation: null } : {});
  const keys = files.map((file) => `keep-${file.id}`);
  const once = () =>
    Promise.all(files.map((file, i) => ask(keep, '', { body: bodyFor(file, change(i)), key: keys[i] })));
  const first = await once();
  expect(first.map(({ status }) => status)).toEqual([201, 400, 201]);
  const ids = (answers: Response[]) =>
    Promise.all(answers.filter(({ ok }) => ok).map(async (answer) => ((await answer.json()) as SweepView).id));
  const second = await once();
  expect(await ids(second)).toEqual(await ids(first));
});

test('a trial is kept under its state and does not speak for it', async () => {
  const stateId = await newState('trials');
  const body = bodyFor(await send(sweepFile({ 144: 60.2 }).bytes), { stateId, trial: 'foil on lid' });
  const run = await good<SweepView>(await ask(keep, '', { body }), 201);
  expect(run.trial).toBe('foil on lid');
  expect(run.portVerdict.runs).toEqual([]);
  expect((await good<SweepView>(await ask(readRun, run.id))).trial).toBe('foil on lid');
});
