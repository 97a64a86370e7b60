import { axisRange, axisSteps, onAxis, STEP } from '@/emc/axis';
import { traceOf } from './given';

const steps = (hz: number[], bandwidthHz = 9e3) => Array.from(axisSteps(Float64Array.from(hz), bandwidthHz));
const breaks = (hz: number[], bandwidthHz?: number) =>
  steps(hz, bandwidthHz).flatMap((step, i) => (step === STEP.joined ? [] : [[i, step]]));
const even = (from: number, stepHz: number, points: number) =>
  Array.from({ length: points }, (_, i) => from + i * stepHz);
const logarithmic = (from: number, to: number, points: number) =>
  Array.from({ length: points }, (_, i) => from * (to / from) ** (i / (points - 1)));

describe('how the points of an axis hang together', () => {
  test('an even axis, rising or falling, is one sweep', () => {
    expect(breaks(even(1e6, 4500, 40))).toEqual([[0, STEP.turn]]);
    expect(breaks(even(1e6, 4500, 40).reverse())).toEqual([[0, STEP.turn]]);
  });

  test('a repeated frequency joins the pieces it stands between', () => {
    const first = even(1e6, 4500, 20);
    expect(breaks([...first, ...even(first[19]!, 4500, 20)])).toEqual([[0, STEP.turn]]);
  });

  test('where the axis turns back another sweep begins', () => {
    expect(breaks([...even(1e6, 4500, 20), ...even(1e6, 4500, 20)])).toEqual([
      [0, STEP.turn],
      [20, STEP.turn],
    ]);
  });

  test('a step larger than the bandwidth and than three usual ones is a hole; one of these alone is not', () => {
    const after = (gapHz: number) => [...even(1e6, 4500, 30), ...even(1e6 + 29 * 4500 + gapHz, 4500, 30)];
    expect(breaks(after(13_501), 9e3)).toEqual([
      [0, STEP.turn],
      [30, STEP.hole],
    ]);
    expect(breaks(after(13_500), 9e3)).toEqual([[0, STEP.turn]]);
    expect(breaks(after(13_501), 14e3)).toEqual([[0, STEP.turn]]);
  });

  test('neither a logarithmic axis nor a change of step between pieces is a hole', () => {
    expect(breaks(logarithmic(9e3, 1e9, 300), 100)).toEqual([[0, STEP.turn]]);
    expect(breaks([...even(9e3, 50, 2820), ...even(150e3, 4500, 60), ...even(420e3, 50, 100)], 200)).toEqual([
      [0, STEP.turn],
    ]);
  });

  test('two points on their own within a hole make three holes', () => {
    const hz = [...even(1e6, 4500, 30), 2e6, 3e6, ...even(4e6, 4500, 30)];
    expect(breaks(hz)).toEqual([
      [0, STEP.turn],
      [30, STEP.hole],
      [31, STEP.hole],
      [32, STEP.hole],
    ]);
  });

  test('fewer than 16 points wider apart than the bandwidth are spot readings with nothing between them', () => {
    expect(steps(even(1e6, 1e6, 4))).toEqual([STEP.turn, STEP.hole, STEP.hole, STEP.hole]);
    expect(steps(even(1e6, 9e3, 4))).toEqual([STEP.turn, STEP.joined, STEP.joined, STEP.joined]);
    expect(breaks(even(1e6, 1e6, 16))).toEqual([[0, STEP.turn]]);
  });

  test('range in any order; null when empty', () => {
    expect(axisRange(Float64Array.of(3, 1, 2))).toEqual({ lowestHz: 1, highestHz: 3 });
    expect(axisRange(new Float64Array(0))).toBeNull();
    expect(steps([])).toEqual([]);
  });

  test('points without a place on the axis are left out; a trace with none of them stays itself', () => {
    const odd = onAxis(traceOf([1, 2, 3, 4, 5, 6], { frequencyHz: [0, 5, -3, NaN, Infinity, 7] }));
    expect([Array.from(odd.frequencyHz), Array.from(odd.reading)]).toEqual([
      [5, 7],
      [2, 6],
    ]);
    const plain = traceOf([1, 2]);
    expect(onAxis(plain)).toBe(plain);
    expect(() => onAxis(traceOf([1, 2], { frequencyHz: [1] }))).toThrow(/1 frequencies and 2 readings/);
  });
});
