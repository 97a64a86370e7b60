import statistics from '@fixtures/published/statistics.json';
import fc from 'fast-check';
import { momentsOf } from '@/emc/moments';

test.each(statistics.worked.rows)('$case: mean $mean, deviation $sampleStdDev (computed, R mean and sd)', (row) => {
  const { n, mean, deviation } = momentsOf(row.values);
  expect(n).toBe(row.n);
  expect(mean).toBeCloseTo(row.mean, 6);
  expect(deviation).toBeCloseTo(row.sampleStdDev, 6);
});

test('dB figures are averaged as dB, not as microvolts (CISPR TR 16-4-3)', () => {
  expect(momentsOf([20, 40]).mean).toBe(30);
});

test('equal levels have their own mean and no deviation, exactly', () => {
  expect(momentsOf([39.1, 39.1, 39.1, 39.1, 39.1])).toEqual({ n: 5, mean: 39.1, deviation: 0 });
});

test('one level has no deviation, none has no mean either', () => {
  expect(momentsOf([12.5])).toEqual({ n: 1, mean: 12.5, deviation: null });
  expect(momentsOf([])).toEqual({ n: 0, mean: null, deviation: null });
});

test('moving every level moves the mean and keeps the deviation (property)', () => {
  const db = fc.double({ min: -50, max: 90, noNaN: true });
  fc.assert(
    fc.property(fc.array(db, { minLength: 2, maxLength: 20 }), db, (levels, by) => {
      const before = momentsOf(levels);
      const after = momentsOf(levels.map((level) => level + by));
      expect(after.mean).toBeCloseTo(before.mean! + by, 9);
      expect(after.deviation).toBeCloseTo(before.deviation!, 9);
    }),
  );
});

test('a level that is none is refused by name', () => {
  for (const wrong of [NaN, Infinity]) expect(() => momentsOf([1, wrong])).toThrow(String(wrong));
});
