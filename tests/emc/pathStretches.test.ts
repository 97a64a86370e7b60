import fc from 'fast-check';
import { correctionAt, levelUnitOf } from '@/emc/correction';
import { evaluate } from '@/emc/evaluate';
import { stretchesOf } from '@/emc/pathStretches';
import { hangTrace, judgeSegment } from '@/emc/segment';
import type { PathTerm } from '@/emc/types';
import { workingAt } from '@/emc/working';
import type { FactorQuantity } from '@/emc/kinds';
import { inputOf, lineOf, runThrough, tableOf, termOf, traceOf } from './given';

type Rows = [megahertz: number, db: number][];
const term = (
  name: string,
  quantity: FactorQuantity,
  rows: Rows,
  [fromMhz, toMhz]: [number | null, number | null] = [null, null],
): PathTerm =>
  termOf(tableOf(quantity, rows, name), {
    fromHz: fromMhz === null ? null : fromMhz * 1e6,
    toHz: toMhz === null ? null : toMhz * 1e6,
  });

const low = term('ANT-L', 'antenna-factor', [[20, 10], [400, 20]], [null, 300]); // prettier-ignore
const high = term('ANT-H', 'antenna-factor', [[200, 12], [2000, 30]], [300, 1000]); // prettier-ignore
const cable = term('CBL', 'loss', [[9e-3, 0.5], [6000, 0.5]]); // prettier-ignore
const split = [low, high, cable];

function levelsOf(terms: PathTerm[], megahertz: number[], readingDbuv = 40): (number | null)[] {
  const trace = traceOf(megahertz.map(() => readingDbuv), { frequencyHz: megahertz.map((mhz) => mhz * 1e6) }); // prettier-ignore
  const judged = judgeSegment(hangTrace(trace, terms, []), trace.frequencyHz, trace.reading);
  return megahertz.map((_, i) => (judged.state[i] === 0 ? judged.level[i]! : null));
}

describe('a path split by frequency', () => {
  test('one antenna serves to 300 MHz and another above; each has its own table', () => {
    expect(levelUnitOf('dBuV', split)).toBe('dBuV/m');
    expect(correctionAt(split, 100e6)).toBe(correctionAt([{ ...low, toHz: null }, cable], 100e6));
    expect(correctionAt(split, 500e6)).toBe(correctionAt([{ ...high, fromHz: null, toHz: null }, cable], 500e6));
  });

  test('both antennas at the same frequency are refused, as two factors without ranges are', () => {
    expect(() => levelUnitOf('dBuV', [low, { ...high, fromHz: 250e6 }])).toThrow(/Two antenna factors/);
    expect(() => levelUnitOf('dBuV', [low, { ...high, fromHz: null, toHz: null }])).toThrow(/Two antenna factors/);
  });

  test('on the edge the larger correction governs, whichever antenna has it and in whatever order they stand', () => {
    const lowAlone = correctionAt([{ ...low, toHz: null }, cable], 300e6)!;
    const highAlone = correctionAt([{ ...high, fromHz: null, toHz: null }, cable], 300e6)!;
    expect(lowAlone).toBeGreaterThan(highAlone);
    expect(correctionAt(split, 300e6)).toBe(lowAlone);
    expect(correctionAt([high, cable, low], 300e6)).toBe(correctionAt([cable, { ...low, toHz: null }], 300e6));
    const raised = { ...high, table: { ...high.table, valueDb: high.table.valueDb.map((db) => db + 20) } };
    expect(correctionAt([low, raised, cable], 300e6)).toBe(
      correctionAt([{ ...raised, fromHz: null, toHz: null }, cable], 300e6),
    );
    // Beside the edge nothing of the other antenna is left.
    expect(correctionAt([low, raised, cable], 300e6 - 1)).toBeLessThan(lowAlone + 1e-6);
    expect(levelsOf([low, raised, cable], [300])[0]).toBe(40 + correctionAt([low, raised, cable], 300e6)!);
  });

  test('beyond its range a table counts for nothing, although it has rows there; there is no factor', () => {
    expect(correctionAt(split, 1000e6)).not.toBeNull();
    expect(correctionAt(split, 1000e6 + 1)).toBeNull();
    expect(levelsOf(split, [999, 1000, 1001, 1500])).toEqual([expect.any(Number), expect.any(Number), null, null]);
  });

  test('between two ranges there is no factor, and both ends belong to their antenna', () => {
    const holed = [low, { ...high, fromHz: 400e6 }, cable];
    expect(levelsOf(holed, [300, 300.001, 350, 399.999, 400]).map((level) => level !== null)).toEqual([
      true,
      false,
      false,
      false,
      true,
    ]);
  });

  test('a range that reaches beyond its table gives no factor there; on an edge one unknown side leaves none', () => {
    const short = term('ANT-H', 'antenna-factor', [[310, 12], [1000, 30]], [300, 1000]); // prettier-ignore
    expect(levelsOf([low, short, cable], [299, 300, 305, 310]).map((level) => level !== null)).toEqual([
      true,
      false,
      false,
      true,
    ]);
  });

  test('losses with ranges stand in for each other too; a gain outside its range is not in the path', () => {
    const lead = term('CBL-L', 'loss', [[20, 2], [2000, 2]], [null, 300]); // prettier-ignore
    expect(correctionAt([low, high, lead], 100e6)).not.toBeNull();
    expect(correctionAt([low, high, lead], 500e6)).toBeNull();
    const gain = term('PRE', 'gain', [[20, 30], [2000, 30]], [300, null]); // prettier-ignore
    expect(correctionAt([...split, gain], 100e6)).toBe(correctionAt(split, 100e6));
    expect(correctionAt([...split, gain], 500e6)).toBeCloseTo(correctionAt(split, 500e6)! - 30, 12);
    // With the gain the correction is smaller, so on the edge the path without it governs.
    expect(correctionAt([...split, gain], 300e6)).toBe(correctionAt(split, 300e6));
  });

  test('parts that end in different units are not one path', () => {
    const loop = term('LOOP', 'magnetic-antenna-factor', [[0.009, 18], [30, -16]], [null, 30]); // prettier-ignore
    expect(() => levelUnitOf('dBuV', [loop, { ...high, fromHz: 30e6 }])).toThrow(/a path of its own/);
  });

  test('a range that is none is refused', () => {
    expect(() => stretchesOf([{ ...low, fromHz: 300e6, toHz: 300e6 }])).toThrow(RangeError);
    expect(() => stretchesOf([{ ...low, fromHz: -1 }])).toThrow(RangeError);
    expect(() => stretchesOf([{ ...low, toHz: Infinity }])).toThrow(RangeError);
  });

  test('a reading that holds its corrections already asks for no range', () => {
    const held = split.map((one) => ({ ...one, applied: false }));
    expect(correctionAt(held, 5e9)).toBe(0);
    expect(levelUnitOf('dBuV/m', held)).toBe('dBuV/m');
  });
});

