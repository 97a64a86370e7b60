import fc from 'fast-check';
import { budgetOf, type Contribution } from '@/emc/budget';
import { prescanBelowFinal, uncertaintySteps, type UncertaintyBudget } from '@/emc/budgetSteps';
import { expandedAt } from '@/emc/uncertainty';

const contribution = (valueDb: number): Contribution => {
  return { name: 'site', valueDb, distribution: { shape: 'triangular' }, sensitivity: 1, source: 'test' };
};
const budget = (startHz: number, stopHz: number, valueDb: number, more: Partial<UncertaintyBudget> = {}) => {
  const contributions = [contribution(valueDb), contribution(1)];
  return { pathId: 'PATH-1', quantity: 'dBuV/m' as const, startHz, stopHz, contributions, ...more };
};
const step = (startHz: number, stopHz: number, expandedDb: number) => ({ startHz, stopHz, expandedDb });

describe('budgets over ranges', () => {
  test('become ascending steps with the expanded uncertainty of each', () => {
    const low = budget(30e6, 300e6, 4);
    const high = budget(300e6, 1e9, 3);
    expect(uncertaintySteps([high, low])).toEqual([
      { startHz: 30e6, stopHz: 300e6, expandedDb: budgetOf(low.contributions).expandedDb },
      { startHz: 300e6, stopHz: 1e9, expandedDb: budgetOf(high.contributions).expandedDb },
    ]);
  });

  test('leave unknown what no budget covers, below, between and above', () => {
    const steps = uncertaintySteps([budget(30e6, 200e6, 4), budget(300e6, 1e9, 3)]);
    for (const hz of [29.9e6, 250e6, 1.1e9]) expect(expandedAt(steps, hz)).toBeNull();
    for (const hz of [30e6, 200e6, 300e6, 1e9]) expect(expandedAt(steps, hz)).not.toBeNull();
    expect(uncertaintySteps([])).toEqual([]);
  });

  test('are refused where they overlap, by the range both claim', () => {
    expect(() => uncertaintySteps([budget(1e6, 3e6, 1), budget(2e6, 5e6, 1)])).toThrow('2000000 to 3000000 Hz');
    expect(() => uncertaintySteps([budget(1e6, 9e6, 1), budget(2e6, 5e6, 1)])).toThrow('2000000 to 5000000 Hz');
    expect(() => uncertaintySteps([budget(1e6, 3e6, 1), budget(1e6, 3e6, 1)])).toThrow(RangeError);
  });

  test('are refused where they are of two paths or two quantities, or no range', () => {
    const first = budget(1e6, 2e6, 1);
    expect(() => uncertaintySteps([first, budget(2e6, 3e6, 1, { pathId: 'PATH-2' })])).toThrow('PATH-2');
    expect(() => uncertaintySteps([first, budget(2e6, 3e6, 1, { quantity: 'dBuV' })])).toThrow('dBuV');
    for (const [startHz, stopHz] of [
      [2, 2],
      [3, 2],
      [0, 1],
      [1, Infinity],
    ] as const) {
      expect(() => uncertaintySteps([budget(startHz, stopHz, 1)])).toThrow(RangeError);
    }
  });
});

describe('a prescan is never more certain than a final', () => {
  test('where it is at or above there is nothing to say', () => {
    expect(prescanBelowFinal([step(1, 10, 5)], [step(1, 10, 5)])).toEqual([]);
    expect(prescanBelowFinal([step(1, 10, 6)], [step(1, 10, 5)])).toEqual([]);
  });

  test('where it is below the stretch is named with both figures', () => {
    expect(prescanBelowFinal([step(1, 10, 4)], [step(3, 20, 5)])).toEqual([
      { fromHz: 3, toHz: 10, prescanDb: 4, finalDb: 5 },
    ]);
  });

  test('stretches with the same figures are one, with others two', () => {
    expect(prescanBelowFinal([step(1, 4, 4), step(4, 10, 4)], [step(1, 6, 5), step(6, 10, 7)])).toEqual([
      { fromHz: 1, toHz: 6, prescanDb: 4, finalDb: 5 },
      { fromHz: 6, toHz: 10, prescanDb: 4, finalDb: 7 },
    ]);
  });

  test('a step of the prescan alone parts them too', () => {
    expect(prescanBelowFinal([step(1, 6, 3), step(6, 10, 4)], [step(1, 10, 5)])).toEqual([
      { fromHz: 1, toHz: 6, prescanDb: 3, finalDb: 5 },
      { fromHz: 6, toHz: 10, prescanDb: 4, finalDb: 5 },
    ]);
  });

  test('an edge between two such stretches is not named once more', () => {
    expect(prescanBelowFinal([step(1, 6, 3), step(6, 10, 4)], [step(1, 6, 7), step(6, 10, 5)])).toEqual([
      { fromHz: 1, toHz: 6, prescanDb: 3, finalDb: 7 },
      { fromHz: 6, toHz: 10, prescanDb: 4, finalDb: 5 },
    ]);
  });

  test('a single frequency that only the two ends share is named too', () => {
    expect(prescanBelowFinal([step(1, 4, 4)], [step(4, 10, 5)])).toEqual([
      { fromHz: 4, toHz: 4, prescanDb: 4, finalDb: 5 },
    ]);
  });

  test('where either is unknown nothing is said', () => {
    expect(prescanBelowFinal([step(1, 4, 1)], [step(5, 9, 5)])).toEqual([]);
    expect(prescanBelowFinal([], [step(5, 9, 5)])).toEqual([]);
  });

  test('it names exactly the frequencies at which the steps say so (property)', () => {
    const steps = fc.array(
      fc
        .tuple(fc.integer({ min: 1, max: 12 }), fc.integer({ min: 1, max: 6 }), fc.integer({ min: 1, max: 3 }))
        .map(([from, width, expandedDb]) => step(from, from + width, expandedDb)),
      { maxLength: 4 },
    );
    fc.assert(
      fc.property(steps, steps, (prescan, final) => {
        const named = prescanBelowFinal(prescan, final);
        for (let hz = 0.5; hz <= 20; hz += 0.5) {
          const [low, high] = [expandedAt(prescan, hz), expandedAt(final, hz)];
          const below = low !== null && high !== null && low < high;
          // An edge may belong to a stretch beside it; within a stretch the naming is exact.
          if (below) expect(named.some(({ fromHz, toHz }) => hz >= fromHz && hz <= toHz)).toBe(true);
          else expect(named.some(({ fromHz, toHz }) => hz > fromHz && hz < toHz && hz % 1 > 0)).toBe(false);
        }
      }),
    );
  });
});
