import { findingOf, findingText, type FindingEvaluation } from '@/format/finding';
import type { LimitLineView, SweepView } from '@/schemas/sweep';
import { countInWords } from '@/format/words';

const peak = { index: 0, detector: 'peak' as const };
const quasiPeak = { index: 1, detector: 'quasi-peak' as const };
const qpLine = { id: 'q'.repeat(16), detector: 'quasi-peak' as const };
const avLine = { id: 'a'.repeat(16), detector: 'average' as const };

type Worst = NonNullable<FindingEvaluation['worst']>;
function worst(verdict: Worst['verdict'], marginDb: number, frequencyHz: number, more: Partial<Worst> = {}): Worst {
  const at = { frequencyHz, fromHz: frequencyHz, toHz: frequencyHz };
  return { kind: 'peak', traceIndex: 0, lineId: qpLine.id, marginDb, uncertaintyDb: 4.9, verdict, ...at, ...more };
}
function said(evaluation: Partial<FindingEvaluation> & Pick<FindingEvaluation, 'verdict'>, lines = [qpLine]): string {
  return findingText(findingOf({ counts: {}, worst: null, gaps: [], ...evaluation }, [peak, quasiPeak], lines));
}

describe('over', () => {
  const evaluation: FindingEvaluation = {
    verdict: 'over',
    counts: { over: 1, 'needs-final': 3, under: 8 },
    worst: worst('over', -6.2, 144.018e6),
    gaps: [],
  };
  test('the sentence of the design', () =>
    expect(said(evaluation)).toBe('Over by 6.2 dB at 144.018 MHz. Three more need a final; eight are under.'));
  test('the margin is the strong figure, the frequency a plain one', () =>
    expect(findingOf(evaluation, [peak], [qpLine]).filter((run) => run.figure)).toEqual([
      { text: '6.2 dB', figure: true, strong: true },
      { text: '144.018 MHz', figure: true },
    ]));
  test('with several limits the governing one is named', () =>
    expect(
      said({ verdict: 'over', worst: worst('over', -3.14, 0.384e6, { lineId: avLine.id }) }, [qpLine, avLine] as never),
    ).toBe('Over by 3.1 dB at 0.384 MHz against the average limit.'));
  test('one and many agree with their verbs', () =>
    expect(said({ ...evaluation, counts: { over: 3, 'needs-final': 1, inconclusive: 1, under: 13 } })).toBe(
      'Over by 6.2 dB at 144.018 MHz. Two more are over; one needs a final; one is inconclusive; 13 are under.',
    ));
  test('a range that is not covered is still told', () =>
    expect(
      said({ ...evaluation, counts: { over: 1 }, gaps: [{ fromHz: 608.1e6, toHz: 1e9, because: 'no-trace' }] }),
    ).toBe('Over by 6.2 dB at 144.018 MHz. 608.100 MHz to 1\u202f000.000 MHz is not covered.'));
});

test('needs a final: what was read, with which detector, and the act', () =>
  expect(
    said({
      verdict: 'needs-final',
      counts: { 'needs-final': 2, under: 1 },
      worst: worst('needs-final', -1.3, 156.02e6),
    }),
  ).toBe('1.3 dB over at 156.020 MHz in peak: this needs a final. One more needs a final; one is under.'));

test('inconclusive carries the uncertainty at that frequency', () =>
  expect(
    said({ verdict: 'inconclusive', counts: { inconclusive: 1 }, worst: worst('inconclusive', 2.6, 36.006e6) }),
  ).toBe('2.6 dB under at 36.006 MHz, within ±4.9 dB: inconclusive.'));

test('on the limit is not given a side', () =>
  expect(said({ verdict: 'inconclusive', worst: worst('inconclusive', -0.04, 36.006e6) })).toBe(
    'On the limit at 36.006 MHz, within ±4.9 dB: inconclusive.',
  ));

describe('under', () => {
  test('the nearest governs', () =>
    expect(said({ verdict: 'under', counts: { under: 8 }, worst: worst('under', 5.6, 168.022e6) })).toBe(
      'Under by 5.6 dB at 168.022 MHz. Seven more are under.',
    ));
  test('nothing stood out', () => expect(said({ verdict: 'under' })).toBe('Under the limit throughout.'));
});

describe('not covered', () => {
  const gap = { fromHz: 230e6, toHz: 1e9, because: 'no-trace' as const };
  test('the range and why come first, then what was measured', () =>
    expect(
      said({ verdict: 'not-covered', counts: { under: 8 }, worst: worst('under', 5.6, 168.022e6), gaps: [gap] }),
    ).toBe(
      'Not covered from 230.000 MHz to 1\u202f000.000 MHz: no trace is judged there. What was measured is closest at 168.022 MHz, 5.6 dB under. Seven are under.',
    ));
  test('the same range missing for two lines is told once', () =>
    expect(said({ verdict: 'not-covered', gaps: [gap, { ...gap }] })).toBe(
      'Not covered from 230.000 MHz to 1\u202f000.000 MHz: no trace is judged there.',
    ));
  test('without a trace or a range there is still a sentence', () =>
    expect(said({ verdict: 'not-covered' })).toBe('Not covered.'));
});

test('a noise floor that is not proven under is a stretch', () =>
  expect(
    said({
      verdict: 'needs-final',
      worst: worst('needs-final', 1.2, 900e6, { kind: 'floor', fromHz: 870e6, toHz: 960e6 }),
    }),
  ).toBe('1.2 dB under in the noise floor from 870.000 MHz to 960.000 MHz in peak: this needs a final.'));

test('no finding says pass or fail, and none has a bare sign', () => {
  for (const verdict of ['over', 'needs-final', 'inconclusive', 'not-covered', 'under'] as const)
    for (const margin of [-7, -0.01, 0, 3])
      expect(said({ verdict, worst: worst(verdict, margin, 50e6) })).not.toMatch(/pass|fail|[-−+]\d/i);
});

test('what the API answers is what the sentence takes', () => {
  const taken: FindingEvaluation = null as unknown as SweepView['evaluation'];
  const lines: Parameters<typeof findingOf>[2] = null as unknown as LimitLineView[];
  const traces: Parameters<typeof findingOf>[1] = null as unknown as SweepView['traces'];
  expect([taken, lines, traces]).toEqual([null, null, null]);
});

test('counts are words up to twelve', () => {
  expect([0, 1, 12, 13].map(countInWords)).toEqual(['no', 'one', 'twelve', '13']);
  expect(() => countInWords(-1)).toThrow(RangeError);
});