test('many points in any order get the correction of each by itself (property)', () => {
  const megahertz = fc.oneof(fc.constantFrom(20, 300, 400, 1000, 1001), fc.double({ min: 10, max: 1200, noNaN: true }));
  const gain = term('PRE', 'gain', [[9e-3, 25], [6000, 31]], [100, 700]); // prettier-ignore
  fc.assert(
    fc.property(fc.array(megahertz, { minLength: 1, maxLength: 60 }), (points) => {
      for (const terms of [split, [...split, gain], [gain, high, low]]) {
        levelsOf(terms, points, 0).forEach((level, i) => {
          const alone = correctionAt(terms, points[i]! * 1e6);
          if (alone === null) expect(level).toBeNull();
          else expect(level).toBeCloseTo(alone, 9);
        });
      }
    }),
  );
});

describe('a run through a split path', () => {
  const line = lineOf([[30, 1200, 60, 60]], { unit: 'dBuV/m', bandwidthHz: 120_000 });
  const axis = Array.from({ length: 19_501 }, (_, i) => 30e6 + i * 60_000);
  const trace = traceOf(axis.map(() => 20), { frequencyHz: axis, rbwHz: 120_000 }); // prettier-ignore
  const input = inputOf({ traces: [trace], terms: split, lines: [line], port: 'enclosure' });

  test('what no range reaches is a gap without factor; the rest is judged', () => {
    const { gaps, pairs } = runThrough(evaluate(input));
    expect(gaps).toHaveLength(1);
    expect(gaps[0]).toMatchObject({ because: 'no-factor', toHz: 1200e6 });
    expect(Math.abs(gaps[0]!.fromHz - 1000e6)).toBeLessThanOrEqual(60_000);
    expect(pairs[0]!.points).toBe(axis.filter((hz) => hz <= 1000e6).length);
  });

  test('the Working shows the antenna of the frequency alone, and its terms add up to the level', () => {
    for (const [hz, name] of [
      [100e6, 'ANT-L'],
      [700e6, 'ANT-H'],
    ] as const) {
      // prettier-ignore
      const working = workingAt(input, 0, hz);
      const names = working.terms.map((one) => one.name);
      expect(names).toEqual(['reading', name, 'CBL']);
      expect(working.terms.reduce((sum, one) => sum + one.figure, 0)).toBe(working.level);
    }
  });

  test('on the edge it shows both, and why one of them is not added', () => {
    const { terms, level } = workingAt(input, 0, 300e6);
    expect(terms.map(({ name, applied }) => [name, applied])).toEqual([
      ['reading', true],
      ['ANT-L', true],
      ['ANT-H', false],
      ['CBL', true],
    ]);
    expect(terms[2]!.notAppliedBecause).toMatch(/the larger correction governs/);
    expect(terms.filter(({ applied }) => applied).reduce((sum, one) => sum + one.figure, 0)).toBe(level);
  });

  test('where no range reaches, it says so instead of a level', () => {
    expect(workingAt(input, 0, 1100e6)).toMatchObject({
      level: null,
      verdict: 'not-covered',
      because: 'No range of the signal path reaches this frequency.',
    });
  });
});

describe('a level against a line of another unit', () => {
  const probe = term('PR', 'transfer-impedance', [[0.01, 14], [100, 14]]); // prettier-ignore
  const trace = traceOf([60, 60], { frequencyHz: [1e6, 1.004e6] });

  test('a current against a limit in dBuV is not covered, and says why', () => {
    const input = inputOf({ traces: [trace], terms: [probe], port: 'wired-network' });
    const { verdict, pairs, gaps } = runThrough(evaluate(input));
    expect({ verdict, pairs: pairs.length }).toEqual({ verdict: 'not-covered', pairs: 0 });
    expect(gaps.length).toBeGreaterThan(0);
    const working = workingAt(input, 0, 1e6, 'line');
    expect(working).toMatchObject({ levelUnit: 'dBuA', level: 46, verdict: 'not-covered' });
    expect(working.because).toBe('A limit in dBuV says nothing about a level in another unit.');
  });

  test('against one in dBuA it is judged', () => {
    const current = lineOf([[0.15, 30, 40, 40]], { unit: 'dBuA' });
    const input = inputOf({ traces: [trace], terms: [probe], lines: [current], port: 'wired-network' });
    expect(runThrough(evaluate(input)).pairs).toMatchObject([{ worstMarginDb: -6 }]);
  });
});
