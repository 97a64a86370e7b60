import { closePasswordWorkers } from '@/auth/passwordWorker';
import { Conflict, StaleVersion } from '@/errors';
import { LimitLineRevision } from '@/models/limitLineRevision';
import { ModificationState } from '@/models/modificationState';
import { Retest } from '@/models/retest';
import { RetestChange } from '@/models/retestChange';
import { Sweep } from '@/models/sweep';
import { unitOfWork } from '@/models/unitOfWork';
import type { SampleView } from '@/schemas/job';
import type { RetestItem, RetestView } from '@/schemas/retest';
import type { SweepView } from '@/schemas/sweep';
import { enterLimitLine, enterLimitSet } from '@/services/enterLimits';
import { evaluateSweep } from '@/services/evaluations';
import { keepSweep } from '@/services/keepSweep';
import { changeRetest, listRetests, readRetest } from '@/services/retests';
import { refileSweep, restoreSweep, voidSweep } from '@/services/runActs';
import { changeState, createSample, createState, readSample } from '@/services/samples';
import { settleRetests } from '@/services/settleRetests';
import { createSweepFile } from '@/services/sweepFiles';
import { freshDatabase, type TestDatabase } from '../support/database';
import { enterWorld, sweepFile, type World } from '../support/world';

/*
 * Readings are in dBµV at the receiver; the world's path adds 14 + 2 − 30 = −14 dB, the limit is 40 dBµV/m to 230 MHz
 * (CISPR 32:2015 Table A.4, class B), U is 6 dB for a prescan and 5 dB for a final. A reading of 52 is 38 dBµV/m.
 */

let schema: TestDatabase;
let world: World;
let serial = 0;

beforeAll(async () => {
  schema = await freshDatabase();
  world = await enterWorld();
}, 120_000);
afterAll(async () => {
  await closePasswordWorkers();
  await schema.close();
});

const who = () => world.technician.actor;
const entered = (): Promise<SampleView> =>
  createSample(who(), world.job.id, { serial: `P3-${++serial}`, firmware: '', description: '' });

type Choice = Partial<Parameters<typeof keepSweep>[1]>;
const QP = { traces: [{ index: 0, name: 'QP', unit: 'dBuV' as const, detector: 'quasi-peak' as const, rbwHz: 120e3 }] };
const FINAL: Choice = { purpose: 'final', ...QP };
const VERTICAL: Choice = { polarisation: 'vertical' };

async function keep(stateId: string, readings: Record<number, number>, choice: Choice = {}): Promise<SweepView> {
  const file = await createSweepFile(who(), sweepFile(readings));
  return keepSweep(who(), { ...world.choice, ...world.about, ...choice, stateId, fileId: file.id });
}
const queue = async (sample: SampleView): Promise<RetestItem[]> =>
  (await listRetests(who(), { limit: 200, sampleId: sample.id })).items.sort((a, b) => (a.number < b.number ? -1 : 1));
const emissions = async (sample: SampleView) => (await queue(sample)).filter(({ kind }) => kind !== 'repeat-prescan');
const brief = (items: RetestItem[]) =>
  items.map(({ state, frequencyHz, status }) => [state.label, frequencyHz! / 1e6, status]);
const history = ({ changes }: RetestView) => [...changes].reverse().map(({ action, from, to }) => [action, from, to]);
const one = async (sample: SampleView): Promise<RetestView> => readRetest(who(), (await queue(sample))[0]!.id);
const fit = async (sample: SampleView, planned = false): Promise<SampleView> =>
  createState(who(), sample.id, { description: 'ferrite', planned });
const labelled = (view: SampleView, label: string) => view.states.find((state) => state.label === label)!;

