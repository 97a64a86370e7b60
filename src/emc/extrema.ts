import { POINTS_PER_TURN } from './pace';

/**
 * Positions of every local minimum of values[from..to) that is not above `atMost`: lower than its neighbour on each side, an end being lower
 * than its only neighbour, a plateau counting once by its first point. From every point the values fall, step by
 * step, to one of them.
 */
export function* localMinima(
  values: Float64Array,
  from: number,
  to: number,
  atMost = Infinity,
): Generator<void, number[]> {
  const found: number[] = [];
  let lowest = from;
  let falling = true;
  for (let start = from + 1; start < to; start += POINTS_PER_TURN) {
    const end = Math.min(start + POINTS_PER_TURN, to);
    for (let i = start; i < end; i++) {
      if (values[i]! < values[lowest]!) {
        falling = true;
        lowest = i;
      } else if (values[i]! > values[lowest]!) {
        if (falling && values[lowest]! <= atMost) found.push(lowest);
        falling = false;
        lowest = i;
      }
    }
    yield;
  }
  if (falling && from < to && values[lowest]! <= atMost) found.push(lowest);
  return found;
}

/**
 * Positions of the local minima of values[from..to) whose prominence is at least `prominence`: on either side the
 * values rise by that much before they fall lower, or do not fall lower at all. The lowest value is always among them.
 * One pass with hysteresis: a minimum is settled once the values have risen by `prominence` above it.
 */
export function* prominentMinima(
  values: Float64Array,
  from: number,
  to: number,
  prominence: number,
): Generator<void, number[]> {
  const found: number[] = [];
  let lowest = from;
  let highest = from;
  let sinking = true;
  for (let start = from; start < to; start += POINTS_PER_TURN) {
    const end = Math.min(start + POINTS_PER_TURN, to);
    for (let i = start; i < end; i++) {
      const value = values[i]!;
      if (sinking) {
        if (value < values[lowest]!) lowest = i;
        else if (value - values[lowest]! >= prominence) {
          found.push(lowest);
          sinking = false;
          highest = i;
        }
      } else if (value > values[highest]!) highest = i;
      else if (values[highest]! - value >= prominence) {
        sinking = true;
        lowest = i;
      }
    }
    yield;
  }
  if (sinking && from < to) found.push(lowest);
  return found;
}

/** The value that `rank` others are no larger than, 0 for the smallest. Reorders `values`. */
export function nthSmallest(values: Float64Array, rank: number): number {
  let low = 0;
  let high = values.length - 1;
  while (low < high) {
    const pivot = values[(low + high) >> 1]!;
    let left = low;
    let right = high;
    while (left <= right) {
      while (values[left]! < pivot) left++;
      while (values[right]! > pivot) right--;
      if (left > right) break;
      const swapped = values[left]!;
      values[left++] = values[right]!;
      values[right--] = swapped;
    }
    if (rank <= right) high = right;
    else if (rank >= left) low = left;
    else break;
  }
  return values[rank]!;
}
