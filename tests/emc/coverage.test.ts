import fc from 'fast-check';
import { evaluateNow } from '@/emc/evaluate';
import { intersected, merged, without, type Interval } from '@/emc/intervals';
import type { EvaluationInput, LimitLine } from '@/emc/types';
import { inputOf, lineOf, publishedLine, tableOf, termOf, traceOf } from './given';

const QUIET = 10;
const sweep = (startMhz: number, stepKhz: number, points: number, more: Parameters<typeof traceOf>[1] = {}) =>
  traceOf(
    Array.from({ length: points }, () => QUIET),
    { startHz: startMhz * 1e6, stepHz: stepKhz * 1e3, rbwHz: stepKhz * 1e3, ...more },
  );
const RBW = { rbwHz: 10e3 };
const LINE = lineOf([[1, 2, 60, 60]]);

/** Gaps as [from MHz, to MHz, because]. */
function gapsOf(input: Partial<EvaluationInput> & Pick<EvaluationInput, 'traces'>, line: LimitLine = LINE) {
  const { gaps } = evaluateNow(inputOf({ lines: [line], ...input }));
  return gaps.map(({ fromHz, toHz, because }) => [+(fromHz / 1e6).toFixed(6), +(toHz / 1e6).toFixed(6), because]);
}

describe('what a run leaves open of a limit line', () => {
  test('nothing when the sweep spans it', () => {
    expect(gapsOf({ traces: [sweep(0.9, 10, 150)] })).toEqual([]);
  });

  test('an end within one step of the sweep counts as reached: 999.975 MHz in steps of 60 kHz is 1000 MHz', () => {
    const line = publishedLine('cispr32-b-re-3m');
    const to = (lastMhz: number) => sweep(lastMhz - 16_200 * 0.06, 60, 16_201, { unit: 'dBuV/m', rbwHz: 120e3 });
    expect(gapsOf({ traces: [to(999.975)] }, line)).toEqual([]);
    expect(gapsOf({ traces: [to(999.94)] }, line)).toEqual([]);
    expect(gapsOf({ traces: [to(999.9)] }, line)).toEqual([[999.96, 1000, 'no-trace']]);
  });

  test('one step short by the rounding of the axis is one step', () => {
    const hz = Array.from({ length: 30 }, (_, i) => 1e6 * (1 + i / 30));
    const reach = hz[29]! + (hz[29]! - hz[28]!);
    const line = lineOf([[1, (reach + 1e-6) / 1e6, 60, 60]]);
    expect(
      gapsOf(
        {
          traces: [
            traceOf(
              hz.map(() => QUIET),
              { frequencyHz: hz, rbwHz: 40e3 },
            ),
          ],
        },
        line,
      ),
    ).toEqual([]);
  });

  test('a sweep that stops short leaves the rest without a trace, from one step after its last point', () => {
    expect(gapsOf({ traces: [sweep(1, 10, 51)] })).toEqual([[1.51, 2, 'no-trace']]);
    expect(gapsOf({ traces: [sweep(1.5, 10, 51)] })).toEqual([[1, 1.49, 'no-trace']]);
    expect(
      gapsOf({
        traces: [
          traceOf(Array(51).fill(QUIET), { frequencyHz: Array.from({ length: 51 }, (_, i) => 2e6 - i * 1e4), ...RBW }),
        ],
      }),
    ).toEqual([[1, 1.49, 'no-trace']]);
  });

  test('a line without any trace in its unit, or in its range, is open from end to end', () => {
    expect(gapsOf({ traces: [] })).toEqual([[1, 2, 'no-trace']]);
    expect(gapsOf({ traces: [sweep(1, 10, 101, { unit: 'dBuV/m' })] })).toEqual([[1, 2, 'no-trace']]);
    expect(gapsOf({ traces: [sweep(1, 10, 101, { unit: 'dB' })] })).toEqual([[1, 2, 'no-trace']]);
    expect(gapsOf({ traces: [sweep(3, 10, 101)] })).toEqual([[1, 2, 'no-trace']]);
  });

  test('where a factor table ends there is no factor, to the first point that has one', () => {
    const terms = [
      termOf(
        tableOf('loss', [
          [1.2, 1],
          [1.8, 2],
        ]),
      ),
    ];
    expect(gapsOf({ traces: [sweep(1, 10, 101)], terms })).toEqual([
      [1, 1.2, 'no-factor'],
      [1.8, 2, 'no-factor'],
    ]);
  });

  test('where no uncertainty is stated there is none', () => {
    const prescan = [{ startHz: 1.5e6, stopHz: 3e6, expandedDb: 4 }];
    expect(gapsOf({ traces: [sweep(1, 10, 101)], uncertainty: { prescan, final: [] } })).toEqual([
      [1, 1.5, 'no-uncertainty'],
    ]);
  });

  test('a hole in the axis is a gap, and so is a point without a level', () => {
    const hz = Array.from({ length: 101 }, (_, i) => 1e6 + i * 1e4).filter((f) => f <= 1.3e6 || f >= 1.4e6);
    expect(
      gapsOf({
        traces: [
          traceOf(
            hz.map(() => QUIET),
            { frequencyHz: hz, ...RBW },
          ),
        ],
      }),
    ).toEqual([[1.3, 1.4, 'gap']]);
    const volts = Array.from({ length: 101 }, (_, i) => (i === 50 ? 0 : 5));
    expect(gapsOf({ traces: [traceOf(volts, { startHz: 1e6, stepHz: 1e4, unit: 'uV', ...RBW })] })).toEqual([
      [1.49, 1.51, 'gap'],
    ]);
  });

  test('a hole of the line itself asks for nothing', () => {
    const line = lineOf([
      [1, 1.4, 60, 60],
      [1.6, 2, 60, 60],
    ]);
    const hz = Array.from({ length: 101 }, (_, i) => 1e6 + i * 1e4).filter((f) => f <= 1.4e6 || f >= 1.6e6);
    expect(
      gapsOf(
        {
          traces: [
            traceOf(
              hz.map(() => QUIET),
              { frequencyHz: hz, ...RBW },
            ),
          ],
        },
        line,
      ),
    ).toEqual([]);
  });

  test('what one trace of the chosen kind covers is covered', () => {
    const halves = [sweep(1, 10, 51, { index: 0 }), sweep(1.5, 10, 51, { index: 1 })];
    expect(gapsOf({ traces: halves })).toEqual([]);
  });

  test('40 points every 25.6 MHz at RBW 120 kHz see next to nothing of 30 to 1000 MHz: one gap, not covered', () => {
    const line = publishedLine('cispr32-b-re-3m');
    const coarse = (rbwHz: number | null) => sweep(30, 25_600, 40, { unit: 'dBuV/m', rbwHz });
    const run = (rbwHz: number | null) => evaluateNow(inputOf({ traces: [coarse(rbwHz)], lines: [line] }));
    expect(gapsOf({ traces: [coarse(120e3)] }, line)).toEqual([[30, 1000, 'gap']]);
    expect(run(120e3)).toMatchObject({ verdict: 'not-covered', counts: { over: 0, 'needs-final': 0 } });
    expect(run(26e6)).toMatchObject({ verdict: 'under', gaps: [] });
    // Without an RBW nothing is proven, however close the points are.
    expect(run(null)).toMatchObject({ verdict: 'needs-final', gaps: [] });
  });

  test('a step as wide as the RBW is covered, one wider by more than printing rounds is not', () => {
    const steps = (stepKhz: number) => gapsOf({ traces: [sweep(0.9, stepKhz, 400, { rbwHz: 9e3 })] });
    expect([4.5, 9, 9.05].map(steps)).toEqual([[], [], []]);
    expect(steps(9.2)).toEqual([[1, 2, 'gap']]);
  });

  test('the coarse part of a sweep is one gap and its fine parts are covered; a finer trace fills it', () => {
    const even = (fromHz: number, stepHz: number, points: number) =>
      Array.from({ length: points }, (_, i) => fromHz + i * stepHz);
    const hz = [...even(1e6, 9e3, 40), ...even(1.36e6, 20e3, 10), ...even(1.56e6, 9e3, 60)];
    const mixed = traceOf(
      hz.map(() => QUIET),
      { frequencyHz: hz },
    );
    expect(gapsOf({ traces: [mixed] })).toEqual([[1.36, 1.56, 'gap']]);
    expect(gapsOf({ traces: [mixed, sweep(1.3, 4.5, 80, { index: 1, rbwHz: 9e3 })] })).toEqual([]);
  });

  test('a line narrower than a coarse step is not covered by the points around it', () => {
    const around = sweep(0.4, 1_000, 40, { rbwHz: 9e3 });
    expect(gapsOf({ traces: [around] }, lineOf([[2.5, 3, 60, 60]]))).toEqual([[2.5, 3, 'gap']]);
  });

  test('spot readings cover nothing between them', () => {
    expect(gapsOf({ traces: [traceOf([QUIET, QUIET], { frequencyHz: [1e6, 2e6] })] })).toEqual([[1, 2, 'gap']]);
  });
});

describe('ranges of frequency', () => {
  const ranges = fc.array(
    fc
      .tuple(fc.nat({ max: 30 }), fc.integer({ min: 1, max: 8 }))
      .map(([fromHz, width]) => ({ fromHz, toHz: fromHz + width })),
    { maxLength: 8 },
  );
  /** Unit cells a list of ranges covers. */
  const cells = (list: readonly Interval[]) =>
    Array.from({ length: 40 }, (_, cell) => list.some(({ fromHz, toHz }) => fromHz <= cell && toHz >= cell + 1));

  test('merged, intersected and without are union, intersection and difference (property)', () => {
    fc.assert(
      fc.property(ranges, ranges, (a, b) => {
        const [inA, inB] = [cells(a), cells(b)];
        expect(cells(merged(a))).toEqual(inA);
        expect(cells(intersected(a, b))).toEqual(inA.map((one, i) => one && inB[i]!));
        expect(cells(without(a, b))).toEqual(inA.map((one, i) => one && !inB[i]!));
        merged(a).forEach((range, i, all) => expect(range.fromHz).toBeGreaterThan(all[i - 1]?.toHz ?? -1));
      }),
      { numRuns: 200 },
    );
  });
});
