import type { CandidateView, WindowView } from '@/schemas/sweep';
import { candidateMarks, neighbour } from '@/components/charts/candidateMarks';
import { nearestTrace, stepAlong, tracePoint, windowAt } from '@/components/charts/chartCursor';
import { describeCandidate, describeChart } from '@/components/charts/describeChart';
import { floorPath } from '@/components/charts/floorPath';
import { candidateRemark, shownColumns } from '@/components/grids/candidateColumns';
import { plotScale } from '@/components/charts/scale';

const SPAN = { fromHz: 30e6, toHz: 1e9 };
const scale = plotScale({ width: 990, height: 316, left: 46, right: 10, top: 30, bottom: 46 }, SPAN, {
  top: 12,
  bottom: -38,
});

function candidate(rank: number, mhz: number, level: number, more: Partial<CandidateView> = {}): CandidateView {
  const frequencyHz = mhz * 1e6;
  const limit = mhz < 230 ? 40 : 47;
  return {
    rank,
    kind: 'peak',
    traceIndex: 0,
    lineId: 'l'.padEnd(16, '0'),
    detector: 'quasi-peak',
    frequencyHz,
    fromHz: frequencyHz,
    toHz: frequencyHz,
    reading: level + 14.9,
    level,
    limit,
    marginDb: limit - level,
    uncertaintyDb: 4.9,
    verdict: 'under',
    because: null,
    ...more,
  };
}

const worst = candidate(1, 144.018, 46.2, { verdict: 'over' });
const third = candidate(3, 36.006, 37.4, { verdict: 'inconclusive' });
const all = [worst, candidate(2, 156.02, 41.3, { verdict: 'inconclusive' }), third];

describe('marks', () => {
  test('in the margin chart a candidate hangs from 0, in the level chart from its own limit', () => {
    const [mark] = candidateMarks([third], SPAN, scale, 'margin', null);
    expect(mark!.limitY).toBeCloseTo(scale.y(0), 9);
    expect(mark!.y).toBeCloseTo(scale.y(-2.6), 9);
    const levels = plotScale({ width: 990, height: 316, left: 46, right: 10, top: 30, bottom: 46 }, SPAN, {
      top: 60,
      bottom: 2,
    });
    const [level] = candidateMarks([third], SPAN, levels, 'level', null);
    expect(level!.limitY).toBeCloseTo(levels.y(40), 9);
    expect(level!.y).toBeCloseTo(levels.y(37.4), 9);
  });

  test('over the limit is above it, under is below, outside the span is not there', () => {
    const marks = candidateMarks(all, { fromHz: 100e6, toHz: 1e9 }, scale, 'margin', 2);
    expect(marks.map(({ id, side, ringed }) => [id, side, ringed])).toEqual([
      [1, 'above', false],
      [2, 'above', true],
    ]);
  });

  test('the arrow keys follow frequency, not rank', () => {
    expect(neighbour(all, { hz: 36.006e6, rank: 3 }, 1)!.rank).toBe(1);
    expect(neighbour(all, { hz: 144.018e6, rank: 1 }, 1)!.rank).toBe(2);
    expect(neighbour(all, { hz: 36.006e6, rank: 3 }, -1)).toBeNull();
    expect(neighbour(all, { hz: 150e6, rank: null }, 1)!.rank).toBe(2);
    expect(neighbour(all, { hz: 150e6, rank: null }, -1)!.rank).toBe(1);
  });
});

