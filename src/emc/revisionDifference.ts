import { factorAt } from './factorTable';
import { limitOf, prepareLine } from './limitLine';
import type { FactorTable, LimitLine } from './types';

/** How a new revision differs from the one before it, as new minus old in dB, where both have a value. */
export interface RevisionDifference {
  /** The value furthest from zero, with its sign: positive where the new revision is higher. */
  largestDb: number;
  atHz: number;
  /** One list of points per unbroken stretch, ascending; the difference is straight over log f between them. */
  stretches: { hz: number; db: number }[][];
}

function differenceOf(stretches: RevisionDifference['stretches']): RevisionDifference | null {
  const [first, ...rest] = stretches.flat();
  if (!first) return null;
  const largest = rest.reduce((most, point) => (Math.abs(point.db) > Math.abs(most.db) ? point : most), first);
  return { largestDb: largest.db, atHz: largest.hz, stretches };
}

/**
 * Two tables over the range that both cover; null where they share none. Both are straight in dB over log f between
 * their rows, so the difference is largest at a row of one of them or at an end of the shared range.
 */
export function factorDifference(before: FactorTable, after: FactorTable): RevisionDifference | null {
  const fromHz = Math.max(before.frequencyHz[0]!, after.frequencyHz[0]!);
  const toHz = Math.min(before.frequencyHz.at(-1)!, after.frequencyHz.at(-1)!);
  const rows = new Set([fromHz, toHz, ...before.frequencyHz, ...after.frequencyHz]);
  const shared = [...rows].filter((hz) => hz >= fromHz && hz <= toHz).sort((a, b) => a - b);
  const points = shared.map((hz) => ({ hz, db: factorAt(after, hz)!.valueDb - factorAt(before, hz)!.valueDb }));
  return differenceOf(points.length > 0 ? [points] : []);
}

/** Inside a stretch where one line runs straight over log f and the other over f, the difference is curved. */
const INSIDE = 8;
/** A step is looked at from both of its sides, this share of the frequency away from it. */
const BESIDE = 2 ** -48;

/**
 * Two limit lines over the stretches that both cover; null where they share none. Steps are taken from both sides, so
 * that a moved band edge shows the difference between its two sides.
 */
export function limitDifference(before: LimitLine, after: LimitLine): RevisionDifference | null {
  const [old, now] = [prepareLine(before), prepareLine(after)];
  const edges = [...new Set([...old.pieces.edgesHz, ...now.pieces.edgesHz])].sort((a, b) => a - b);
  const stretches: RevisionDifference['stretches'] = [];
  for (let i = 0; i + 1 < edges.length; i++) {
    const [from, to] = [edges[i]!, edges[i + 1]!];
    const asked = [from * (1 + BESIDE)];
    for (let k = 1; k < INSIDE; k++) asked.push(from * (to / from) ** (k / INSIDE));
    asked.push(to * (1 - BESIDE));
    const points = asked.flatMap((hz, k) => {
      const [was, is] = [limitOf(old, hz), limitOf(now, hz)];
      if (was === null || is === null) return [];
      return [{ hz: k === 0 ? from : k === INSIDE ? to : hz, db: is - was }];
    });
    if (points.length === 0) continue;
    const open = stretches.at(-1);
    if (open?.at(-1)?.hz === from) open.push(...points);
    else stretches.push(points);
  }
  return differenceOf(stretches);
}