describe('a candidate opens one item', () => {
  test('with what is needed to measure it again, and a change that says who, when, why and in which run', async () => {
    const sample = await entered();
    const run = await keep(sample.states[0]!.id, { 144: 52 }, { heightM: 1.5, azimuthDeg: 48 });
    const item = await one(sample);
    expect(item).toMatchObject({
      kind: 'peak',
      reason: 'needs-final',
      status: 'waiting',
      statusReason: `needs a final in ${run.number}`,
      state: { label: 'M0' },
      port: 'enclosure',
      position: 'horizontal',
      line: { detector: 'quasi-peak', bandwidthHz: 120e3, unit: 'dBuV/m', key: 'cispr32-b-re-3m' },
      frequencyHz: 144e6,
      limit: 40,
      verdict: 'needs-final',
      heightM: 1.5,
      azimuthDeg: 48,
      run: { id: run.id, number: run.number },
    });
    expect(item.level).toBeCloseTo(38, 5);
    expect(item.marginDb).toBeCloseTo(2, 5);
    expect(item.because).toBe(run.evaluation.worst!.because);
    expect(item.number).toMatch(/^T-\d\d-\d{3,}$/);
    expect(item.changes).toMatchObject([
      { action: 'opened', from: null, to: 'waiting', by: { id: who().publicId }, run: { number: run.number } },
    ]);
  });

  test('per emission: readings within the bandwidth are one, in both polarisations together', async () => {
    const sample = await entered();
    const state = sample.states[0]!.id;
    await keep(state, { 144: 52, 200: 51 });
    await keep(state, { 144.1: 53 }, VERTICAL);
    const items = await emissions(sample);
    expect(brief(items)).toEqual([
      ['M0', 144.1, 'waiting'],
      ['M0', 200, 'waiting'],
    ]);
    expect(items[0]).toMatchObject({ position: 'vertical' });
    const { changes } = await readRetest(who(), items[0]!.id);
    expect(changes.map(({ action }) => action)).toEqual(['updated', 'opened']);
    expect(changes[0]!.marginFromDb! - changes[0]!.marginToDb!).toBeCloseTo(1, 5);
  });

  test('none for a trial, an ambient run, or what is proven under', async () => {
    const sample = await entered();
    const state = sample.states[0]!.id;
    await keep(state, { 144: 60 }, { trial: 'foil on lid' });
    await keep(state, { 144: 60 }, { purpose: 'ambient' });
    await keep(state, { 144: 47 });
    expect(await queue(sample)).toEqual([]);
  });

  test('settling again changes nothing, and writes nothing', async () => {
    const sample = await entered();
    await keep(sample.states[0]!.id, { 144: 52, 200: 51 });
    await keep(sample.states[0]!.id, { 144.1: 53 }, VERTICAL);
    const before = await unitOfWork(async () => [await Retest.findAll({ raw: true }), await RetestChange.count()]);
    const state = await unitOfWork(() => ModificationState.findOne({ where: { publicId: sample.states[0]!.id } }));
    const settling = { stateId: state!.id, port: 'enclosure' as const, because: 'again', at: new Date() };
    await settleRetests(who(), settling);
    await settleRetests(who(), settling);
    expect(await unitOfWork(async () => [await Retest.findAll({ raw: true }), await RetestChange.count()])).toEqual(
      before,
    );
  });

  test('two imports at once enter an emission once', async () => {
    const sample = await entered();
    const state = sample.states[0]!.id;
    await Promise.all([
      keep(state, { 144: 52, 150: 52 }),
      keep(state, { 144: 53, 160: 52 }, VERTICAL),
      keep(state, { 144.1: 51, 160.1: 53 }),
    ]);
    expect(brief(await emissions(sample)).map(([, mhz]) => mhz)).toEqual(expect.arrayContaining([144, 150, 160.1]));
    expect(await emissions(sample)).toHaveLength(3);
    for (const { id } of await emissions(sample)) {
      const { changes } = await readRetest(who(), id);
      expect(changes.filter(({ action }) => action === 'opened')).toHaveLength(1);
    }
  }, 60_000);

  test('settled four times at once, it is entered once: the state is held, whoever else holds the job', async () => {
    const sample = await entered();
    const run = await keep(sample.states[0]!.id, { 144: 52 }, { trial: 'a quick look' });
    const stateId = await unitOfWork(async () => {
      await Sweep.update({ trial: null }, { where: { publicId: run.id } });
      return (await Sweep.findOne({ where: { publicId: run.id }, rejectOnEmpty: true })).stateId;
    });
    const settling = { stateId, port: 'enclosure' as const, because: 'at once', at: new Date() };
    await Promise.all(Array.from({ length: 4 }, () => settleRetests(who(), settling)));
    expect(await queue(sample)).toHaveLength(1);
    expect((await one(sample)).changes).toHaveLength(1);
  });
});

