import { readFileSync } from 'node:fs';
import path from 'node:path';
import { closePasswordWorkers } from '@/auth/passwordWorker';
import { Forbidden, Invalid, NotFound, StaleVersion } from '@/errors';
import { SignalPathRevision } from '@/models/signalPathRevision';
import { Sweep } from '@/models/sweep';
import { unitOfWork } from '@/models/unitOfWork';
import { reviseUncertaintyBody, type PathRecord } from '@/schemas/paths';
import { historyOf, verifyChain } from '@/services/audit';
import { enterSignalPath } from '@/services/enterSignalPath';
import { readPath } from '@/services/pathRecord';
import { reviseUncertainty } from '@/services/reviseUncertainty';
import { readSweep } from '@/services/sweeps';
import { freshDatabase, type TestDatabase } from '../support/database';
import { enterWorld, type World } from '../support/world';

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

const id = () => world.choice.pathId!;
const read = (query = {}) => readPath(world.technician.actor, id(), query);
const revisionsOf = () => unitOfWork(() => SignalPathRevision.findAll({ order: [['revision', 'ASC']] }));

interface Row {
  contribution: string;
  halfWidthDb: number;
  distribution: string;
  sensitivity: number;
}
const contributionOf = ({ contribution: name, halfWidthDb: valueDb, distribution, sensitivity }: Row) => {
  const k = /^normal k=(\d)$/.exec(distribution)?.[1];
  const shape = k ? { shape: 'normal' as const, k: Number(k) } : { shape: distribution };
  return { name, valueDb, distribution: shape, sensitivity, source: 'published' };
};
const simple = (valueDb: number, startHz = 30e6, stopHz = 1e9) => {
  const distribution = { shape: 'normal', k: 2 };
  return { startHz, stopHz, contributions: [{ name: 'site', valueDb, distribution, source: 'made for tests' }] };
};
const body = (prescan: object[], final: object[], more = {}) =>
  reviseUncertaintyBody.parse({
    budget: { prescan, final },
    uncertaintySource: 'made for tests',
    reason: 'a budget at last',
    ...more,
  });
const revise = async (prescan: object[], final: object[], version?: number): Promise<PathRecord> =>
  reviseUncertainty(world.manager.actor, id(), version ?? (await read()).version, body(prescan, final));

describe('a path as it stands', () => {
  test('the correction is 14 + 2 − 30 dB where all three tables have a value, with the share of each', async () => {
    const { corrections, unit, items } = await read();
    expect(unit).toBe('dB/m');
    expect(corrections).toHaveLength(1);
    const [{ polarisation, lines, stretches, at, terms }] = corrections as [PathRecord['corrections'][number]];
    expect(polarisation).toBeNull();
    expect(lines).toEqual([
      [
        { frequencyHz: 20e6, totalDb: -14 },
        { frequencyHz: 1e9, totalDb: -14 },
      ],
    ]);
    expect(stretches).toEqual([{ fromHz: 20e6, toHz: 1e9, missing: [] }]);
    expect(terms.map(({ identifier, sign }) => sign + identifier)).toEqual(['+ANT-1', '+CBL-1', '−PRE-1']);
    expect(at.every(({ totalDb }) => Math.abs(totalDb! + 14) < 1e-9)).toBe(true);
    expect(at[0]!.shares.map(({ shareDb }) => shareDb)).toEqual([14, 2, -30]);
    expect(items.map(({ identifier, sign, due }) => [identifier, sign, due])).toEqual([
      ['ANT-1', '+', 'in-date'],
      ['CBL-1', '+', 'in-date'],
      ['PRE-1', '−', 'in-date'],
    ]);
  });

  test('one more frequency can be asked for; outside every table it has no total', async () => {
    const asked = async (atHz: number) =>
      (await read({ atHz })).corrections[0]!.at.find(({ frequencyHz }) => frequencyHz === atHz)!;
    expect((await asked(144.018e6)).totalDb).toBeCloseTo(-14, 9);
    expect(await asked(2e9)).toMatchObject({ totalDb: null, shares: [{ rows: null }, { rows: null }, { rows: null }] });
  });

  test('stated figures say that they are stated, and stand beside Ucispr (2011, from memory)', async () => {
    const { uncertainty, withoutUncertainty } = await read();
    expect(uncertainty.map(({ purpose, expandedDb, budget }) => [purpose, expandedDb, budget])).toEqual([
      ['prescan', 6, null],
      ['final', 5, null],
    ]);
    expect(uncertainty[1]!.ucispr).toMatchObject([{ ucisprDb: 6.3, excessDb: 0, fromHz: 30e6, toHz: 1e9 }]);
    expect(withoutUncertainty).toEqual([
      { purpose: 'prescan', fromHz: 20e6, toHz: 30e6 },
      { purpose: 'final', fromHz: 20e6, toHz: 30e6 },
    ]);
  });

  test('names the runs that were measured through it, and counts them by revision', async () => {
    const { runs, revisions } = await read();
    const kept = await unitOfWork(() => Sweep.count());
    expect([runs.count, runs.latest.length]).toEqual([kept, kept]);
    expect(runs.latest.at(-1)).toMatchObject({ id: world.run.id, number: world.run.number, revision: 1 });
    expect(revisions).toMatchObject([{ revision: 1, budget: false, prescanDb: 6, finalDb: 5, runs: kept }]);
  });

  test('a designer, an unknown path and an unknown revision are refused', async () => {
    await expect(readPath(world.designer.actor, id())).rejects.toThrow(Forbidden);
    await expect(readPath(world.manager.actor, '0000000000000000')).rejects.toThrow(NotFound);
    await expect(read({ revision: 9 })).rejects.toThrow(NotFound);
  });
});

