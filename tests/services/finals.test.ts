import { closePasswordWorkers } from '@/auth/passwordWorker';
import { Invalid } from '@/errors';
import { Upload } from '@/models/upload';
import { Sweep } from '@/models/sweep';
import { unitOfWork } from '@/models/unitOfWork';
import type { FinalsBody, TypedFinal } from '@/schemas/finals';
import type { SampleView } from '@/schemas/job';
import type { SweepView } from '@/schemas/sweep';
import { readFinalsSheet } from '@/services/finalsSheet';
import { keepFinals } from '@/services/keepFinals';
import { keepSweep } from '@/services/keepSweep';
import { previewFinals } from '@/services/previewFinals';
import { listRetests } from '@/services/retests';
import { createSample } from '@/services/samples';
import { createSweepFile } from '@/services/sweepFiles';
import { downloadSweepFile, listCandidates, readSweep } from '@/services/sweeps';
import { freshDatabase, type TestDatabase } from '../support/database';
import { enterWorld, sweepFile, type World } from '../support/world';

/*
 * Readings are in dBµV at the receiver; the world's path adds 14 + 2 − 30 = −14 dB, the limit is 40 dBµV/m to 230 MHz
 * (CISPR 32:2015 Table A.4, class B), U of a final is 5 dB. A reading of 47 is 33 dBµV/m, 7 dB under.
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
async function prescanned(
  readings: Record<number, number>,
  choice: Partial<Parameters<typeof keepSweep>[1]> = {},
): Promise<{ sample: SampleView; run: SweepView; stateId: string }> {
  const sample = await createSample(who(), world.job.id, { serial: `F-${++serial}`, firmware: '', description: '' });
  const file = await createSweepFile(who(), sweepFile(readings));
  const stateId = sample.states[0]!.id;
  const run = await keepSweep(who(), { ...world.choice, ...world.about, ...choice, stateId, fileId: file.id });
  return { sample, run, stateId };
}
const queue = async (sample: SampleView) =>
  (await listRetests(who(), { limit: 200, sampleId: sample.id })).items.sort((a, b) => a.frequencyHz! - b.frequencyHz!);

let read = '';
/** Now: a path cannot have served before it was entered. */
const readAt = () => (read ||= new Date().toISOString());

type Part = Partial<TypedFinal> & Pick<TypedFinal, 'frequencyHz'>;
const typed = (retestId: string, level: number, part: Part): TypedFinal => ({
  retestIds: [retestId],
  readings: [{ detector: 'quasi-peak', level }],
  rbwHz: 120e3,
  heightM: 1.2,
  azimuthDeg: 75,
  readAt: readAt(),
  remark: null,
  ...part,
});
const bodyFor = (stateId: string, finals: TypedFinal[], part: Partial<FinalsBody> = {}): FinalsBody => ({
  ...{ stateId, port: 'enclosure', polarisation: 'horizontal', line: null, distanceM: 3 },
  ...{ pathId: world.choice.pathId, limitSetId: world.choice.limitSetId, operatingMode: 'full light' },
  ...{ valuesHold: 'receiver-input', unit: 'dBuV', alreadyCorrected: [], heightSwept: true, finals },
  ...part,
});
const issuesOf = async (asked: Promise<unknown>) => {
  const error = await asked.then(
    () => null,
    (refused: unknown) => refused,
  );
  expect(error).toBeInstanceOf(Invalid);
  return (error as Invalid).issues;
};

describe('the sheet', () => {
  test('lists what waits, worst first, with how the run that asked was measured', async () => {
    const { run, stateId, sample } = await prescanned({ 144: 52, 180: 60, 200: 51 });
    const sheet = await readFinalsSheet(who(), { runId: run.id });
    expect(sheet).toMatchObject({
      run: { id: run.id },
      sample: { code: sample.code },
      state: { id: stateId, label: 'M0' },
      port: 'enclosure',
      leftOut: 0,
      proposed: {
        from: { number: run.number },
        pathId: world.choice.pathId,
        limitSet: { id: world.choice.limitSetId },
        distanceM: 3,
        operatingMode: 'full light',
        unit: 'dBuV',
        heightSwept: true,
      },
    });
    expect(sheet.positions).toHaveLength(1);
    const [{ position, finals }] = sheet.positions as [(typeof sheet.positions)[number]];
    expect(position).toBe('horizontal');
    expect(finals.map(({ frequencyHz, detectors, rbwHz }) => [frequencyHz, detectors, rbwHz])).toEqual([
      [180e6, ['quasi-peak'], 120e3],
      [144e6, ['quasi-peak'], 120e3],
      [200e6, ['quasi-peak'], 120e3],
    ]);
    expect(sheet.paths.map(({ code, wrong }) => [code, wrong])).toEqual([['P-1', null]]);
    expect(await readFinalsSheet(who(), { stateId, port: 'enclosure' })).toMatchObject({
      run: null,
      positions: sheet.positions,
    });
  });

  test('of a port where nothing waits is empty, and of a designer it is none', async () => {
    const { stateId } = await prescanned({});
    const nothing = await readFinalsSheet(who(), { stateId, port: 'enclosure' });
    expect(nothing).toMatchObject({ positions: [], proposed: null });
    await expect(readFinalsSheet(world.designer.actor, { runId: world.run.id })).rejects.toMatchObject({
      kind: 'forbidden',
    });
    await expect(readFinalsSheet(who(), { stateId: 'x'.repeat(16), port: 'enclosure' })).rejects.toMatchObject({
      kind: 'not-found',
    });
  });
});

