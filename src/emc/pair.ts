import { POINT } from './correction';
import { EQUAL_WITHIN_DB } from './guardBand';
import { limitsInto, type PreparedLine } from './limitLine';
import type { JudgedSegment } from './segment';
import { expandedInto, type PreparedUncertainty } from './uncertainty';

/** Whether a point of a trace can be judged against a line, and what is missing when not. */
export const JUDGED = { yes: 0, noLimit: 1, notRead: 2, noFactor: 3, noUncertainty: 4 } as const;

// Held as locals: a bundler may turn an imported name into a getter, which a loop over a million points would feel.
const { notRead, noFactor } = POINT;

/** One trace against one line, point by point. Arrays are as long as the trace. */
export interface PairPoints {
  frequencyHz: Float64Array;
  /** One of STEP: how each point hangs together with the one before it. */
  steps: Uint8Array;
  /** One of JUDGED. Margin and uncertainty are meaningful where it is `yes`. */
  judged: Uint8Array;
  /** limit − level. */
  marginDb: Float64Array;
  uncertaintyDb: Float64Array;
  /** What the margin has to be larger than to be under; U itself where the rule is guarded by U. */
  guardDb: Float64Array;
  /** Whether the rule leaves anything between under and over. */
  between: boolean;
}

/** Uncertainty and the guard a rule makes of it, ready for many points. */
export interface PreparedGuard {
  uncertainty: PreparedUncertainty;
  /** null where it is U. */
  guard: PreparedUncertainty | null;
}

/** Arrays for a trace, to be filled piece by piece with `judgeInto`. */
export function pairPoints(frequencyHz: Float64Array, steps: Uint8Array, between: boolean): PairPoints {
  const points = frequencyHz.length;
  const uncertaintyDb = new Float64Array(points);
  return {
    frequencyHz,
    steps,
    judged: new Uint8Array(points),
    marginDb: new Float64Array(points),
    uncertaintyDb,
    guardDb: between ? uncertaintyDb : new Float64Array(points),
    between,
  };
}

/** Judges a piece of a trace, which begins at point `from` of it, against a line. */
export function judgeInto(
  pair: PairPoints,
  segment: JudgedSegment,
  line: PreparedLine,
  { uncertainty, guard }: PreparedGuard,
  from: number,
): void {
  const { frequencyHz, logHz, level, state } = segment;
  const points = level.length;
  const limit = new Float64Array(points);
  const hasLimit = new Uint8Array(points);
  const hasExpanded = new Uint8Array(points);
  limitsInto(line, frequencyHz, logHz, limit, hasLimit);
  expandedInto(uncertainty, frequencyHz, pair.uncertaintyDb.subarray(from, from + points), hasExpanded);
  if (guard) {
    const guardDb = pair.guardDb.subarray(from, from + points);
    expandedInto(guard, frequencyHz, guardDb, hasExpanded);
    for (let i = 0; i < points; i++) guardDb[i]! -= EQUAL_WITHIN_DB;
  }
  const marginDb = pair.marginDb.subarray(from, from + points);
  const judged = pair.judged.subarray(from, from + points);
  for (let i = 0; i < points; i++) {
    marginDb[i] = limit[i]! - level[i]!;
    if (hasLimit[i] === 0) judged[i] = JUDGED.noLimit;
    else if (state[i] === notRead) judged[i] = JUDGED.notRead;
    else if (state[i] === noFactor) judged[i] = JUDGED.noFactor;
    else if (hasExpanded[i] === 0) judged[i] = JUDGED.noUncertainty;
    else judged[i] = JUDGED.yes;
  }
}
