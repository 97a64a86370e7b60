import { nthSmallest } from './extrema';
import { POINTS_PER_TURN } from './pace';

/** Points [from, to) of a trace. */
export interface PointRange {
  from: number;
  to: number;
}

/** A peak stands clear of the floor from here on (receivers want ambient and floor 6 dB down: CISPR 16-2-3). */
export const CLEAR_OF_FLOOR_DB = 6;
/**
 * Noise read without averaging scatters more and asks for more: this many times its own scatter, up to 12 dB. Chosen
 * here, because three quartile distances (two standard deviations of normal noise) leave few peaks to noise, and
 * because a peak 12 dB clear is an emission whatever the noise does.
 */
const CLEAR_OF_SCATTER = 3;
const CLEAR_AT_MOST_DB = 12;
/**
 * More unproven maxima than this within one window, none of them clear of the floor, are the floor. Chosen here,
 * because four can still be looked at one by one, and a list of dozens hides what matters.
 */
const SEPARATE_IN_WINDOW = 4;
/**
 * The floor is judged over this many points on either side, and at least this many bandwidths. Chosen here, because a
 * median of 101 points is steady to a fraction of the scatter, and because an emission is a few bandwidths wide.
 */
const HALF_WINDOW_POINTS = 50;
const HALF_WINDOW_BANDWIDTHS = 10;

/** Minima looked at between two yields: each may call for the median of another window. */
const MINIMA_PER_TURN = 2_048;

/**
 * Points in the window of the running median: odd, at least 101 points and at least 20 bandwidths, so that a single
 * emission, which is a few bandwidths wide, never fills half of it however finely it was swept.
 */
export function floorWindow(frequencyHz: Float64Array, { from, to }: PointRange, bandwidthHz: number): number {
  const meanStepHz = Math.abs(frequencyHz[to - 1]! - frequencyHz[from]!) / Math.max(1, to - from - 1);
  const byBandwidth = meanStepHz > 0 ? Math.ceil((HALF_WINDOW_BANDWIDTHS * bandwidthHz) / meanStepHz) : 0;
  return 2 * Math.max(HALF_WINDOW_POINTS, byBandwidth) + 1;
}

/**
 * Stretches of a run where the noise floor itself is not proven under. The floor at a point is the median margin of the
 * window around it, which is not above `provenAbove` exactly when more than half of the window's points are not proven.
 * Where the median is proven but the noise on top of it is not, more than four maxima within a window, none clear of
 * the floor, say the same. `minima` are the local minima of the margin that are not proven.
 *
 * At the ends of the run the window stays inside it; a run shorter than the window has no floor and is not to be asked.
 * A stretch begins and ends with a point that is not proven, takes in those that adjoin it, and is one with the next when less than a
 * window lies between them.
 */
export function* floorStretches(
  marginDb: Float64Array,
  run: PointRange,
  provenAbove: number,
  window: number,
  minima: readonly number[],
  clearAt: (point: number) => number,
): Generator<void, PointRange[]> {
  const unproven = (i: number) => marginDb[i]! <= provenAbove;
  const stretches = yield* medianUnproven(run, unproven, window);
  const small: number[] = [];
  for (let k = 0; k < minima.length; k++) {
    if (marginDb[minima[k]!]! > clearAt(minima[k]!)) small.push(minima[k]!);
    if (k % MINIMA_PER_TURN === MINIMA_PER_TURN - 1) yield;
  }
  const crowds: PointRange[] = [];
  for (let k = 0; k + SEPARATE_IN_WINDOW < small.length; k++) {
    const last = small[k + SEPARATE_IN_WINDOW]!;
    if (last - small[k]! >= window) continue;
    const crowd = crowds[crowds.length - 1];
    if (crowd && small[k]! < crowd.to) crowd.to = last + 1;
    else crowds.push({ from: small[k]!, to: last + 1 });
  }
  return joined([...stretches, ...crowds], run, unproven, window);
}

function* medianUnproven(
  { from, to }: PointRange,
  unproven: (i: number) => boolean,
  window: number,
): Generator<void, PointRange[]> {
  const stretches: PointRange[] = [];
  const half = window >> 1;
  let start = from;
  let count = 0;
  for (let i = from; i < from + window; i++) if (unproven(i)) count++;
  let open: PointRange | null = null;
  for (let turn = from; turn < to; turn += POINTS_PER_TURN) {
    const end = Math.min(turn + POINTS_PER_TURN, to);
    for (let i = turn; i < end; i++) {
      if (i - half > start && start + window < to) {
        if (unproven(start)) count--;
        if (unproven(start + window)) count++;
        start++;
      }
      if (count <= half) {
        open = null;
        continue;
      }
      if (!unproven(i)) continue;
      if (open) open.to = i + 1;
      else stretches.push((open = { from: i, to: i + 1 }));
    }
    yield;
  }
  return stretches;
}

function joined(
  stretches: readonly PointRange[],
  run: PointRange,
  unproven: (i: number) => boolean,
  window: number,
): PointRange[] {
  const joinedUp: PointRange[] = [];
  for (const stretch of [...stretches].sort((a, b) => a.from - b.from)) {
    let { from, to } = stretch;
    const before = joinedUp[joinedUp.length - 1];
    if (before && to <= before.to) continue;
    while (from > Math.max(run.from, before?.to ?? 0) && unproven(from - 1)) from--;
    while (to < run.to && unproven(to)) to++;
    if (before && from - before.to < window) before.to = Math.max(before.to, to);
    else joinedUp.push({ from, to });
  }
  return joinedUp;
}

/**
 * Where a peak stands clear of the floor: `clearAt(i)` is the margin at or below which point i does. That is 6 dB
 * below the median margin of the window; where the floor scatters, three times the distance from the median to the
 * quartile away from the limit (the side no emission reaches), but never more than 12 dB. Windows are looked at every
 * half window. Only for runs at least as long as the window.
 */
export function floorGauge(
  marginDb: Float64Array,
  run: PointRange,
  window: number,
): { clearAt(point: number): number } {
  const half = window >> 1;
  const buffer = new Float64Array(window);
  const known = new Float64Array(Math.ceil((run.to - run.from) / half)).fill(Infinity);
  function clearAt(point: number): number {
    const cell = Math.floor((point - run.from) / half);
    let clear = known[cell]!;
    if (clear === Infinity) {
      const centre = run.from + cell * half + (half >> 1);
      const start = Math.max(run.from, Math.min(centre - half, run.to - window));
      buffer.set(marginDb.subarray(start, start + window));
      const medianDb = nthSmallest(buffer, half);
      const scatterDb = nthSmallest(buffer, half + (half >> 1)) - medianDb;
      clear = medianDb - Math.min(CLEAR_AT_MOST_DB, Math.max(CLEAR_OF_FLOOR_DB, CLEAR_OF_SCATTER * scatterDb));
      known[cell] = clear;
    }
    return clear;
  }
  return { clearAt };
}
