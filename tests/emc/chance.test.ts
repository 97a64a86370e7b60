import fc from 'fast-check';
import { atLeastByChance } from '@/emc/chance';

describe('probability that at least so many of independent things happen (Poisson-binomial, definition)', () => {
  test('equal probabilities are a binomial tail: 3 or more of 4 at one half is 5/16', () => {
    expect(atLeastByChance(3, [0.5, 0.5, 0.5, 0.5])).toBe(5 / 16);
    expect(atLeastByChance(0, [0.1])).toBe(1);
    expect(atLeastByChance(2, [0.1])).toBe(0);
    expect(atLeastByChance(1, [])).toBe(0);
  });

  test('a small tail keeps its digits: all of ten at 1e-3 is 1e-30', () => {
    expect(atLeastByChance(10, new Array<number>(10).fill(1e-3)) / 1e-30).toBeCloseTo(1, 9);
  });

  test('it is what adding up every outcome gives (property)', () => {
    fc.assert(
      fc.property(fc.array(fc.double({ min: 0, max: 1, noNaN: true }), { maxLength: 8 }), fc.nat(9), (p, least) => {
        let sum = 0;
        for (let outcome = 0; outcome < 2 ** p.length; outcome++) {
          const happened = p.map((_, i) => ((outcome >> i) & 1) === 1);
          if (happened.filter(Boolean).length < least) continue;
          sum += p.reduce((product, one, i) => product * (happened[i] ? one : 1 - one), 1);
        }
        expect(atLeastByChance(least, p)).toBeCloseTo(sum, 12);
      }),
    );
  });

  test('what is no probability and no count is refused', () => {
    expect(() => atLeastByChance(1, [1.1])).toThrow('1.1 is no probability');
    expect(() => atLeastByChance(1, [NaN])).toThrow(RangeError);
    expect(() => atLeastByChance(1.5, [])).toThrow('1.5 is no count');
  });
});
