import fc from 'fast-check';
import { incompleteBeta } from '@/emc/incompleteBeta';

test.each([
  [0.2, 0.5, 2, 0.62609903369994113],
  [0.9, 3, 4.5, 0.999523326171200369],
  [0.5, 30, 30, 0.5],
  [0.999, 2, 0.5, 0.952581646485775131],
])('I at %d for a %d and b %d is %d (computed with mpmath at 30 digits)', (x, a, b, expected) => {
  expect(Math.abs(incompleteBeta(x, a, b) - expected)).toBeLessThan(1e-14);
});

const unit = fc.double({ min: 0.001, max: 0.999, noNaN: true });
const shape = fc.double({ min: 0.1, max: 60, noNaN: true });

test('I_x(a, 1) is x to the a, and I_x(1, b) is 1 − (1 − x) to the b (property)', () => {
  fc.assert(
    fc.property(unit, shape, (x, a) => {
      expect(incompleteBeta(x, a, 1)).toBeCloseTo(x ** a, 12);
      expect(incompleteBeta(x, 1, a)).toBeCloseTo(1 - (1 - x) ** a, 12);
    }),
  );
});

test('I_x(a, b) and I_1−x(b, a) add up to 1, and it rises with x (property)', () => {
  fc.assert(
    fc.property(unit, unit, shape, shape, (x, y, a, b) => {
      expect(incompleteBeta(x, a, b) + incompleteBeta(1 - x, b, a)).toBeCloseTo(1, 12);
      const [low, high] = [Math.min(x, y), Math.max(x, y)];
      expect(incompleteBeta(high, a, b) - incompleteBeta(low, a, b)).toBeGreaterThan(-1e-13);
    }),
  );
});

test('the ends are exact and everything outside is refused by name', () => {
  expect(incompleteBeta(0, 2, 3)).toBe(0);
  expect(incompleteBeta(1, 2, 3)).toBe(1);
  for (const x of [-0.1, 1.1, NaN]) expect(() => incompleteBeta(x, 1, 1)).toThrow(String(x));
  for (const a of [0, -1, NaN]) {
    expect(() => incompleteBeta(0.5, a, 1)).toThrow(RangeError);
    expect(() => incompleteBeta(0.5, 1, a)).toThrow(RangeError);
  }
});