describe('a final at the emission', () => {
  test.each<[string, number, string, string]>([
    ['under by more than U clears it', 47, 'cleared', 'under'],
    ['within U is measured', 52, 'measured', 'inconclusive'],
    ['over by more than U is measured, and over is confirmed', 62, 'measured', 'over'],
  ])('%s', async (_says, reading, status, verdict) => {
    const sample = await entered();
    const state = sample.states[0]!.id;
    await keep(state, { 144: 52 });
    const final = await keep(state, { 144.1: reading }, FINAL);
    const item = await one(sample);
    expect(item).toMatchObject({
      status,
      verdict,
      run: { number: final.number },
      reason: verdict === 'over' ? 'over' : 'needs-final',
    });
    expect(item.statusReason).toContain(final.number);
    expect(history(item)).toEqual([
      ['opened', null, 'waiting'],
      [status, 'waiting', status],
    ]);
  });

  test('of the other polarisation settles nothing; a run in part clears nothing', async () => {
    const sample = await entered();
    const state = sample.states[0]!.id;
    await keep(state, { 144: 52 });
    await keep(state, {}, { ...FINAL, ...VERTICAL });
    expect(await one(sample)).toMatchObject({ status: 'waiting' });
    const final = await keep(state, {}, FINAL);
    expect(await one(sample)).toMatchObject({ status: 'cleared' });
    const partial = { line: 900, message: 'ends in the middle of a row', readToHz: 900e6 };
    await unitOfWork(() => Sweep.update({ partial }, { where: { publicId: final.id } }));
    await keep(state, {}, VERTICAL);
    expect(await one(sample)).toMatchObject({ status: 'waiting' });
  });

  test('voided, its prescan asks again: the same item is reopened', async () => {
    const sample = await entered();
    const state = sample.states[0]!.id;
    await keep(state, { 144: 52 });
    const final = await keep(state, {}, FINAL);
    const cleared = await one(sample);
    const voided = await voidSweep(who(), final.id, final.version, { reason: 'wrong cable' });
    const again = await one(sample);
    expect(again).toMatchObject({ id: cleared.id, status: 'waiting' });
    expect(history(again).at(-1)).toEqual(['reopened', 'cleared', 'waiting']);
    await restoreSweep(who(), final.id, voided.version, { reason: 'it was the right one' });
    expect(await one(sample)).toMatchObject({ id: cleared.id, status: 'cleared' });
    expect(await queue(sample)).toHaveLength(1);
  });
});

