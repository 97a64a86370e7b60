import statistics from '@fixtures/published/statistics.json';
import { generalMargin, generalMarginDb, SIGMA_MAX_DB } from '@/emc/generalMargin';

const { rows } = statistics.generalMargin;

test.each(rows)('for $n samples the margin is $marginComputedDb dB, $kE times 6 dB (computed, R qnorm)', (row) => {
  expect(generalMarginDb(row.n, 'exact')).toBeCloseTo(row.marginComputedDb, 4);
  expect(generalMarginDb(row.n, 'exact')! / SIGMA_MAX_DB).toBeCloseTo(row.kE, 6);
});

test.each(rows)(
  'for $n samples the margin is printed as $marginPublishedDb dB (CISPR TR 16-4-3 A1, from memory)',
  (row) => {
    expect(generalMarginDb(row.n, 'printed')).toBe(row.marginPublishedDb);
  },
);

test('for two and for seven samples there is none', () => {
  for (const n of [2, 7, 8])
    for (const kind of ['exact', 'printed'] as const) expect(generalMarginDb(n, kind)).toBeNull();
});

describe('the highest level plus the margin against the limit', () => {
  test.each([
    [38.5, 'under', 40],
    [38.6, 'over', 40.1],
  ])('five samples of which the highest is %d are %s, compared as %d', (highest, verdict, comparedAs) => {
    const statement = generalMargin({ levels: [30, highest, 33, 31, 36], limit: 40 }, 'printed');
    expect(statement).toMatchObject({ verdict, marginDb: 1.5, n: 5 });
    expect(statement.comparedAs).toBeCloseTo(comparedAs, 10);
    expect(statement.because).toMatch(/^The highest level plus the general margin is (not )?over the limit\.$/);
  });

  test('too few and too many samples are not covered and say why', () => {
    const of = (n: number, noMoreUnitsExist = false) =>
      generalMargin({ levels: Array.from({ length: n }, () => 20), limit: 40, noMoreUnitsExist }, 'exact');
    expect(of(2, true)).toMatchObject({ verdict: 'not-covered', marginDb: null, comparedAs: null });
    expect(of(4)).toMatchObject({ verdict: 'not-covered', marginDb: null });
    expect(of(4, true).verdict).toBe('under');
    expect(of(7)).toMatchObject({ verdict: 'not-covered', marginDb: null });
    expect(of(7).because).toMatch(/three to six/);
  });
});
