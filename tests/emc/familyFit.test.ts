import { commonest, fitted, rangeOf } from '@/emc/familyFit';

const line = (emission: number, hz: number, halfHz = 60e3) => ({ emission, hz, halfHz });
const members = (...harmonics: number[]) => harmonics.map((harmonic) => ({ emission: 0, harmonic, offsetHz: 0 }));

describe('fitting one fundamental to emissions', () => {
  test('the range is what the narrowest of the members allows at either end', () => {
    // 3 times 10 MHz to 20 kHz, 10 times 10 MHz to 6 kHz, read 30 kHz high.
    expect(rangeOf([line(0, 30e6), line(1, 100.03e6)], 10e6)).toEqual({ lowestHz: 9.997e6, highestHz: 10.009e6 });
    expect(rangeOf([line(0, 30e6, 9e3), line(1, 100.03e6)], 10e6)).toEqual({ lowestHz: 9.997e6, highestHz: 10.003e6 });
  });

  test('the fundamental is the least-squares one, kept within the range', () => {
    const lines = [line(0, 30e6), line(1, 100.03e6)];
    const { fundamentalHz, members: of } = fitted(lines, { lowestHz: 9.997e6, highestHz: 10.009e6 });
    expect(fundamentalHz).toBeCloseTo((3 * 30e6 + 10 * 100.03e6) / (9 + 100), 3);
    expect(of.map(({ emission, harmonic }) => [emission, harmonic])).toEqual([
      [0, 3],
      [1, 10],
    ]);
    expect(of[0]!.offsetHz).toBeCloseTo(30e6 - 3 * fundamentalHz, 3);
    expect(fitted(lines, { lowestHz: 9.999e6, highestHz: 10.001e6 }).fundamentalHz).toBe(10.001e6);
    expect(fitted(lines, { lowestHz: 10.003e6, highestHz: 10.009e6 }).fundamentalHz).toBe(10.003e6);
  });

  test('an emission further from its harmonic than half its bandwidth is no member', () => {
    const { members: of } = fitted([line(0, 30e6), line(1, 40.061e6), line(2, 50.059e6)], {
      lowestHz: 10e6,
      highestHz: 10e6,
    });
    expect(of.map(({ emission }) => emission)).toEqual([0, 2]);
  });

  test('the commonest factor is the largest that most harmonics share, of four at least', () => {
    expect(commonest(members(6, 12, 18, 24))).toBe(6);
    expect(commonest(members(6, 12, 18))).toBe(0);
    expect(commonest(members(1, 2, 3, 4, 5, 6, 7, 8, 9))).toBe(2);
    expect(commonest(members(3, 5, 7, 11, 13))).toBe(0);
    expect(commonest([])).toBe(0);
  });
});
