import uncertainties from '@fixtures/published/uncertainty.json';
import { normalQuantile } from '@/emc/normalDistribution';
import { studentTQuantile } from '@/emc/studentT';

const { rows } = uncertainties.coverageFactors;

test.each(rows)('t for $dof degrees of freedom at 95 % is $k95 (computed, R qt; JCGM 100:2008 Table G.2)', (row) => {
  expect(Math.abs(studentTQuantile(0.975, row.dof) - row.k95)).toBeLessThanOrEqual(5.001e-5);
});

test.each(rows)('t for $dof degrees of freedom at 95.45 % is $k9545 (computed; JCGM 100:2008 Table G.2)', (row) => {
  expect(Math.abs(studentTQuantile(1 - 0.0455 / 2, row.dof) - row.k9545)).toBeLessThanOrEqual(5.001e-5);
});

test('the example of the Guide reads t 2.09 at 19 degrees of freedom and 95 % (GUM G.4.1, from memory)', () => {
  const { t, effectiveDegreesOfFreedom } = uncertainties.welchSatterthwaite;
  expect(Math.abs(studentTQuantile(0.975, effectiveDegreesOfFreedom) - t)).toBeLessThanOrEqual(0.005);
});

test('where the expansion takes over it agrees with the distribution', () => {
  for (const p of [0.8, 0.95, 0.97725, 0.999]) {
    expect(Math.abs(studentTQuantile(p, 1e4) - studentTQuantile(p, 1e4 - 1e-6))).toBeLessThan(1e-9);
  }
});

test('it falls to the normal quantile as the degrees of freedom grow', () => {
  const at = [1, 2, 5, 20, 100, 1e3, 1e4, 1e6, 1e12].map((dof) => studentTQuantile(0.97, dof));
  at.slice(1).forEach((t, i) => expect(t).toBeLessThan(at[i]!));
  expect(studentTQuantile(0.97, Infinity)).toBe(normalQuantile(0.97));
});

test('no degrees of freedom, and no probability, are refused', () => {
  for (const dof of [0, -2, NaN]) expect(() => studentTQuantile(0.9, dof)).toThrow(RangeError);
  for (const p of [0, 1, NaN]) for (const dof of [3, 1e5]) expect(() => studentTQuantile(p, dof)).toThrow(RangeError);
});
