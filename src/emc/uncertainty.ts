import { edgeBelow, membersAt, piecesOf, type Pieces } from './pieces';
import type { UncertaintyStep } from './types';

/** Steps made ready for many points. */
export interface PreparedUncertainty {
  pieces: Pieces;
  expandedDb: number[];
}

/** Throws RangeError on a step that is no range or whose figure is negative or not finite. No steps is allowed. */
export function prepareUncertainty(steps: readonly UncertaintyStep[]): PreparedUncertainty {
  for (const { expandedDb } of steps) {
    if (!(expandedDb >= 0 && Number.isFinite(expandedDb))) {
      throw new RangeError(`Expanded uncertainty ${expandedDb} dB is no figure.`);
    }
  }
  return { pieces: piecesOf(steps, 'Uncertainty'), expandedDb: steps.map((step) => step.expandedDb) };
}

/**
 * Expanded uncertainty (k = 2, dB) at a frequency; null outside every step, never extrapolated. Where two steps share
 * a frequency the larger governs: the cautious one of two figures that both claim it.
 */
export function expandedAt(steps: readonly UncertaintyStep[], frequencyHz: number): number | null {
  const expanded = new Float64Array(1);
  const has = new Uint8Array(1);
  expandedInto(prepareUncertainty(steps), Float64Array.of(frequencyHz), expanded, has);
  return has[0] ? expanded[0]! : null;
}

/** `expandedAt` for many points: writes the figure and 1 into `has`, or 0 where there is none. */
export function expandedInto(
  { pieces, expandedDb }: PreparedUncertainty,
  frequencyHz: Float64Array,
  expanded: Float64Array,
  has: Uint8Array,
): void {
  let edge = -1;
  // As for limits: between two edges nothing changes.
  let aboveHz = Infinity;
  let belowHz = 0;
  let largest = 0;
  let known = 0;
  for (let i = 0; i < frequencyHz.length; i++) {
    const f = frequencyHz[i]!;
    if (!(f > aboveHz && f < belowHz)) {
      edge = edgeBelow(pieces.edgesHz, f, edge);
      const members = membersAt(pieces, edge, f);
      aboveHz = pieces.edgesHz[edge] ?? 0;
      belowHz = pieces.edgesHz[edge + 1] ?? Infinity;
      if (f === aboveHz) aboveHz = belowHz;
      largest = members.reduce((largestDb, step) => Math.max(largestDb, expandedDb[step]!), 0);
      known = members.length > 0 ? 1 : 0;
    }
    has[i] = known;
    expanded[i] = largest;
  }
}