describe('an emission that is no longer shown', () => {
  test('is withdrawn with the reason, and the same item is reopened when it comes back', async () => {
    const sample = await entered();
    const run = await keep(sample.states[0]!.id, { 144: 52 });
    await voidSweep(who(), run.id, run.version, { reason: 'wrong sample' });
    expect(await one(sample)).toMatchObject({
      status: 'withdrawn',
      statusReason: `no longer shown: run ${run.number} voided`,
    });
    await keep(sample.states[0]!.id, { 144.1: 53 });
    const again = await one(sample);
    expect(again).toMatchObject({ status: 'waiting', frequencyHz: 144.1e6 });
    expect(history(again)).toEqual([
      ['opened', null, 'waiting'],
      ['withdrawn', 'waiting', 'withdrawn'],
      ['reopened', 'withdrawn', 'waiting'],
    ]);
    expect(await queue(sample)).toHaveLength(1);
  });

  test('goes with a run that is filed under another sample', async () => {
    const [from, to] = [await entered(), await entered()];
    const run = await keep(from.states[0]!.id, { 144: 52 });
    await refileSweep(who(), run.id, run.version, { stateId: to.states[0]!.id, reason: 'dropped on the wrong sample' });
    expect(await one(from)).toMatchObject({ status: 'withdrawn' });
    expect(await one(to)).toMatchObject({ status: 'waiting', frequencyHz: 144e6 });
  });

  test('a revised limit updates the item; a higher one withdraws it', async () => {
    const revised = async (limit: number) => {
      const before = await unitOfWork(() =>
        LimitLineRevision.findOne({
          where: { lineKey: 'cispr32-b-re-3m' },
          order: [['revision', 'DESC']],
          rejectOnEmpty: true,
        }),
      );
      const segments = before.segments.map((one) => ({ ...one, startLimit: limit, stopLimit: limit }));
      const {
        lineKey: key,
        name,
        document,
        class: cls,
        port,
        source,
        basis,
        detector,
        bandwidthHz,
        distanceM,
      } = before;
      const shared = { key, name, document, class: cls, port, source, basis, detector, bandwidthHz, distanceM };
      const line = await enterLimitLine(world.manager.actor, { ...shared, unit: 'dBuV/m', segments });
      const { name: set } = world.limitSet;
      await enterLimitSet(world.manager.actor, { name: set, port: 'enclosure', distanceM: 3, lines: [line] });
    };
    const sample = await entered();
    const run = await keep(sample.states[0]!.id, { 144: 52 });
    const before = await one(sample);
    await revised(38);
    await evaluateSweep(who(), run.id, { reason: 'the limit was revised' });
    const after = await one(sample);
    expect(after).toMatchObject({ id: before.id, limit: 38, status: 'waiting' });
    expect(after.marginDb).toBeCloseTo(0, 5);
    expect(history(after).at(-1)).toEqual(['updated', 'waiting', 'waiting']);
    await revised(60);
    await evaluateSweep(who(), run.id, { reason: 'the limit was revised' });
    expect(await one(sample)).toMatchObject({ id: before.id, status: 'withdrawn' });
  });
});

