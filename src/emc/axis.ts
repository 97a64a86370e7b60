import type { Trace } from './types';

/** What lies between a point and the one before it. */
export const STEP = { joined: 0, turn: 1, hole: 2 } as const;

/**
 * Steps on either side of a step that say what is usual there. Chosen here, because a median of 15 outlives a few
 * odd steps and still follows a logarithmic axis.
 */
const NEIGHBOURS = 15;
/** A step beyond this many usual steps is a hole. Chosen here, because a row or two lost in printing is no hole yet. */
const HOLE_STEPS = 3;
/**
 * Fewer points than this, wider apart than the bandwidth, are spot readings: nothing between them was swept. Chosen
 * here, because with fewer there are not 15 steps to say what is usual.
 */
export const SWEEP_POINTS = 16;

/** True for what a limit and a factor can hold at: finite and above zero. Files hold 0 Hz and offsets too. */
export function isFrequency(hz: number): boolean {
  return hz > 0 && hz < Infinity;
}

/**
 * The points of a trace that have a place on the axis. A point at 0 Hz, below, or at no frequency at all has none: it
 * counts as not read, and what lies between its neighbours is judged by the step between them. The trace itself when
 * all have one. Throws RangeError when there are not as many readings as frequencies.
 */
export function onAxis(trace: Trace): Trace {
  const { frequencyHz, reading, name } = trace;
  if (frequencyHz.length !== reading.length) {
    throw new RangeError(`${name} holds ${frequencyHz.length} frequencies and ${reading.length} readings.`);
  }
  let all = true;
  for (let i = 0; i < frequencyHz.length && all; i++) all = isFrequency(frequencyHz[i]!);
  if (all) return trace;
  return {
    ...trace,
    frequencyHz: frequencyHz.filter(isFrequency),
    reading: reading.filter((_, i) => isFrequency(frequencyHz[i]!)),
  };
}

/** The lowest and highest frequency of an axis in any order; null when it is empty. */
export function axisRange(frequencyHz: Float64Array): { lowestHz: number; highestHz: number } | null {
  if (frequencyHz.length === 0) return null;
  let lowestHz = Infinity;
  let highestHz = 0;
  for (let i = 0; i < frequencyHz.length; i++) {
    const hz = frequencyHz[i]!;
    if (hz < lowestHz) lowestHz = hz;
    if (hz > highestHz) highestHz = hz;
  }
  return { lowestHz, highestHz };
}

/**
 * How each point of an axis hangs together with the one before it, one of STEP per point; the first is a `turn`.
 *
 * Points are joined while the axis keeps its direction; a repeated frequency (the edge of a joined piece) is joined
 * too. Where the direction turns, another sweep begins: `turn`. A step larger than the bandwidth and than three usual
 * steps is a `hole`: usual is the larger of the medians of the 15 steps before and after it, so that neither a
 * logarithmic axis nor a change of step between pieces reads as holes.
 */
export function axisSteps(frequencyHz: Float64Array, bandwidthHz: number): Uint8Array {
  const steps = new Uint8Array(frequencyHz.length);
  if (steps.length === 0) return steps;
  steps[0] = STEP.turn;
  const spots = frequencyHz.length < SWEEP_POINTS;
  let direction = 0;
  for (let i = 1; i < frequencyHz.length; i++) {
    const stepHz = frequencyHz[i]! - frequencyHz[i - 1]!;
    if (stepHz === 0) continue;
    const sign = stepHz > 0 ? 1 : -1;
    if (direction !== 0 && sign !== direction) {
      steps[i] = STEP.turn;
      direction = 0;
      continue;
    }
    direction = sign;
    if (Math.abs(stepHz) > bandwidthHz && (spots || isHole(frequencyHz, i))) steps[i] = STEP.hole;
  }
  return steps;
}

function isHole(frequencyHz: Float64Array, point: number): boolean {
  const stepHz = Math.abs(frequencyHz[point]! - frequencyHz[point - 1]!);
  // A step no larger than three times the smallest around it is no hole; this spares most axes the medians.
  if (!(stepHz > HOLE_STEPS * smallestNear(frequencyHz, point))) return false;
  const before = usualStep(frequencyHz, point - NEIGHBOURS, point);
  const after = usualStep(frequencyHz, point + 1, point + 1 + NEIGHBOURS);
  return stepHz > HOLE_STEPS * Math.max(before, after);
}

function smallestNear(frequencyHz: Float64Array, point: number): number {
  const to = Math.min(point + 1 + NEIGHBOURS, frequencyHz.length);
  let smallest = Infinity;
  for (let i = Math.max(point - NEIGHBOURS, 1); i < to; i++) {
    const stepHz = Math.abs(frequencyHz[i]! - frequencyHz[i - 1]!);
    if (i !== point && stepHz > 0 && stepHz < smallest) smallest = stepHz;
  }
  return smallest === Infinity ? 0 : smallest;
}

/** Median of the steps that end at points `from` to `to` (exclusive), leaving out repeated frequencies; 0 when none. */
function usualStep(frequencyHz: Float64Array, from: number, to: number): number {
  const steps: number[] = [];
  for (let i = Math.max(from, 1); i < Math.min(to, frequencyHz.length); i++) {
    const stepHz = Math.abs(frequencyHz[i]! - frequencyHz[i - 1]!);
    if (stepHz > 0) steps.push(stepHz);
  }
  steps.sort((a, b) => a - b);
  return steps.length === 0 ? 0 : steps[steps.length >> 1]!;
}
