import fc from 'fast-check';
import { factorAt } from '@/emc/factorTable';
import { limitAt } from '@/emc/limitLine';
import { factorDifference, limitDifference } from '@/emc/revisionDifference';
import type { FactorTable } from '@/emc/types';
import { lineOf, publishedLine, tableOf as given } from './given';

const tableOf = (rows: [number, number][]): FactorTable => given('loss', rows);

describe('what a new revision changes', () => {
  test('a table: the largest difference is at a row of either, with its sign', () => {
    const before = tableOf([[30, 1], [300, 3], [1000, 4]]); // prettier-ignore
    const after = tableOf([[30, 1.1], [144, 3], [1000, 4]]); // prettier-ignore
    const difference = factorDifference(before, after)!;
    expect(difference.atHz).toBe(144e6);
    expect(difference.largestDb).toBeCloseTo(3 - factorAt(before, 144e6)!.valueDb, 12);
    expect(difference.stretches[0]!.map(({ hz }) => hz / 1e6)).toEqual([30, 144, 300, 1000]);
  });

  test('a table: nothing is said outside the range both cover, and nothing at all where they share none', () => {
    const difference = factorDifference(tableOf([[30, 1], [900, 1]]), tableOf([[100, 2], [1000, 50]])); // prettier-ignore
    expect(difference!.stretches[0]!.map(({ hz }) => hz / 1e6)).toEqual([100, 900]);
    expect(factorDifference(tableOf([[1, 1], [2, 1]]), tableOf([[3, 1], [4, 1]]))).toBeNull(); // prettier-ignore
  });

  test('a table: no frequency anywhere differs by more than what is named (property)', () => {
    const rows = fc
      .uniqueArray(fc.integer({ min: 30, max: 1000 }), { minLength: 2, maxLength: 12 })
      .chain((mhz) =>
        fc
          .array(fc.double({ min: -40, max: 40, noNaN: true }), { minLength: mhz.length, maxLength: mhz.length })
          .map((db) => tableOf(mhz.sort((a, b) => a - b).map((f, i) => [f, db[i]!]))),
      );
    fc.assert(
      fc.property(rows, rows, fc.double({ min: 30e6, max: 1e9, noNaN: true }), (before, after, hz) => {
        const difference = factorDifference(before, after);
        const [was, is] = [factorAt(before, hz), factorAt(after, hz)];
        if (!was || !is) return;
        expect(Math.abs(is.valueDb - was.valueDb)).toBeLessThanOrEqual(Math.abs(difference!.largestDb) + 1e-9);
      }),
    );
  });

  test('a line against itself differs nowhere (CISPR 32:2015 Table A.10, class B mains, quasi-peak)', () => {
    const line = publishedLine('cispr32-b-ce-qp');
    expect(limitDifference(line, line)!.largestDb).toBe(0);
  });

  test('a line whose band edge moved differs by its step between the two edges', () => {
    const before = lineOf([[30, 230, 40, 40], [230, 1000, 47, 47]]); // prettier-ignore
    const after = lineOf([[30, 300, 40, 40], [300, 1000, 47, 47]]); // prettier-ignore
    const difference = limitDifference(before, after)!;
    expect(difference.largestDb).toBe(-7);
    expect(difference.atHz).toBe(230e6);
    expect(limitAt(after, 250e6)! - limitAt(before, 250e6)!).toBe(-7);
  });

  test('lines that share no range have no difference; a hole parts the stretches', () => {
    expect(limitDifference(lineOf([[1, 2, 40, 40]]), lineOf([[3, 4, 40, 40]]))).toBeNull(); // prettier-ignore
    const holed = lineOf([[30, 88, 40, 40], [108, 230, 41, 41]]); // prettier-ignore
    expect(limitDifference(holed, lineOf([[30, 230, 40, 40]]))!.stretches).toHaveLength(2); // prettier-ignore
  });
});
