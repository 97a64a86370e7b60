import statistics from '@fixtures/published/statistics.json';
import fc from 'fast-check';
import { binomialCdf, byCount, confidenceOf, unitsFor } from '@/emc/binomialRule';

const { rows, strict80 } = statistics.binomial;

test.each(rows)('$allowedFails of $n units over gives confidence $confidence (computed, R pbinom)', (row) => {
  expect(binomialCdf(row.allowedFails, row.n, 0.2)).toBeCloseTo(row.probAcceptIf20PercentBad, 6);
  expect(confidenceOf(row.allowedFails, row.n)).toBeCloseTo(row.confidence, 6);
  expect(confidenceOf(row.allowedFails, row.n) >= 0.8).toBe(row.reaches80Percent);
});

test.each(rows)('the printed pair for $allowedFails over is $n units (CISPR TR 16-4-3, from memory)', (row) => {
  expect(unitsFor(row.allowedFails, 'printed')).toBe(row.n);
});

test.each(strict80.rows)('a strict 80 % with $allowedFails over takes $n units (computed, R pbinom)', (row) => {
  expect(unitsFor(row.allowedFails, 'strict')).toBe(row.n);
  expect(1 - confidenceOf(row.allowedFails, row.n)).toBeCloseTo(row.probAccept, 6);
  expect(confidenceOf(row.allowedFails, row.n - 1)).toBeLessThan(0.8);
});

test('the distribution function is the sum of its terms (definition, property)', () => {
  const choose = (n: number, k: number): number => (k === 0 ? 1 : (choose(n - 1, k - 1) * n) / k);
  const counts = fc.tuple(fc.integer({ min: 0, max: 12 }), fc.integer({ min: 1, max: 12 }));
  fc.assert(
    fc.property(counts, fc.double({ min: 0.01, max: 0.99, noNaN: true }), ([c, n], p) => {
      let sum = 0;
      for (let k = 0; k <= Math.min(c, n); k++) sum += choose(n, k) * p ** k * (1 - p) ** (n - k);
      expect(binomialCdf(c, n, p)).toBeCloseTo(sum, 11);
    }),
  );
});

const levels = (n: number, over: number) => Array.from({ length: n }, (_, i) => (i < over ? 40.1 : 40));

describe('the statement by counting', () => {
  test.each([
    [7, 0, 'not-covered', null],
    [8, 0, 'under', 0],
    [8, 1, 'over', 0],
    [13, 1, 'over', 0],
    [14, 1, 'under', 1],
    [20, 2, 'over', 1],
    [21, 2, 'under', 2],
    [33, 4, 'under', 4],
  ] as const)('strictly, %d units with %d over are %s', (n, over, verdict, allowedOver) => {
    expect(byCount(levels(n, over), 40, 'strict')).toMatchObject({ n, over, verdict, allowedOver, limit: 40 });
  });

  test.each([
    [6, 0, 'not-covered', null],
    [7, 0, 'under', 0],
    [19, 2, 'over', 1],
    [20, 2, 'under', 2],
    [32, 4, 'under', 4],
    [80, 5, 'over', 4],
  ] as const)('by the printed pairs, %d units with %d over are %s', (n, over, verdict, allowedOver) => {
    expect(byCount(levels(n, over), 40, 'printed')).toMatchObject({ n, over, verdict, allowedOver });
  });

  test('a level on the limit is not over, also for what binary leaves of decimals', () => {
    expect(
      byCount(
        Array.from({ length: 8 }, () => 0.1 + 37.2),
        37.3,
        'strict',
      ),
    ).toMatchObject({ over: 0 });
    expect(
      byCount(
        Array.from({ length: 8 }, () => 37.3 + 1e-4),
        37.3,
        'strict',
      ),
    ).toMatchObject({ over: 8 });
  });

  test('says what it counted, or how many units it takes, and how confident that makes', () => {
    expect(byCount(levels(14, 1), 40, 'strict').because).toBe('Of 14 units 1 may be over the limit, and 1 are.');
    expect(byCount(levels(3, 0), 40, 'strict').because).toBe('With none over it takes 8 units.');
    expect(byCount(levels(3, 0), 40, 'printed').because).toBe('With none over it takes 7 units.');
    expect(byCount(levels(14, 1), 40, 'strict').confidence).toBeCloseTo(0.802088, 6);
    expect(byCount([], 40, 'strict')).toMatchObject({ verdict: 'not-covered', confidence: 0, over: 0 });
  });

  test('a strict under always has 80 % confidence, and one more unit over never makes it milder (property)', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 60 }), fc.integer({ min: 0, max: 12 }), (n, over) => {
        const bad = Math.min(n, over);
        const { verdict, confidence } = byCount(levels(n, bad), 40, 'strict');
        expect(verdict === 'under').toBe(confidence >= 0.8);
        if (verdict === 'over' && bad < n) expect(byCount(levels(n, bad + 1), 40, 'strict').verdict).toBe('over');
      }),
      { numRuns: 60 },
    );
  });

  test('counts and levels that are none are refused by name', () => {
    for (const [c, n] of [
      [-1, 3],
      [1, -3],
      [0.5, 3],
      [1, 2.5],
      [NaN, 3],
    ] as const) {
      expect(() => binomialCdf(c, n, 0.2)).toThrow(`${c} of ${n}`);
    }
    for (const over of [-1, 0.5, NaN]) expect(() => unitsFor(over, 'strict')).toThrow(String(over));
    expect(() => byCount([1, NaN], 40, 'strict')).toThrow('NaN');
    expect(() => byCount([1], Infinity, 'strict')).toThrow('Infinity');
    expect(unitsFor(5, 'printed')).toBeNull();
  });
});
