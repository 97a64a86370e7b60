import statistics from '@fixtures/published/statistics.json';
import fc from 'fast-check';
import { eightyEighty, exactFactor, printedFactor, type SeriesLevels } from '@/emc/eightyEighty';

const { kFactors, worked } = statistics;

describe('the factor k', () => {
  test.each(kFactors.rows)('for $n samples is $kComputed (computed, R qt; non-central t)', ({ n, kComputed }) => {
    expect(Math.abs(exactFactor(n) - kComputed)).toBeLessThanOrEqual(5.01e-7);
  });

  test.each(kFactors.rows)('for $n samples is printed as $kPublished (CISPR TR 16-4-3, from memory)', (row) => {
    expect(printedFactor(row.n)).toBe(row.kPublished);
    expect(row.kPublished - exactFactor(row.n)).toBeCloseTo(-row.difference, 5);
  });

  test('falls with the number of samples and stays above Φ⁻¹(0.8)', () => {
    const factors = [2, 3, 5, 9, 20, 60, 200].map(exactFactor);
    factors.slice(1).forEach((k, i) => expect(k).toBeLessThan(factors[i]!));
    expect(factors[factors.length - 1]).toBeGreaterThan(0.8416212);
  });

  test('beyond the printed table there is none printed; of one sample and of parts there is none at all', () => {
    expect(printedFactor(2)).toBeNull();
    expect(printedFactor(13)).toBeNull();
    for (const n of [1, 0, -3, 4.5, NaN]) expect(() => exactFactor(n)).toThrow(String(n));
  });
});

describe('the statement over samples of one product (CISPR TR 16-4-3: mean + k·s at most the limit)', () => {
  test.each(worked.rows)('$case: exactly $statExact (computed, R)', (row) => {
    const series = { levels: row.values, limit: row.limit, noMoreUnitsExist: row.n < 5 };
    const statement = eightyEighty(series, 'exact');
    expect(statement.comparedAs).toBeCloseTo(row.statExact, 5);
    expect(statement.k).toBeCloseTo(row.kExact, 6);
    expect(statement.mean).toBeCloseTo(row.mean, 6);
    expect(statement.deviation).toBeCloseTo(row.sampleStdDev, 6);
    expect(statement.verdict).toBe(row.passExact ? 'under' : 'over');
    expect(statement.limit).toBe(row.limit);
  });

  test.each(worked.rows)('$case: with the printed factor $statPublished (computed, R)', (row) => {
    const series = { levels: row.values, limit: row.limit, noMoreUnitsExist: row.n < 5 };
    const statement = eightyEighty(series, 'printed');
    expect(statement.comparedAs).toBeCloseTo(row.statPublished, 5);
    expect(statement.k).toBe(row.kPublished);
    expect(statement.verdict).toBe(row.passPublished ? 'under' : 'over');
  });

  test('equal levels are compared as they are, and on the limit is under', () => {
    const same = (level: number): SeriesLevels => ({ levels: [level, level, level, level, level], limit: 40 });
    expect(eightyEighty(same(40), 'exact')).toMatchObject({ comparedAs: 40, deviation: 0, verdict: 'under' });
    expect(eightyEighty(same(40.001), 'exact').verdict).toBe('over');
  });

  test.each([
    [2, true, /Fewer than three/],
    [3, false, /Five samples are asked for/],
    [4, false, /Five samples are asked for/],
  ])('%d samples are not covered (no more exist: %s)', (n, noMoreUnitsExist, because) => {
    const levels = Array.from({ length: n }, (_, i) => 10 + i);
    const statement = eightyEighty({ levels, limit: 40, noMoreUnitsExist }, 'printed');
    expect(statement).toMatchObject({ n, verdict: 'not-covered', comparedAs: null, k: null });
    expect(statement.because).toMatch(because);
  });

  test('five samples, and three or four of which no more exist, are covered', () => {
    const levels = [30, 31, 32, 33, 34];
    expect(eightyEighty({ levels, limit: 40 }, 'printed').verdict).toBe('under');
    for (const n of [3, 4]) {
      const few = { levels: levels.slice(0, n), limit: 40, noMoreUnitsExist: true };
      expect(eightyEighty(few, 'printed').verdict).toBe('under');
    }
  });

  test('thirteen samples have no printed factor and an exact one', () => {
    const series = { levels: Array.from({ length: 13 }, (_, i) => 20 + i / 10), limit: 40 };
    const printed = eightyEighty(series, 'printed');
    expect(printed).toMatchObject({ verdict: 'not-covered', k: null, comparedAs: null });
    expect(printed.because).toMatch(/no factor for 13 samples/);
    expect(eightyEighty(series, 'exact').verdict).toBe('under');
  });

  test('the verdict says on which side the figure compared is, in words without pass or fail', () => {
    const under = eightyEighty({ levels: [30, 31, 32, 33, 34], limit: 40 }, 'exact');
    const over = eightyEighty({ levels: [36, 37, 38, 39, 40], limit: 40 }, 'exact');
    expect(under.because).toBe('Mean plus k times the standard deviation is not over the limit.');
    expect(over.because).toBe('Mean plus k times the standard deviation is over the limit.');
  });

  test('moving levels and limit together moves the figure compared and no verdict (property)', () => {
    const db = fc.integer({ min: -400, max: 400 }).map((tenths) => tenths / 8);
    fc.assert(
      fc.property(fc.array(db, { minLength: 5, maxLength: 12 }), db, db, (levels, limit, by) => {
        const before = eightyEighty({ levels, limit }, 'printed');
        const after = eightyEighty({ levels: levels.map((level) => level + by), limit: limit + by }, 'printed');
        expect(after.verdict).toBe(before.verdict);
        expect(after.comparedAs).toBeCloseTo(before.comparedAs! + by, 9);
      }),
    );
  });

  test('levels and limits that are none are refused by name', () => {
    expect(() => eightyEighty({ levels: [1, 2, 3, 4, NaN], limit: 40 }, 'exact')).toThrow('NaN');
    expect(() => eightyEighty({ levels: [1], limit: Infinity }, 'exact')).toThrow('Infinity');
  });
});
