import { axisSteps, STEP } from './axis';
import type { Interval } from './intervals';

/** Points before a piece that tell what step is usual at its beginning. Source: `axisSteps` looks at 15 steps. */
const BEFORE = 16;

export interface StepCollector {
  /** The next points of the axis, in the order they were swept. */
  add(frequencyHz: Float64Array): void;
  /** The largest step in each part; null where no two neighbouring points lie in it. */
  finish(): (number | null)[];
}

/**
 * Finds the largest step between neighbouring points of a sweep in each part of its range. A step belongs to the part
 * its middle lies in; turns between passes and holes are none, nor is what lies between spot readings (see
 * `axisSteps`, which asks for the bandwidth). Points come piece by piece, so that a long sweep is never held whole.
 */
export function stepCollector(parts: readonly Interval[], bandwidthHz: number): StepCollector {
  const largest = parts.map((): number | null => null);
  let before = new Float64Array(0);

  function add(frequencyHz: Float64Array): void {
    const points = new Float64Array(before.length + frequencyHz.length);
    points.set(before);
    points.set(frequencyHz, before.length);
    const steps = axisSteps(points, bandwidthHz);
    for (let i = Math.max(1, before.length); i < points.length; i++) {
      if (steps[i] !== STEP.joined) continue;
      const stepHz = Math.abs(points[i]! - points[i - 1]!);
      const middleHz = (points[i]! + points[i - 1]!) / 2;
      if (!(stepHz > 0)) continue;
      for (let k = 0; k < parts.length; k++) {
        const { fromHz, toHz } = parts[k]!;
        if (middleHz >= fromHz && middleHz <= toHz && stepHz > (largest[k] ?? 0)) largest[k] = stepHz;
      }
    }
    before = points.slice(-BEFORE);
  }

  return { add, finish: () => [...largest] };
}
