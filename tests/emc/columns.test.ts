import fc from 'fast-check';
import { columnAccumulator, columnsOf, LAYER_COLUMNS, type ColumnPoints } from '@/emc/columns';
import { hangTrace, judgeSegment } from '@/emc/segment';
import type { Columns } from '@/emc/types';
import { lineOf, tableOf, termOf, traceOf } from './given';

/** A trace partly outside its factor table and partly outside its line, so that levels and margins go missing. */
const terms = [
  termOf(
    tableOf('loss', [
      [1, 0.5],
      [20, 1.5],
    ]),
  ),
];
const lines = [
  lineOf([
    [2, 5, 60, 50],
    [5, 12, 55, 55],
  ]),
];
function pointsOf(frequencyHz: number[], readings: number[]): ColumnPoints {
  const trace = traceOf(readings, { frequencyHz });
  return judgeSegment(hangTrace(trace, terms, lines), trace.frequencyHz, trace.reading);
}

function bruteForce(points: ColumnPoints, fromHz: number, toHz: number, columns: number): Columns {
  const inside = Array.from(points.frequencyHz, (hz, i) => ({ hz, i })).filter(
    ({ hz, i }) => hz >= fromHz && hz <= toHz && points.state[i] === 0,
  );
  const width = Math.log(toHz / fromHz) / columns;
  const columnOf = (hz: number) =>
    Math.min(
      columns - 1,
      Math.floor(((Math.log(hz) - Math.log(fromHz)) * columns) / (Math.log(toHz) - Math.log(fromHz))),
    );
  const filled = [...new Set(inside.map(({ hz }) => columnOf(hz)))].sort((a, b) => a - b);
  const of = (column: number) => inside.filter(({ hz }) => columnOf(hz) === column);
  const levels = filled.map((column) => of(column).map(({ i }) => points.level[i]!));
  const margins = filled.map((column) =>
    of(column).flatMap(({ i }) => (points.hasMargin[i] ? [points.marginDb[i]!] : [])),
  );
  return {
    frequencyHz: Float64Array.from(filled, (column) => {
      const only = of(column);
      return only.length === 1 ? only[0]!.hz : fromHz * Math.exp((column + 0.5) * width);
    }),
    levelMin: Float32Array.from(levels, (all) => Math.min(...all)),
    levelMax: Float32Array.from(levels, (all) => Math.max(...all)),
    marginMin: Float32Array.from(margins, (all) => (all.length ? Math.min(...all) : 0)),
    marginMax: Float32Array.from(margins, (all) => (all.length ? Math.max(...all) : 0)),
    hasMargin: Uint8Array.from(margins, (all) => (all.length ? 1 : 0)),
  };
}

function expectSame(found: Columns, expected: Columns): void {
  const { frequencyHz, ...rest } = found;
  const { frequencyHz: expectedHz, ...expectedRest } = expected;
  expect(rest).toEqual(expectedRest);
  expect(frequencyHz.length).toBe(expectedHz.length);
  frequencyHz.forEach((hz, i) => expect(hz / expectedHz[i]!).toBeCloseTo(1, 12));
}

const sweep = fc.array(fc.tuple(fc.integer({ min: 1, max: 250 }), fc.float({ min: -20, max: 90, noNaN: true })), {
  minLength: 1,
  maxLength: 120,
});

describe('extremes per log-frequency column', () => {
  test('are those of a search over every point (property)', () => {
    fc.assert(
      fc.property(sweep, fc.integer({ min: 1, max: 40 }), fc.integer({ min: 1, max: 200 }), (rows, columns, from) => {
        const points = pointsOf(
          rows.map(([k]) => k * 1e5),
          rows.map(([, level]) => level),
        );
        const [fromHz, toHz] = [from * 1e5 + 0.5, (from + 50) * 1e5 + 0.5];
        expectSame(columnsOf(points, fromHz, toHz, columns), bruteForce(points, fromHz, toHz, columns));
      }),
      { numRuns: 200 },
    );
  });

  test('are the same however the points are cut into segments (property)', () => {
    fc.assert(
      fc.property(sweep, fc.nat(), (rows, cut) => {
        const hz = rows.map(([k]) => k * 1e5);
        const level = rows.map(([, db]) => db);
        const at = cut % (rows.length + 1);
        const accumulator = columnAccumulator(1e6, 1e7, 16);
        accumulator.add(pointsOf(hz.slice(0, at), level.slice(0, at)));
        accumulator.add(pointsOf(hz.slice(at), level.slice(at)));
        expect(accumulator.finish()).toEqual(columnsOf(pointsOf(hz, level), 1e6, 1e7, 16));
      }),
    );
  });

  test('one point in a column is shown at its own frequency, several at the middle of the column', () => {
    const two = columnsOf(pointsOf([1e6, 1.1e6, 9e6], [10, 12, 30]), 1e6, 1e7, 2);
    expect(Array.from(two.frequencyHz)).toEqual([expect.closeTo(1e6 * 10 ** 0.25, 3), 9e6]);
    expect(Array.from(two.levelMax)[1]).toBeCloseTo(30 + 0.5 + Math.log(9) / Math.log(20), 5);
  });

  test('a column without a limit has no margin, one outside the factor table does not appear', () => {
    const columns = columnsOf(pointsOf([1.5e6, 3e6, 15e6, 22e6], [10, 10, 10, 10]), 1e6, 30e6, 50);
    expect(Array.from(columns.frequencyHz)).toEqual([1.5e6, 3e6, 15e6]);
    expect(Array.from(columns.hasMargin)).toEqual([0, 1, 0]);
  });

  test('the highest frequency of the window is in the last column, and one frequency alone is one column', () => {
    expect(columnsOf(pointsOf([1e6, 1e7], [1, 2]), 1e6, 1e7, 3).frequencyHz).toHaveLength(2);
    expect(columnsOf(pointsOf([3e6], [1]), 3e6, 3e6, LAYER_COLUMNS).frequencyHz).toEqual(Float64Array.of(3e6));
  });

  test('a window that is no range, or no columns, is refused', () => {
    expect(() => columnAccumulator(2, 1, 10)).toThrow(RangeError);
    expect(() => columnAccumulator(0, 1, 10)).toThrow(RangeError);
    expect(() => columnAccumulator(1, 2, 0)).toThrow(RangeError);
    expect(() => columnAccumulator(1, 2, 1.5)).toThrow(RangeError);
  });
});
