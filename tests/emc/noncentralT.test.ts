import fc from 'fast-check';
import { noncentralTCdf, noncentralTQuantile } from '@/emc/noncentralT';
import { normalCdf } from '@/emc/normalDistribution';

test.each([
  [2, 4, 1.8819, 0.494437509534626432],
  [3.385, 4, 1.88189, 0.799967845182472087],
  [-1, 3, 0.5, 0.0921212098143593662],
  [-1, 3, 2, 0.003005247595398506],
  [30, 49, 25, 0.938538100203172332],
  [0.5, 2, -1, 0.920304260068485014],
  [4, 1.5, 1, 0.8585315335855841],
])('P(T ≤ %d) with %d degrees of freedom and noncentrality %d is %d (computed: integral in mpmath)', (t, nu, d, p) => {
  expect(Math.abs(noncentralTCdf(t, nu, d) - p)).toBeLessThan(1e-12);
});

test('with one degree of freedom and no noncentrality it is the Cauchy distribution (closed form)', () => {
  for (const t of [-20, -1, 0, 0.3, 5]) {
    expect(noncentralTCdf(t, 1, 0)).toBeCloseTo(0.5 + Math.atan(t) / Math.PI, 13);
  }
});

test('with two degrees of freedom and no noncentrality it is ½ + t / (2√(2 + t²)) (closed form)', () => {
  for (const t of [-7, -0.5, 0, 2, 40])
    expect(noncentralTCdf(t, 2, 0)).toBeCloseTo(0.5 + t / (2 * Math.hypot(Math.SQRT2, t)), 13);
});

const dof = fc.double({ min: 1, max: 60, noNaN: true });
const shift = fc.double({ min: -6, max: 9, noNaN: true });

test('at 0 it is Φ(−δ), whatever the degrees of freedom (property)', () => {
  fc.assert(
    fc.property(dof, shift, (nu, d) => {
      expect(noncentralTCdf(0, nu, d)).toBeCloseTo(normalCdf(-d), 13);
    }),
  );
});

test('it rises with t and falls with the noncentrality (property)', () => {
  const t = fc.double({ min: -20, max: 40, noNaN: true });
  fc.assert(
    fc.property(t, fc.double({ min: 0.1, max: 5, noNaN: true }), dof, shift, (at, more, nu, d) => {
      expect(noncentralTCdf(at + more, nu, d)).toBeGreaterThan(noncentralTCdf(at, nu, d) - 1e-12);
      expect(noncentralTCdf(at, nu, d + more)).toBeLessThan(noncentralTCdf(at, nu, d) + 1e-12);
    }),
  );
});

test('the quantile undoes it (property)', () => {
  fc.assert(
    fc.property(fc.double({ min: 0.01, max: 0.99, noNaN: true }), dof, shift, (p, nu, d) => {
      expect(noncentralTCdf(noncentralTQuantile(p, nu, d), nu, d)).toBeCloseTo(p, 11);
    }),
    { numRuns: 40 },
  );
});

test('impossible input is refused by name', () => {
  for (const nu of [0, -1, NaN, Infinity]) expect(() => noncentralTCdf(1, nu, 0)).toThrow(RangeError);
  expect(() => noncentralTCdf(1, -3, 0)).toThrow('-3');
  expect(() => noncentralTCdf(NaN, 3, 0)).toThrow(RangeError);
  expect(() => noncentralTCdf(1, 3, Infinity)).toThrow('Infinity');
  for (const p of [0, 1, NaN]) expect(() => noncentralTQuantile(p, 3, 0)).toThrow(RangeError);
});