describe('what a person does', () => {
  const act = (item: RetestView, body: Parameters<typeof changeRetest>[3], version = item.version) =>
    changeRetest(who(), item.id, version, body);

  test('a scheduled retest stays scheduled until something new is measured', async () => {
    const sample = await entered();
    const state = sample.states[0]!.id;
    await keep(state, { 144: 52 });
    const planned = await act(await one(sample), { act: 'schedule', day: '2031-02-03', note: 'with the new cable' });
    expect(planned).toMatchObject({ status: 'scheduled', scheduledOn: '2031-02-03', note: 'with the new cable' });
    expect(planned.changes[0]).toMatchObject({
      action: 'scheduled',
      scheduledOn: '2031-02-03',
      reason: 'with the new cable',
    });
    await keep(state, { 144: 53 }, VERTICAL);
    expect(await one(sample)).toMatchObject({ status: 'scheduled', scheduledOn: '2031-02-03' });
    await keep(state, { 144: 52 }, { ...FINAL, ...VERTICAL });
    await keep(state, { 144: 52 }, FINAL);
    const measured = await one(sample);
    expect(measured).toMatchObject({ status: 'measured', scheduledOn: null });
    const again = await act(measured, { act: 'schedule', day: null, note: null });
    await keep(state, {}, VERTICAL);
    expect(await one(sample)).toMatchObject({ id: again.id, status: 'scheduled' });
  });

  test('a withdrawal is kept while nothing reads worse; then the item is reopened and says so', async () => {
    const sample = await entered();
    const state = sample.states[0]!.id;
    await keep(state, { 144: 52 });
    const set = await act(await one(sample), { act: 'withdraw', reason: 'a broadcast, also with the EUT off' });
    expect(set).toMatchObject({
      status: 'withdrawn',
      setAside: true,
      statusReason: 'a broadcast, also with the EUT off',
    });
    await keep(state, { 144: 51.5 }, VERTICAL);
    await keep(state, { 144: 52 });
    expect(await one(sample)).toMatchObject({ status: 'withdrawn', setAside: true });
    await keep(state, { 144: 52.5 });
    const reopened = await one(sample);
    expect(reopened).toMatchObject({ status: 'waiting', setAside: false });
    expect(reopened.statusReason).toMatch(/^reads worse than when it was withdrawn: needs a final in R-/);
    expect(reopened.changes[0]).toMatchObject({ action: 'reopened', reason: reopened.statusReason });
  });

  test('reopening brings it back to what its runs say', async () => {
    const sample = await entered();
    const state = sample.states[0]!.id;
    await keep(state, { 144: 52 });
    await keep(state, { 144: 52 }, FINAL);
    const set = await act(await one(sample), { act: 'withdraw', reason: 'agreed with the client' });
    const open = await act(set, { act: 'reopen', reason: 'not agreed after all' });
    expect(open).toMatchObject({ status: 'measured', setAside: false });
    expect(open.changes.slice(0, 2)).toMatchObject([
      { action: 'measured' },
      { action: 'reopened', reason: 'not agreed after all' },
    ]);
  });

  test('each act says why it cannot be, and the version has to be the one that was read', async () => {
    const sample = await entered();
    const state = sample.states[0]!.id;
    await keep(state, { 144: 52 });
    const waiting = await one(sample);
    await expect(act(waiting, { act: 'reopen', reason: 'x' })).rejects.toThrow(`${waiting.number} is waiting already.`);
    await expect(act(waiting, { act: 'withdraw', reason: 'x' }, 9)).rejects.toThrow(StaleVersion);
    await keep(state, {}, FINAL);
    const cleared = await one(sample);
    await expect(act(cleared, { act: 'schedule', day: null, note: null })).rejects.toThrow(Conflict);
    await expect(act(cleared, { act: 'reopen', reason: 'x' })).rejects.toThrow('A run that shows it again reopens it.');
  });
});

