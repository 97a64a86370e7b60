import fc from 'fast-check';
import { correctionAt } from '@/emc/correction';
import { factorAt } from '@/emc/factorTable';
import { correctionLines, correctionStretches, pathCorrectionAt, roundFrequencies } from '@/emc/pathCorrection';
import type { FactorQuantity } from '@/emc/kinds';
import type { FactorTable, PathTerm } from '@/emc/types';

const term = (id: string, quantity: FactorQuantity, rows: [mhz: number, db: number][]): PathTerm => {
  const table: FactorTable = {
    id,
    name: id,
    quantity,
    frequencyHz: rows.map(([mhz]) => mhz * 1e6),
    valueDb: rows.map(([, db]) => db),
  };
  return { id, name: quantity, table, applied: true };
};
const antenna = term('ANT', 'antenna-factor', [
  [30, 12],
  [300, 22],
]);
const cable = term('CBL', 'loss', [
  [10, 1],
  [1000, 3],
]);
const gain = term('PRE', 'gain', [
  [100, 30],
  [3000, 26],
]);

describe('E = reading + AF + loss − gain', () => {
  test('a gain enters below zero, and the shares sum to the total', () => {
    const { totalDb, shares } = pathCorrectionAt([antenna, cable, gain], 100e6);
    expect(shares.map(({ shareDb }) => shareDb! > 0)).toEqual([true, true, false]);
    expect(shares[2]!.shareDb).toBe(-30);
    expect(totalDb).toBeCloseTo(factorAt(antenna.table, 100e6)!.valueDb + 2 - 30, 12);
  });

  test('where one table has no value there is no total, and the others keep their shares', () => {
    const { totalDb, shares } = pathCorrectionAt([antenna, cable, gain], 50e6);
    expect(totalDb).toBeNull();
    expect(shares.map(({ shareDb }) => shareDb === null)).toEqual([false, false, true]);
    expect(shares[2]!.factor).toBeNull();
  });
});

test('stretches name what is missing below, above and between, and reach from the first row to the last', () => {
  expect(correctionStretches([antenna, cable, gain])).toEqual([
    { fromHz: 10e6, toHz: 30e6, missing: ['ANT', 'PRE'] },
    { fromHz: 30e6, toHz: 100e6, missing: ['PRE'] },
    { fromHz: 100e6, toHz: 300e6, missing: [] },
    { fromHz: 300e6, toHz: 1000e6, missing: ['ANT'] },
    { fromHz: 1000e6, toHz: 3000e6, missing: ['ANT', 'CBL'] },
  ]);
  expect(correctionStretches([])).toEqual([]);
});

test('tables that share no frequency leave no line', () => {
  const far = term('FAR', 'loss', [
    [2000, 1],
    [3000, 2],
  ]);
  expect(correctionLines([antenna, far])).toEqual([]);
  expect(correctionLines([])).toEqual([]);
});

const anyTerm = fc
  .tuple(
    fc.constantFrom<FactorQuantity>('loss', 'gain'),
    fc.uniqueArray(fc.integer({ min: 1, max: 200 }), { minLength: 2, maxLength: 8 }),
    fc.array(fc.double({ min: -40, max: 40, noNaN: true }), { minLength: 8, maxLength: 8 }),
  )
  .map(([quantity, mhz, db]) =>
    term(
      quantity,
      quantity,
      mhz.sort((a, b) => a - b).map((f, i) => [f, db[i]!]),
    ),
  );

test('between its points the line is straight over log f, as the correction itself is', () => {
  fc.assert(
    fc.property(
      fc.array(anyTerm, { minLength: 1, maxLength: 4 }),
      fc.double({ min: 0, max: 1, noNaN: true }),
      (terms, share) => {
        const [line = []] = correctionLines(terms);
        line.slice(1).forEach((upper, i) => {
          const lower = line[i]!;
          const hz = Math.exp(Math.log(lower.frequencyHz) * (1 - share) + Math.log(upper.frequencyHz) * share);
          const inside = Math.min(Math.max(hz, lower.frequencyHz), upper.frequencyHz);
          const straight = lower.totalDb + (upper.totalDb - lower.totalDb) * share;
          expect(correctionAt(terms, inside)!).toBeCloseTo(straight, 6);
        });
      },
    ),
  );
});

describe('round frequencies', () => {
  test.each([
    [30e6, 300e6, [30, 50, 70, 100, 200, 300]],
    [150e3, 30e6, [0.15, 0.2, 0.3, 0.5, 0.7, 1, 2, 3, 5, 7, 10, 20, 30]],
    [9e3, 18e9, [0.009, 0.01, 0.03, 0.1, 0.3, 1, 3, 10, 30, 100, 300, 1000, 3000, 10000, 18000]],
  ])('from %d to %d Hz', (low, high, mhz) => {
    expect(roundFrequencies(low, high).map((hz) => hz / 1e6)).toEqual(mhz);
  });
});

describe('a path split by frequency', () => {
  const low = { ...antenna, toHz: 200e6 };
  const high = {
    ...term('ANT-2', 'antenna-factor', [
      [150, 30],
      [1000, 40],
    ]),
    fromHz: 200e6,
  };
  const split = [low, high, cable];

  test('each item gives its share where it is in the path; on the edge the side with the larger correction does', () => {
    const inPath = (hz: number) => pathCorrectionAt(split, hz).shares.map((share) => share.inPath);
    expect(inPath(100e6)).toEqual([true, false, true]);
    expect(inPath(500e6)).toEqual([false, true, true]);
    expect(inPath(200e6)).toEqual([false, true, true]);
    for (const hz of [100e6, 200e6, 500e6]) {
      const { totalDb, shares } = pathCorrectionAt(split, hz);
      expect(shares.reduce((sum, { shareDb }) => sum + (shareDb ?? 0), 0)).toBeCloseTo(totalDb!, 12);
      expect(totalDb).toBe(correctionAt(split, hz));
    }
  });

  test('is known from the first antenna to the second without a hole, in a line for each', () => {
    expect(correctionStretches(split).filter(({ missing }) => missing.length === 0)).toEqual([
      { fromHz: 30e6, toHz: 1000e6, missing: [] },
    ]);
    const ends = correctionLines(split).map((line) => [line[0]!.frequencyHz, line.at(-1)!.frequencyHz]);
    expect(ends).toEqual([
      [30e6, 200e6],
      [200e6, 1000e6],
    ]);
  });
});
