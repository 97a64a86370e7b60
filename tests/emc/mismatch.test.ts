import uncertainties from '@fixtures/published/uncertainty.json';
import fc from 'fast-check';
import { budgetOf } from '@/emc/budget';
import { mismatchBounds, mismatchContribution, reflectionFromVswr, returnLossDb } from '@/emc/mismatch';

const { mismatch, budgets } = uncertainties;
const powerPercent = (db: number) => (10 ** (db / 10) - 1) * 100;

test.each(mismatch.publishedRows)(
  'VSWR $vswrSource against $vswrLoad is $powerPercent % of power (power sensor manual, verified)',
  (row) => {
    const { plusDb } = mismatchBounds(reflectionFromVswr(row.vswrSource), reflectionFromVswr(row.vswrLoad));
    expect(Math.abs(powerPercent(plusDb) - row.powerPercent)).toBeLessThanOrEqual(0.005);
  },
);

test.each(mismatch.publishedRows)(
  'VSWR $vswrSource and $vswrLoad reflect $reflectionSource and $reflectionLoad (power sensor manual, verified)',
  (row) => {
    expect(Math.abs(reflectionFromVswr(row.vswrSource) - row.reflectionSource)).toBeLessThanOrEqual(5e-3);
    expect(Math.abs(reflectionFromVswr(row.vswrLoad) - row.reflectionLoad)).toBeLessThanOrEqual(5e-4);
  },
);

test.each(mismatch.computedRows.rows)(
  '$reflectionSource against $reflectionLoad is +$plusDb and $minusDb dB, u $standardUncertaintyDb (LAB34 3.4.3, computed)',
  (row) => {
    const bounds = mismatchBounds(row.reflectionSource, row.reflectionLoad);
    expect(Math.abs(bounds.plusDb - row.plusDb)).toBeLessThanOrEqual(5.5e-6);
    expect(Math.abs(bounds.minusDb - row.minusDb)).toBeLessThanOrEqual(5.5e-6);
    // Reflections are printed to six digits, which moves the percentage by up to 6e-5 and the dB by 6e-6.
    expect(Math.abs(powerPercent(bounds.plusDb) - row.powerPlusPercent)).toBeLessThanOrEqual(1e-4);
    const { rows } = budgetOf([mismatchContribution('mismatch', bounds, 'test')]);
    expect(Math.abs(rows[0]!.standardDb - row.standardUncertaintyDb)).toBeLessThanOrEqual(1e-5);
  },
);

test.each(mismatch.vswrRows.rows)(
  'VSWR $vswr is |Γ| $reflection and $returnLossDb dB of return loss (computed)',
  (row) => {
    expect(reflectionFromVswr(row.vswr)).toBeCloseTo(row.reflection, 6);
    expect(returnLossDb(reflectionFromVswr(row.vswr))).toBeCloseTo(row.returnLossDb, 4);
  },
);

test('two ports of VSWR 2 are the +0.9 and −1.0 dB of the radiated budget (CISPR 16-4-2:2003 Table A.3, from memory)', () => {
  const rows = budgets.find(({ id }) => id === 'rad-30-300-3m')!.rows;
  const printed = rows.map(({ contribution }) => /^mismatch.*\(\+(.*)\/(-.*)\)$/.exec(contribution)).find(Boolean)!;
  const { plusDb, minusDb } = mismatchBounds(reflectionFromVswr(2), reflectionFromVswr(2));
  expect(plusDb).toBeCloseTo(Number(printed[1]), 1);
  expect(minusDb).toBeCloseTo(Number(printed[2]), 1);
});

describe('through what lies between (CISPR 16-4-2 Annex A, from memory)', () => {
  test('a matched attenuator counts twice: 10 dB makes the product ten times smaller', () => {
    const s21 = 10 ** (-10 / 20);
    const through = mismatchBounds(0.5, 0.4, { s11: 0, s21, s22: 0 });
    expect(through.plusDb).toBeCloseTo(20 * Math.log10(1 + 0.02), 12);
    expect(through.minusDb).toBeCloseTo(20 * Math.log10(1 - 0.02), 12);
  });

  test('each of the four terms is there: 0.5·0.1 + 0.4·0.2 + 0.5·0.4·0.1·0.2 + 0.5·0.4·0.7²', () => {
    const { plusDb, minusDb } = mismatchBounds(0.5, 0.4, { s11: 0.1, s21: 0.7, s22: 0.2 });
    expect(plusDb).toBeCloseTo(20 * Math.log10(1.232), 12);
    expect(minusDb).toBeCloseTo(20 * Math.log10(0.768), 12);
  });
});

test('the lower bound is the further one, and the two ends may change places (property)', () => {
  const reflection = fc.double({ min: 0.001, max: 0.9, noNaN: true });
  fc.assert(
    fc.property(reflection, reflection, (source, load) => {
      const { plusDb, minusDb } = mismatchBounds(source, load);
      expect(plusDb).toBeGreaterThan(0);
      expect(-minusDb).toBeGreaterThan(plusDb);
      expect(mismatchBounds(load, source)).toEqual({ plusDb, minusDb });
      expect(mismatchContribution('mismatch', { plusDb, minusDb }, 'test').valueDb).toBe(-minusDb);
    }),
  );
});

test('a perfect match moves nothing and returns nothing', () => {
  expect(mismatchBounds(0, 0.5)).toEqual({ plusDb: 0, minusDb: 0 });
  expect(returnLossDb(reflectionFromVswr(1))).toBeNull();
});

test('reflections of 1 and more, below zero, an active two-port and a VSWR below 1 are refused by name', () => {
  for (const wrong of [1, 1.2, -0.1, NaN]) {
    expect(() => mismatchBounds(wrong, 0.1)).toThrow(String(wrong));
    expect(() => mismatchBounds(0.1, wrong)).toThrow(RangeError);
  }
  for (const s of ['s11', 's21', 's22'] as const) {
    for (const wrong of [1.1, -0.1]) {
      expect(() => mismatchBounds(0.1, 0.1, { s11: 0, s21: 1, s22: 0, [s]: wrong })).toThrow(String(wrong));
    }
  }
  expect(() => mismatchBounds(0.5, 0.5, { s11: 1, s21: 0, s22: 1 })).toThrow('no lower bound');
  expect(() => mismatchBounds(0.5, 0, { s11: 1, s21: 0, s22: 1 })).not.toThrow();
  for (const wrong of [0.9, NaN, Infinity]) expect(() => reflectionFromVswr(wrong)).toThrow(String(wrong));
  for (const wrong of [-0.1, 1.1, NaN]) expect(() => returnLossDb(wrong)).toThrow(RangeError);
});