describe('typed finals', () => {
  test('become a run with purpose final that settles what it was typed for, under and over', async () => {
    const { sample, stateId } = await prescanned({ 144: 52, 200: 51 });
    const [low, high] = await queue(sample);
    const finals = [
      typed(low!.id, 47, { frequencyHz: 144_018_000, remark: 'cable along z' }),
      typed(high!.id, 61, { frequencyHz: 200e6, heightM: 3.4, azimuthDeg: 210 }),
    ];
    const kept = await keepFinals(who(), bodyFor(stateId, finals));
    expect(kept.runs).toMatchObject([{ verdict: 'over', points: 2 }]);
    expect(kept.retests.map(({ number, status }) => [number, status])).toEqual([
      [low!.number, 'cleared'],
      [high!.number, 'measured'],
    ]);
    expect(kept.retests[1]!.statusReason).toContain('over, confirmed by the final');
    const run = await readSweep(who(), kept.runs[0]!.id);
    expect(run).toMatchObject({
      purpose: 'final',
      polarisation: 'horizontal',
      heightM: null,
      heightSwept: true,
      measuredAt: readAt(),
      by: { name: who().name },
      traces: [{ detector: 'quasi-peak', unit: 'dBuV', rbwHz: 120e3 }],
    });
    const { items } = await listCandidates(who(), run.id, { limit: 20 });
    expect(items.map(({ frequencyHz, verdict }) => [frequencyHz, verdict])).toEqual([
      [200e6, 'over'],
      [144_018_000, 'under'],
    ]);
  });

  test('are kept as a file that says who typed what, when and for which retests', async () => {
    const { sample, stateId } = await prescanned({ 144: 52, 200: 51 });
    const [low, high] = await queue(sample);
    const finals = [
      typed(high!.id, 41.25, { frequencyHz: 200e6, heightM: null, remark: 'door; "shut"' }),
      typed(low!.id, 47, { frequencyHz: 144_018_000 }),
    ];
    const at = new Date();
    const stamp = at.toISOString().replace(/[-:]/g, '').replace('T', '-').slice(0, 15);
    const { runs } = await keepFinals(who(), bodyFor(stateId, finals), at);
    const file = await downloadSweepFile(who(), runs[0]!.id);
    const lines = Buffer.from(file.bytes).toString('utf8').split('\n');
    expect(file.name).toBe(`finals-${sample.code}-M0-horizontal-polarisation-${stamp}.csv`);
    expect(lines).toEqual([
      '# Finals typed at the bench, not exported by a receiver',
      `# Typed by ${who().name}`,
      `# Kept at ${at.toISOString()}`,
      `# Job ${world.job.number}, sample ${sample.code} M0, horizontal polarisation`,
      `# For ${low!.number}, ${high!.number}`,
      '# RBW: 120000 Hz',
      'Frequency (MHz);Quasi-peak (dBµV);Height;Azimuth deg;Time;Retests and remark',
      `144.018;47;1.2 m;75;${readAt()};${low!.number}`,
      `200;41.25;–;75;${readAt()};"${high!.number}, door; ""shut"""`,
      '',
    ]);
  });

  test('alone is a run too: one row under its headings', async () => {
    const { sample, stateId } = await prescanned({ 144: 52 });
    const [item] = await queue(sample);
    const kept = await keepFinals(who(), bodyFor(stateId, [typed(item!.id, 47, { frequencyHz: 144e6 })]));
    expect(kept.runs).toMatchObject([{ points: 1 }]);
    expect(kept.retests).toMatchObject([{ number: item!.number, status: 'cleared' }]);
    expect((await queue(sample)).map(({ status }) => status)).toEqual(['cleared']);
  });

  test('left out stay waiting; tuned further off than half the bandwidth settle nothing', async () => {
    const { sample, stateId } = await prescanned({ 144: 52, 200: 51 });
    const [low] = await queue(sample);
    await keepFinals(who(), bodyFor(stateId, [typed(low!.id, 40, { frequencyHz: 144_070_000 })]));
    expect((await queue(sample)).map(({ status }) => status)).toEqual(['waiting', 'waiting']);
    await keepFinals(who(), bodyFor(stateId, [typed(low!.id, 40, { frequencyHz: 144_050_000 })]));
    expect((await queue(sample)).map(({ status }) => status)).toEqual(['cleared', 'waiting']);
  });

  test('more than the list of candidates shows settle all the same', async () => {
    const readings = Object.fromEntries(Array.from({ length: 20 }, (_, i) => [40 + 5 * i, 51]));
    const { sample, stateId } = await prescanned(readings);
    const items = await queue(sample);
    expect(items).toHaveLength(20);
    const finals = items.map((item) => typed(item.id, 40, { frequencyHz: item.frequencyHz! }));
    await keepFinals(who(), bodyFor(stateId, finals));
    expect(new Set((await queue(sample)).map(({ status }) => status))).toEqual(new Set(['cleared']));
  });

  test('preview says what keeping then says, and keeps nothing', async () => {
    const { sample, stateId } = await prescanned({ 144: 52, 200: 51 });
    const [low, high] = await queue(sample);
    const finals = [typed(high!.id, 61.3, { frequencyHz: 200e6 }), typed(low!.id, 47.1, { frequencyHz: 144_018_000 })];
    const body = bodyFor(stateId, finals);
    const runs = () => unitOfWork(() => Sweep.unscoped().count());
    const before = await runs();
    const preview = await previewFinals(who(), body);
    expect(await runs()).toBe(before);
    expect(preview.runs).toBe(1);
    const { runs: kept } = await keepFinals(who(), body);
    const { items } = await listCandidates(who(), kept[0]!.id, { limit: 20 });
    for (const [i, { frequencyHz }] of finals.entries()) {
      const { level, limit, marginDb, uncertaintyDb, verdict, because } = items.find(
        (one) => one.frequencyHz === frequencyHz,
      )!;
      expect(preview.finals[i]!.readings).toMatchObject([
        { detector: 'quasi-peak', level, limit, marginDb, uncertaintyDb, verdict, because, unit: 'dBuV/m' },
      ]);
    }
  });

  test('with other detectors are runs of their own, kept together', async () => {
    const { sample, stateId } = await prescanned({ 144: 52, 200: 51 });
    const [low, high] = await queue(sample);
    const both = [
      { detector: 'quasi-peak' as const, level: 47 },
      { detector: 'average' as const, level: 40 },
    ];
    const finals = [
      typed(low!.id, 0, { frequencyHz: 144e6, readings: both }),
      typed(high!.id, 47, { frequencyHz: 200e6 }),
    ];
    const kept = await keepFinals(who(), bodyFor(stateId, finals));
    expect(kept.runs.map(({ points }) => points)).toEqual([1, 1]);
    const first = await readSweep(who(), kept.runs[0]!.id);
    expect(first.traces.map(({ detector }) => detector)).toEqual(['quasi-peak', 'average']);
    expect(kept.retests.map(({ status }) => status)).toEqual(['cleared', 'cleared']);
  });

  test('leave no upload behind', async () => {
    const { sample, stateId } = await prescanned({ 144: 52 });
    const [item] = await queue(sample);
    const held = () => unitOfWork(() => Upload.count());
    const before = await held();
    await keepFinals(who(), bodyFor(stateId, [typed(item!.id, 47, { frequencyHz: 144e6 })]));
    expect(await held()).toBe(before);
  });
});

