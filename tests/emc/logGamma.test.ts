import fc from 'fast-check';
import { logGamma } from '@/emc/logGamma';

test.each([
  [1e-3, 6.9071788853838536617],
  [0.5, 0.57236494292470008707],
  [1.5, -0.12078223763524522235],
  [2.5, 0.28468287047291915963],
  [10.25, 13.368023671476046295],
  [100, 359.13420536957539878],
])('ln Γ(%d) is %d (computed with mpmath at 30 digits)', (x, expected) => {
  expect(Math.abs(logGamma(x) - expected)).toBeLessThan(1e-14 * Math.max(1, Math.abs(expected)));
});

test('at whole numbers it is the logarithm of a factorial', () => {
  let factorial = 1;
  for (let n = 1; n <= 20; n++) {
    expect(logGamma(n)).toBeCloseTo(Math.log(factorial), 12);
    factorial *= n;
  }
});

test('Γ(x + 1) is x Γ(x), also where the series takes over from the recurrence (property)', () => {
  fc.assert(
    fc.property(fc.double({ min: 0.01, max: 200, noNaN: true }), (x) => {
      const expected = logGamma(x) + Math.log(x);
      expect(Math.abs(logGamma(x + 1) - expected)).toBeLessThan(1e-13 * Math.max(1, Math.abs(expected)));
    }),
  );
});

test.each([0, -1, -0.5, NaN, Infinity])('%d is refused by name', (x) => {
  expect(() => logGamma(x)).toThrow(RangeError);
  expect(() => logGamma(x)).toThrow(String(x));
});