describe('the cursor on a trace', () => {
  const window: WindowView = {
    fromHz: 30e6,
    toHz: 33e6,
    columns: 4,
    traces: [0, 1].map((index) => ({
      index,
      frequencyHz: [30e6, 31e6, 32e6, 33e6],
      levelMin: [10, 11, 12, 13].map((level) => level - index * 8),
      levelMax: [20, 21, 22, 23].map((level) => level - index * 8),
      marginMin: [20, 19, null, 17].map((margin) => (margin === null ? null : margin + index * 8)),
      marginMax: [30, 29, null, 27].map((margin) => (margin === null ? null : margin + index * 8)),
    })),
  };

  test('says the highest reading of the column, its level and its margin', () => {
    expect(tracePoint(window, 0, 31.1e6, 'margin')).toEqual({
      traceIndex: 0,
      hz: 31e6,
      value: -19,
      level: 21,
      marginDb: 19,
    });
  });

  test('has no margin where there is no limit', () => {
    expect(tracePoint(window, 0, 32e6, 'margin')).toBeNull();
    expect(tracePoint(window, 0, 32e6, 'level')!.marginDb).toBeNull();
  });

  test('reads the finer window inside it and the overview outside it', () => {
    const detail = { ...window, fromHz: 30.5e6, toHz: 31.5e6 };
    expect(windowAt({ overview: window, detail }, 31e6)).toBe(detail);
    expect(windowAt({ overview: window, detail }, 32e6)).toBe(window);
    expect(windowAt({ overview: null, detail: null }, 31e6)).toBeNull();
  });

  test('takes the trace nearer to the pointer', () => {
    expect(nearestTrace(window, 30e6, 20, 'level')!.traceIndex).toBe(0);
    expect(nearestTrace(window, 30e6, 11, 'level')!.traceIndex).toBe(1);
  });

  test('moves by ten points of the sweep, and by one drawn column at the least', () => {
    expect(stepAlong(window, 0, 30e6, 10, 75e3)).toBe(31e6);
    expect(stepAlong(window, 0, 30e6, 10, 300e3)).toBe(33e6);
    expect(stepAlong(window, 0, 31e6, -10, 75e3)).toBeLessThanOrEqual(30.25e6);
    expect(stepAlong(window, 0, 30e6, 2, null)).toBe(32e6);
  });
});

describe('floor candidates', () => {
  const floor = candidate(4, 500, 45, { kind: 'floor', fromHz: 400e6, toHz: 600e6, because: 'noise floor within U' });

  test('have a bar over their whole range, level at their own value where no trace is at hand', () => {
    const y = scale.y(-2) - 3;
    expect(floorPath(floor, null, SPAN, scale, 'margin')).toContain(`L${scale.x(400e6)} ${y}L${scale.x(600e6)} ${y}`);
  });

  test('are cut to what is shown', () => {
    expect(floorPath(floor, null, { fromHz: 700e6, toHz: 1e9 }, scale, 'margin')).toBe('');
  });

  test('say their range in the table', () => {
    expect(candidateRemark(floor, null, 75e3)).toBe('noise floor 400–600 MHz, noise floor within U');
  });
});

describe('in words', () => {
  test('one sentence for the chart', () => {
    expect(describeChart('margin', SPAN, 'CISPR 32 class B, 3 m', all, 12, true)).toBe(
      'Margin against CISPR 32 class B, 3 m, 30–1000 MHz: twelve candidates, the worst at 144.018 MHz, 6.2 over, over.',
    );
    expect(describeChart('level', SPAN, 'CISPR 32 class B, 3 m', [], 0, false)).toBe(
      'Level against CISPR 32 class B, 3 m, 30–1000 MHz: nothing is measured yet.',
    );
  });

  test('one name for each mark, never with a bare sign', () => {
    expect(describeCandidate(third, 'dBuV/m')).toBe(
      'Candidate 3, 36.006 MHz, quasi-peak, 37.4 dBµV/m, 2.6 under, inconclusive',
    );
  });

  test('the harmonic before the reason', () => {
    expect(candidateRemark({ ...worst, because: 'peak reading' }, 12e6, 75e3)).toBe('12 MHz ×12, peak reading');
    expect(candidateRemark(worst, null, 75e3)).toBe('');
  });
});

describe('columns of the candidate table by width', () => {
  const frame = {
    readingUnit: 'dBµV',
    levelUnit: 'dBµV/m',
    frequencyUnit: 'MHz' as const,
    polarisation: 'vertical' as const,
    line: null,
    heightM: 1,
    azimuthDeg: 212,
    stepHz: 75e3,
  };

  test.each([
    [990, { reading: true, orientation: true, height: true, azimuth: true }],
    [800, { reading: true, orientation: true, height: false, azimuth: false }],
    [720, { reading: true, orientation: false, height: false, azimuth: false }],
    [640, { reading: false, orientation: false, height: false, azimuth: false }],
  ])('%d px', (width, shown) => expect(shownColumns(width, frame)).toEqual(shown));

  test('what a conducted run does not have is not a column', () => {
    const conducted = { ...frame, polarisation: null, line: 'L1' as const, heightM: null, azimuthDeg: null };
    expect(shownColumns(990, conducted)).toEqual({ reading: true, orientation: true, height: false, azimuth: false });
  });
});
