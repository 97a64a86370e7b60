import { STEP } from './axis';
import { BANDWIDTH_TOLERANCE } from './detectors';
import { intersected, merged, without, type Interval } from './intervals';
import { POINTS_PER_TURN } from './pace';
import { JUDGED, type PairPoints } from './pair';
import type { CoverageGap, LimitLine } from './types';

/** A stretch between points of one trace: judged throughout, or why not. */
export type Span = Interval & { what: 'covered' | 'no-factor' | 'no-uncertainty' | 'gap' };

// Held as locals: a bundler may turn an imported name into a getter, which a loop over a million points would feel.
const { turn, hole } = STEP;
const { yes } = JUDGED;

/** Steps a sweep reaches beyond its ends. */
const REACH_STEPS = 1;

/** A line's segments as ranges; a hole between segments asks for nothing. */
export function askedRanges(line: LimitLine): Interval[] {
  return merged(line.segments.map(({ startHz, stopHz }) => ({ fromHz: startHz, toHz: stopHz })));
}

/**
 * What one trace covers of a line. The stretch between two neighbouring points is covered when both are judged; it
 * lacks what either of them lacks; across a hole of the axis it is a gap, and so is a point that holds no level.
 * Between two points further apart than the RBW a narrow emission would not be seen at all, so that is a gap too,
 * however even the axis is. Where the RBW is not known (null) no step is too wide: such a reading proves nothing anyway.
 * A sweep reaches one step beyond its first and its last point: one to 999.975 MHz in steps of 60 kHz is one to
 * 1000 MHz, and it adjoins one that begins at 1000 MHz.
 */
export function* spansOf(pair: PairPoints, rbwHz: number | null): Generator<void, Span[]> {
  const spans: Span[] = [];
  const { frequencyHz, steps } = pair;
  // Within what counts as the same bandwidth, so that printed frequencies do not turn an axis of RBW steps into gaps.
  const widestHz = rbwHz === null ? Infinity : rbwHz * (1 + BANDWIDTH_TOLERANCE);
  let first = 0;
  let what: Span['what'] | null = null;
  const close = (last: number) => {
    if (what !== null) spans.push({ ...outline(pair, first, last, what === 'covered' ? REACH_STEPS : 0), what });
  };
  for (let start = 1; start < frequencyHz.length; start += POINTS_PER_TURN) {
    const end = Math.min(start + POINTS_PER_TURN, frequencyHz.length);
    for (let i = start; i < end; i++) {
      const between = steps[i] === turn ? null : whatLies(pair, i, widestHz);
      if (between === what && between !== null) continue;
      close(i - 1);
      first = i - 1;
      what = between;
    }
    yield;
  }
  close(frequencyHz.length - 1);
  return spans;
}

/**
 * The gaps of a line under every trace it is judged by: covered by one of them is covered, except where the run is
 * partial: that covers nothing. Ascending in frequency.
 */
export function gapsOf(line: LimitLine, spans: readonly Span[], partial = false): CoverageGap[] {
  const of = (what: Span['what']) => spans.filter((span) => span.what === what);
  const gaps: CoverageGap[] = [];
  const asked = askedRanges(line);
  let missing = without(asked, of('covered'));
  if (partial) {
    for (const range of intersected(asked, of('covered'))) gaps.push({ lineId: line.id, ...range, because: 'partial' });
  }
  for (const because of ['no-factor', 'no-uncertainty', 'gap'] as const) {
    const found = intersected(missing, of(because));
    for (const range of found) gaps.push({ lineId: line.id, ...range, because });
    missing = without(missing, found);
  }
  for (const range of missing) gaps.push({ lineId: line.id, ...range, because: 'no-trace' });
  return gaps.sort((a, b) => a.fromHz - b.fromHz);
}

function whatLies({ frequencyHz, steps, judged }: PairPoints, i: number, widestHz: number): Span['what'] | null {
  if (steps[i] === hole) return 'gap';
  const tooWide = Math.abs(frequencyHz[i]! - frequencyHz[i - 1]!) > widestHz;
  if (judged[i - 1] === yes && judged[i] === yes) return tooWide ? 'gap' : 'covered';
  for (const state of [judged[i - 1], judged[i]]) {
    if (state === JUDGED.noFactor) return 'no-factor';
    if (state === JUDGED.noUncertainty) return 'no-uncertainty';
    if (state === JUDGED.notRead) return 'gap';
  }
  if (tooWide) return 'gap';
  return judged[i - 1] === yes || judged[i] === yes ? 'covered' : null;
}

/** The range between two points, drawn out by the neighbouring step where the sweep itself begins or ends. */
function outline({ frequencyHz, steps }: PairPoints, first: number, last: number, reach: number): Interval {
  const begins = steps[first] === turn;
  const ends = last + 1 === frequencyHz.length || steps[last + 1] === turn;
  const startHz = frequencyHz[first]!;
  const endHz = frequencyHz[last]!;
  const beforeHz = begins ? (frequencyHz[first + 1]! - startHz) * reach : 0;
  const afterHz = ends ? (endHz - frequencyHz[last - 1]!) * reach : 0;
  const edges = [startHz - beforeHz, endHz + afterHz] as const;
  return { fromHz: Math.min(...edges), toHz: Math.max(...edges) };
}
