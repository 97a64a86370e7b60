import fc from 'fast-check';
import conversions from '@fixtures/published/conversions.json';
import { addFactor, checkFactorTable, factorAt, prepareFactorTable } from '@/emc/factorTable';
import type { FactorTable } from '@/emc/types';
import { tableOf } from './given';

const published = conversions.antennaFactorInterpolation;
const table = tableOf(
  'antenna-factor',
  published.table.map((row) => [row.freqMHz, row.antennaFactorDbPerM]),
);

/** Value of many points at once, null where the table has none. */
function batch(of: FactorTable, frequencyHz: number[], sign: 1 | -1 = 1): (number | null)[] {
  const hz = Float64Array.from(frequencyHz);
  const level = new Float64Array(hz.length);
  const state = new Uint8Array(hz.length);
  addFactor(prepareFactorTable(of), sign, hz, hz.map(Math.log), level, state, 7);
  return frequencyHz.map((_, i) => (state[i] === 7 ? null : level[i]!));
}

describe('factor tables, linear in dB over log f (common practice with calibration tables)', () => {
  test.each(published.rows)('antenna factor at $freqMHz MHz (constructed table, two libraries)', (row) => {
    expect(factorAt(table, row.freqMHz * 1e6)?.valueDb).toBeCloseTo(row.logFreqDbPerM, 4);
  });

  test.each(published.rows.filter((row) => Math.abs(row.differenceDb) > 0.1))(
    'at $freqMHz MHz it is not the figure linear in f (constructed table)',
    (row) => {
      const value = factorAt(table, row.freqMHz * 1e6)!.valueDb;
      expect(value - row.linearFreqDbPerM).toBeCloseTo(row.differenceDb, 3);
    },
  );

  test('20 MHz and 1200 MHz are outside the table and not extrapolated (constructed table)', () => {
    expect(factorAt(table, 20e6)).toBeNull();
    expect(factorAt(table, 1200e6)).toBeNull();
    expect(factorAt(table, 29_999_999)).toBeNull();
    expect(factorAt(table, NaN)).toBeNull();
    expect(batch(table, [20e6, 30e6, 1200e6, 1000e6, NaN])).toEqual([null, 18.2, null, 27.6, null]);
  });

  test('between rows both rows are named; on a row that row alone, and its value exactly', () => {
    expect(factorAt(table, 70e6)).toMatchObject({ lowerHz: 50e6, lowerDb: 12, upperHz: 100e6, upperDb: 10.5 });
    for (const row of published.table) {
      const hz = row.freqMHz * 1e6;
      const db = row.antennaFactorDbPerM;
      expect(factorAt(table, hz)).toEqual({ valueDb: db, lowerHz: hz, lowerDb: db, upperHz: hz, upperDb: db });
    }
  });

  test('a table of one row holds at that frequency and nowhere else', () => {
    const one = tableOf('loss', [[10, 0.4]]);
    expect(factorAt(one, 10e6)?.valueDb).toBe(0.4);
    expect(factorAt(one, 10.1e6)).toBeNull();
    expect(batch(one, [9e6, 10e6, 11e6])).toEqual([null, 0.4, null]);
  });

  test('many points at once give the same bits as one at a time, in whatever order they come (property)', () => {
    const anyTable = fc
      .uniqueArray(fc.integer({ min: 1, max: 400 }), { minLength: 1, maxLength: 40 })
      .chain((megahertz) =>
        fc.tuple(
          fc.constant(megahertz.sort((a, b) => a - b)),
          fc.array(fc.double({ min: -40, max: 40, noNaN: true }), { minLength: 40 }),
        ),
      )
      .map(([megahertz, db]) =>
        tableOf(
          'loss',
          megahertz.map((hz, i) => [hz, db[i]!]),
        ),
      );
    const points = fc.array(
      fc.oneof(fc.integer({ min: 0, max: 401 }), fc.double({ min: 0.5, max: 401, noNaN: true })),
      {
        maxLength: 60,
      },
    );
    fc.assert(
      fc.property(anyTable, points, (of, megahertz) => {
        const hz = megahertz.map((one) => one * 1e6);
        const alone = hz.map((one) => factorAt(of, one)?.valueDb ?? null);
        expect(batch(of, hz)).toEqual(alone.map((db) => (db === null ? null : 0 + db)));
        expect(batch(of, hz, -1)).toEqual(alone.map((db) => (db === null ? null : 0 - db)));
      }),
      { numRuns: 300 },
    );
  });

  test('a value lies between those of its two rows (property)', () => {
    fc.assert(
      fc.property(fc.double({ min: 30, max: 1000, noNaN: true }), (megahertz) => {
        const at = factorAt(table, megahertz * 1e6)!;
        expect(at.valueDb).toBeGreaterThanOrEqual(Math.min(at.lowerDb, at.upperDb) - 1e-9);
        expect(at.valueDb).toBeLessThanOrEqual(Math.max(at.lowerDb, at.upperDb) + 1e-9);
      }),
    );
  });

  test.each<[string, FactorTable, RegExp]>([
    ['is empty', tableOf('loss', []), /no rows/],
    [
      'falls',
      tableOf('loss', [
        [30, 1],
        [20, 2],
      ]),
      /row 2: 20000000 Hz does not rise above 30000000 Hz/,
    ],
    [
      'repeats a frequency',
      tableOf('loss', [
        [30, 1],
        [30, 2],
      ]),
      /row 2/,
    ],
    [
      'starts at 0 Hz',
      tableOf('loss', [
        [0, 1],
        [30, 2],
      ]),
      /row 1: 0 Hz is no frequency/,
    ],
    ['holds a value that is no figure', tableOf('loss', [[30, NaN]]), /row 1/],
    ['has more frequencies than values', { ...tableOf('loss', [[30, 1]]), valueDb: [] }, /1 frequencies and 0 values/],
  ])('a table that %s is refused, naming the row', (_, bad, message) => {
    expect(() => checkFactorTable(bad)).toThrow(message);
    expect(() => factorAt(bad, 30e6)).toThrow(RangeError);
  });
});