describe('a revised uncertainty', () => {
  test('is refused where the prescan is below the final, with where and both figures; nothing is entered', async () => {
    const refused = revise([simple(3, 30e6, 300e6), simple(9, 300e6, 1e9)], [simple(5)]);
    await expect(refused).rejects.toMatchObject({
      issues: [
        { pointer: '/budget/prescan', message: expect.stringContaining('from 30 to 300 MHz: 3.00 dB against 5.00 dB') },
      ],
    });
    expect(await revisionsOf()).toHaveLength(1);
  });

  test('is refused where two budgets claim one range', async () => {
    const twice = [simple(6, 30e6, 300e6), simple(6, 200e6, 1e9)];
    const refused = revise(twice, twice);
    await expect(refused).rejects.toThrow(Invalid);
    await expect(refused).rejects.toMatchObject({
      issues: ['prescan', 'final'].map((purpose) => {
        return { pointer: `/budget/${purpose}`, message: 'has two budgets from 200 to 300 MHz' };
      }),
    });
  });

  test('is refused for anybody but a manager', async () => {
    const { version } = await read();
    const asked = reviseUncertainty(world.technician.actor, id(), version, body([simple(6)], [simple(5)]));
    await expect(asked).rejects.toThrow(Forbidden);
  });

  test('makes the next revision with the same items; the one before and its runs stay as they are', async () => {
    const [before] = await revisionsOf();
    const run = await readSweep(world.technician.actor, world.run.id);
    const { version } = await read();
    const entered = await revise([simple(6)], [simple(4.5, 30e6, 300e6), simple(5, 300e6, 1e9)], version);
    expect(entered).toMatchObject({ revision: 2, version: version + 1 });
    expect(entered.uncertainty.map(({ purpose, expandedDb }) => [purpose, expandedDb])).toEqual([
      ['prescan', 6],
      ['final', 4.5],
      ['final', 5],
    ]);
    expect(entered.revisions[0]).toMatchObject({
      budget: true,
      reason: 'a budget at last',
      enteredBy: { name: 'manager' },
      runs: 0,
    });
    const [first, second] = await revisionsOf();
    expect(first!.get({ plain: true })).toEqual(before!.get({ plain: true }));
    expect(second!.items).toEqual(before!.items);
    const after = await readSweep(world.technician.actor, world.run.id);
    expect([after.path!.revision, after.evaluation.uncertainty]).toEqual([1, run.evaluation.uncertainty]);
    expect(await read({ revision: 1 })).toMatchObject({
      revision: 1,
      uncertainty: [{ budget: null }, { budget: null }],
    });
  });

  test('is refused on a version that somebody else has moved on from', async () => {
    const { version } = await read();
    await expect(revise([simple(6)], [simple(5)], version - 1)).rejects.toThrow(StaleVersion);
    expect(await revisionsOf()).toHaveLength(2);
  });

  test('stands in the history with its reason, in a chain that holds', async () => {
    const [entry] = await historyOf(world.manager.actor, 'path', id());
    expect(entry!.action).toBe('uncertainty of signal path P-1 revised in revision 2');
    expect(await verifyChain('lab')).toBeNull();
  });
});

const published = JSON.parse(
  readFileSync(path.resolve(__dirname, '../../fixtures/published/uncertainty.json'), 'utf8'),
) as {
  budgets: { id: string; source?: string; basis: string; rows: Row[]; combinedDb: number; expandedK2Db: number }[];
};

const cases = published.budgets.map((one) => [one.source ?? one.id, one.basis, one] as const);
test.each(cases)('%s (%s): entered as a budget it gives its printed figures', async (_source, _basis, one) => {
  const range = { startHz: 30e6, stopHz: 1e9, contributions: one.rows.map(contributionOf) };
  const { uncertainty, revision } = await revise([range], [range]);
  const { budget, expandedDb } = uncertainty.find(({ purpose }) => purpose === 'final')!;
  // Printed to four decimals.
  expect(budget!.combinedDb).toBeCloseTo(one.combinedDb, 4);
  expect(expandedDb).toBeCloseTo(one.expandedK2Db, 4);
  expect(budget!.rows).toHaveLength(one.rows.length);
  expect(budget!.rows.reduce((sum, { shareOfVariance }) => sum + shareOfVariance!, 0)).toBeCloseTo(1, 12);
  // What a run is judged by is what the budget came to.
  const stored = (await revisionsOf()).at(-1)!;
  expect([stored.revision, stored.uncertainty.final]).toEqual([revision, [{ startHz: 30e6, stopHz: 1e9, expandedDb }]]);
});

describe('a path entered with a budget', () => {
  const entry = async () => {
    const newest = (await revisionsOf()).at(-1)!;
    return { code: 'P-1', name: 'radiated', port: 'enclosure' as const, position: 'A', items: newest.items };
  };
  const budget = (prescan: number, final: number) => body([simple(prescan)], [simple(final)]).budget;

  test('has the steps that it gives, and moves the version on', async () => {
    const { version } = await read();
    await enterSignalPath(world.manager.actor, {
      ...(await entry()),
      budget: budget(7, 6),
      uncertaintySource: 'tests',
    });
    const after = await read();
    expect(after.version).toBe(version + 1);
    expect(after.uncertainty.map(({ expandedDb }) => expandedDb)).toEqual([7, 6]);
  });

  test('is refused below the final, and without any uncertainty', async () => {
    const refused = enterSignalPath(world.manager.actor, {
      ...(await entry()),
      budget: budget(5, 6),
      uncertaintySource: 'x',
    });
    await expect(refused).rejects.toThrow(Invalid);
    const none = enterSignalPath(world.manager.actor, { ...(await entry()), uncertaintySource: 'x' });
    await expect(none).rejects.toMatchObject({ issues: [{ pointer: '/uncertainty' }] });
  });
});
