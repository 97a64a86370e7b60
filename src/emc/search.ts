import { STEP } from './axis';
import { localMinima, prominentMinima } from './extrema';
import { CLEAR_OF_FLOOR_DB, floorGauge, floorStretches, floorWindow, type PointRange } from './floor';
import { POINTS_PER_TURN } from './pace';
import { JUDGED, type PairPoints } from './pair';
import type { Reach } from './verdict';

// Held as locals: a bundler may turn an imported name into a getter, which a loop over a million points would feel.
const { yes } = JUDGED;
const { joined } = STEP;

/** Candidates of one trace against one line, as points of the trace. */
export interface Found {
  /** Local maxima of the emission that are not proven under. */
  peaks: number[];
  /** Stretches whose floor is not proven under, each with the worst point of the floor itself. */
  floors: (PointRange & { worst: number })[];
  /** The nearest prominent local maxima that need no further look, smallest margin first. */
  others: number[];
}

/** Prominence, in dB of margin, that makes a proven local maximum worth listing. */
export const PROMINENCE_DB = CLEAR_OF_FLOOR_DB;

/**
 * Finds every local maximum of the emission that is not proven under, the floor stretches and the `nearest` others.
 *
 * A local maximum is a local minimum of the margin: corrections and limit steps move the margin, so the highest
 * reading need not be the nearest to its limit. It is sought within runs of points that hang together: all judged, the
 * axis neither turning nor broken by a hole, one guard of the rule. Within a run a smaller margin is never a better verdict,
 * so every point that is not proven under lies in a listed floor stretch or falls, margin by margin, to a listed peak,
 * and the worst verdict of any point is the verdict of something listed.
 */
export function* findCandidates(
  pair: PairPoints,
  reach: Reach,
  bandwidthHz: number,
  nearest: number,
): Generator<void, Found> {
  const found: Found = { peaks: [], floors: [], others: [] };
  const points = pair.frequencyHz.length;
  let from = 0;
  while (from < points) {
    if (pair.judged[from] !== yes) {
      from++;
      if (from % POINTS_PER_TURN === 0) yield;
      continue;
    }
    let to = from + 1;
    while (to < points && hangsTogether(pair, to)) to++;
    yield* searchRun(pair, { from, to }, reach, bandwidthHz, nearest, found);
    from = to;
  }
  return found;
}

function hangsTogether({ judged, steps, guardDb }: PairPoints, i: number): boolean {
  return judged[i] === yes && steps[i] === joined && guardDb[i] === guardDb[i - 1];
}

function* searchRun(
  { frequencyHz, marginDb, guardDb }: PairPoints,
  run: PointRange,
  reach: Reach,
  bandwidthHz: number,
  nearest: number,
  found: Found,
): Generator<void, void> {
  const judges = reach.otherwise !== 'not-covered';
  const provenAbove = reach.under ? guardDb[run.from]! : Infinity;
  const unproven = (i: number) => judges && marginDb[i]! <= provenAbove;
  const prominent = yield* prominentMinima(marginDb, run.from, run.to, PROMINENCE_DB);
  for (const i of prominent) if (!unproven(i)) keepNearest(found.others, i, frequencyHz, marginDb, nearest);
  // The lowest margin is always prominent: when it is proven, everything is.
  if (!prominent.some(unproven)) return;

  const minima = yield* localMinima(marginDb, run.from, run.to, provenAbove);
  const window = floorWindow(frequencyHz, run, bandwidthHz);
  if (run.to - run.from < window) {
    for (const i of minima) found.peaks.push(i);
    return;
  }
  const { clearAt } = floorGauge(marginDb, run, window);
  const stretches = yield* floorStretches(marginDb, run, provenAbove, window, minima, clearAt);
  let next = 0;
  let nextProminent = 0;
  for (const stretch of stretches) {
    while (next < minima.length && minima[next]! < stretch.from) found.peaks.push(minima[next++]!);
    let floor = -1;
    let unlisted = -1;
    let listed = -1;
    for (; next < minima.length && minima[next]! < stretch.to; next++) {
      const i = minima[next]!;
      const clear = marginDb[i]! <= clearAt(i);
      while (prominent[nextProminent]! < i) nextProminent++;
      if (clear && prominent[nextProminent] === i) {
        found.peaks.push(i);
        listed = lower(listed, i, marginDb);
      } else {
        unlisted = lower(unlisted, i, marginDb);
        if (!clear) floor = lower(floor, i, marginDb);
      }
      if (next % POINTS_PER_TURN === 0) yield;
    }
    // Every point of the stretch belongs to a listed peak: there is no floor left to stand for.
    if (unlisted < 0) continue;
    const worst = floor < 0 ? unlisted : floor;
    found.floors.push({ ...stretch, worst });
    // The worst point of a stretch is always listed, whatever shape it has.
    if (lower(lower(worst, listed, marginDb), unlisted, marginDb) === unlisted && unlisted !== worst) {
      found.peaks.push(unlisted);
    }
  }
  while (next < minima.length) found.peaks.push(minima[next++]!);
}

/** Of two points the one with the lower margin, the first where they are equal; -1 stands for none. */
function lower(a: number, b: number, marginDb: Float64Array): number {
  if (a < 0 || b < 0) return Math.max(a, b);
  return marginDb[b]! < marginDb[a]! ? b : a;
}

/** Two passes over one frequency are one place: of these the smaller margin is kept. */
function keepNearest(
  kept: number[],
  point: number,
  frequencyHz: Float64Array,
  marginDb: Float64Array,
  most: number,
): void {
  if (kept.length === most && (most === 0 || marginDb[kept[most - 1]!]! <= marginDb[point]!)) return;
  const same = kept.findIndex((one) => frequencyHz[one] === frequencyHz[point]);
  if (same >= 0) {
    if (marginDb[kept[same]!]! <= marginDb[point]!) return;
    kept.splice(same, 1);
  }
  let at = kept.length;
  while (at > 0 && marginDb[kept[at - 1]!]! > marginDb[point]!) at--;
  kept.splice(at, 0, point);
  if (kept.length > most) kept.pop();
}