describe('refused with its place', () => {
  test('a retest of another state, a frequency or detector twice', async () => {
    const { sample, stateId } = await prescanned({ 144: 52, 200: 51 });
    const other = await prescanned({ 144: 52 });
    const [low, high] = await queue(sample);
    const [foreign] = await queue(other.sample);
    const keep = (...finals: TypedFinal[]) => issuesOf(keepFinals(who(), bodyFor(stateId, finals)));
    expect(
      await keep(typed(low!.id, 47, { frequencyHz: 144e6 }), typed(foreign!.id, 47, { frequencyHz: 145e6 })),
    ).toEqual([{ pointer: '/finals/1/retestIds/0', message: 'is not a retest of this state and port' }]);
    expect(await keep(typed(low!.id, 47, { frequencyHz: 144e6 }), typed(high!.id, 47, { frequencyHz: 144e6 }))).toEqual(
      [{ pointer: '/finals/1/frequencyHz', message: 'is that of final 1 too; keep the higher of the two' }],
    );
    const twice = typed(low!.id, 47, { frequencyHz: 144e6 });
    twice.readings.push({ detector: 'quasi-peak', level: 48 });
    expect(await keep(twice)).toEqual([{ pointer: '/finals/0/readings/1/detector', message: 'was read already' }]);
  });

  test('a path or limit set of another port, and a position that is missing', async () => {
    const { sample, stateId } = await prescanned({ 144: 52 });
    const [item] = await queue(sample);
    const finals = [typed(item!.id, 47, { frequencyHz: 144e6 })];
    expect(await issuesOf(keepFinals(who(), bodyFor(stateId, finals, { polarisation: null })))).toMatchObject([
      { pointer: '/polarisation' },
    ]);
    expect(await issuesOf(previewFinals(who(), bodyFor(stateId, finals, { pathId: 'x'.repeat(16) })))).toMatchObject([
      { pointer: '/pathId' },
    ]);
    expect(await issuesOf(keepFinals(who(), bodyFor('x'.repeat(16), finals)))).toMatchObject([{ pointer: '/stateId' }]);
    await expect(keepFinals(world.designer.actor, bodyFor(stateId, finals))).rejects.toMatchObject({
      kind: 'forbidden',
    });
    expect((await queue(sample)).map(({ status }) => status)).toEqual(['waiting']);
  });
});