describe('after a modification a single frequency clears nothing', () => {
  const repeats = async (sample: SampleView) =>
    (await queue(sample))
      .filter(({ kind }) => kind === 'repeat-prescan')
      .map(({ state, position, status }) => [state.label, position, status]);

  test('open items go on to the fitted state, and the prescan of each position is asked for again', async () => {
    const sample = await entered();
    await keep(sample.states[0]!.id, { 144: 52, 200: 47 });
    await fit(sample);
    expect(brief(await emissions(sample))).toEqual([
      ['M0', 144, 'withdrawn'],
      ['M1', 144, 'waiting'],
    ]);
    const [old, now] = await emissions(sample);
    expect(old).toMatchObject({ statusReason: 'carried to M1', carriedTo: 'M1' });
    expect(now).toMatchObject({
      statusReason: 'carried from M0, not measured since',
      carriedFrom: { number: old!.number, state: 'M0' },
      marginDb: old!.marginDb,
    });
    expect(await repeats(sample)).toEqual([
      ['M1', 'horizontal', 'waiting'],
      ['M1', 'vertical', 'waiting'],
    ]);
  });

  test('a final measures it; it is cleared once the prescan of its position is repeated', async () => {
    const sample = await entered();
    await keep(sample.states[0]!.id, { 144: 52 });
    const m1 = labelled(await fit(sample), 'M1').id;
    const narrow = sweepFile({}).bytes;
    const text = new TextDecoder().decode(narrow).split('\n');
    const some = text.filter(
      (line, i) => i < 3 || (Number(line.split(',')[0]) > 140 && Number(line.split(',')[0]) < 150),
    );
    const bytes = new TextEncoder().encode([...some, ''].join('\n'));
    const file = await createSweepFile(who(), { name: 'single.csv', bytes });
    await keepSweep(who(), { ...world.choice, ...world.about, ...FINAL, stateId: m1, fileId: file.id });
    const measured = (await emissions(sample)).at(-1)!;
    expect(measured).toMatchObject({ status: 'measured' });
    expect(measured.statusReason).toMatch(
      /^under in R-[\d-]+; waits for the repeated prescan of horizontal polarisation$/,
    );
    await keep(m1, {}, VERTICAL);
    expect((await emissions(sample)).at(-1)).toMatchObject({ status: 'measured' });
    expect(await repeats(sample)).toEqual([
      ['M1', 'horizontal', 'waiting'],
      ['M1', 'vertical', 'cleared'],
    ]);
    await keep(m1, {});
    expect((await emissions(sample)).at(-1)).toMatchObject({ status: 'cleared' });
    expect(await repeats(sample)).toEqual([
      ['M1', 'horizontal', 'cleared'],
      ['M1', 'vertical', 'cleared'],
    ]);
  });

  test('a planned state takes nothing over before it is fitted, and gives it back when it is planned again', async () => {
    const sample = await entered();
    await keep(sample.states[0]!.id, { 144: 52 });
    const planned = labelled(await fit(sample, true), 'M1');
    expect(brief(await emissions(sample))).toEqual([['M0', 144, 'waiting']]);
    await changeState(who(), planned.id, planned.version, { planned: false });
    expect(brief(await emissions(sample))).toEqual([
      ['M0', 144, 'withdrawn'],
      ['M1', 144, 'waiting'],
    ]);
    const fitted = labelled(await readSample(who(), sample.id), 'M1');
    await changeState(who(), fitted.id, fitted.version, { planned: true });
    expect(brief(await emissions(sample))).toEqual([
      ['M0', 144, 'waiting'],
      ['M1', 144, 'withdrawn'],
    ]);
    const again = labelled(await readSample(who(), sample.id), 'M1');
    await changeState(who(), again.id, again.version, { planned: false });
    expect(brief(await emissions(sample))).toEqual([
      ['M0', 144, 'withdrawn'],
      ['M1', 144, 'waiting'],
    ]);
  });

  test('a run of the earlier state that is kept late goes on through every fitted state', async () => {
    const sample = await entered();
    await fit(sample);
    await fit(sample);
    const run = await keep(sample.states[0]!.id, { 144: 52 });
    expect(brief(await emissions(sample))).toEqual([
      ['M0', 144, 'withdrawn'],
      ['M1', 144, 'withdrawn'],
      ['M2', 144, 'waiting'],
    ]);
    await voidSweep(who(), run.id, run.version, { reason: 'wrong sample' });
    expect((await queue(sample)).map(({ status }) => status)).toEqual(Array(7).fill('withdrawn'));
  });

  test('what was cleared or set aside is not carried', async () => {
    const sample = await entered();
    const state = sample.states[0]!.id;
    await keep(state, { 144: 52, 200: 52 });
    await keep(state, { 200: 52 }, FINAL);
    const items = await emissions(sample);
    expect(brief(items)).toEqual([
      ['M0', 144, 'cleared'],
      ['M0', 200, 'measured'],
    ]);
    const set = items[1]!;
    await changeRetest(who(), set.id, set.version, { act: 'withdraw', reason: 'accepted by the client' });
    await fit(sample);
    expect(await queue(sample)).toHaveLength(2);
  });

  test('the state before and two at once: fitted while a run is kept, nothing is lost or entered twice', async () => {
    const sample = await entered();
    await keep(sample.states[0]!.id, { 144: 52 });
    await Promise.all([fit(sample), keep(sample.states[0]!.id, { 144.1: 53, 180: 52 }, VERTICAL)]);
    expect(brief(await emissions(sample)).sort()).toEqual([
      ['M0', 144.1, 'withdrawn'],
      ['M0', 180, 'withdrawn'],
      ['M1', 144.1, 'waiting'],
      ['M1', 180, 'waiting'],
    ]);
  }, 60_000);
});
