import statistics from '@fixtures/published/statistics.json';
import fc from 'fast-check';
import { normalCdf, normalQuantile } from '@/emc/normalDistribution';

test.each(statistics.quantiles.rows)('the quantile at $p is $z (computed table, R qnorm)', ({ p, z }) => {
  expect(Math.abs(normalQuantile(p) - z)).toBeLessThanOrEqual(5e-7);
  expect(Math.abs(normalQuantile(1 - p) + z)).toBeLessThanOrEqual(5e-7);
});

test.each([
  [-10, 7.61985302416052607e-24],
  [-3, 0.00134989803163009453],
  [-2.9, 0.00186581330038403848],
  [-1, 0.158655253931457051],
  [0.3, 0.617911422188952633],
  [2, 0.977249868051820793],
  [3.5, 0.999767370920964475],
])('Φ(%d) is %d to twelve digits (computed with mpmath at 30 digits)', (x, expected) => {
  expect(Math.abs(normalCdf(x) / expected - 1)).toBeLessThan(1e-12);
});

test('the middle is exact and the ends are 0 and 1', () => {
  expect(normalCdf(0)).toBe(0.5);
  expect(Math.abs(normalQuantile(0.5))).toBe(0);
  expect(normalCdf(-Infinity)).toBe(0);
  expect(normalCdf(Infinity)).toBe(1);
});

test('the quantile undoes Φ (property)', () => {
  fc.assert(
    fc.property(fc.double({ min: 1e-12, max: 1 - 1e-9, noNaN: true }), (p) => {
      expect(Math.abs(normalCdf(normalQuantile(p)) / p - 1)).toBeLessThan(1e-12);
    }),
  );
});

test('what is no probability, and NaN, are refused by name', () => {
  for (const p of [0, 1, -0.1, 1.1, NaN]) expect(() => normalQuantile(p)).toThrow(RangeError);
  expect(() => normalQuantile(-0.1)).toThrow('-0.1');
  expect(() => normalCdf(NaN)).toThrow('NaN');
});
