import type { Contribution } from './budget';

/** What lies between source and load, as magnitudes of its S-parameters, 0 to 1. A cable alone: 0, 0 and its loss. */
export interface TwoPort {
  s11: number;
  s21: number;
  s22: number;
}

/** How far a mismatch can move a level either way; the bounds are not symmetric. */
export interface MismatchBounds {
  plusDb: number;
  /** Below zero, and further from it than `plusDb`. */
  minusDb: number;
}

/** Nothing in between. */
const THROUGH: TwoPort = { s11: 0, s21: 1, s22: 0 };

/**
 * Bounds of the mismatch error between two reflection coefficients, as magnitudes from 0 to below 1:
 * 20 log10(1 ± |Γs||Γl|) (LAB34 3.4.3), and through a passive two-port
 * 20 log10(1 ± (|Γs||S11| + |Γl||S22| + |Γs||Γl||S11||S22| + |Γs||Γl||S21|²)) (CISPR 16-4-2 Annex A, from memory).
 * Throws RangeError on a magnitude outside, and where the sum reaches 1 and leaves no lower bound.
 */
export function mismatchBounds(sourceReflection: number, loadReflection: number, between = THROUGH): MismatchBounds {
  for (const reflection of [sourceReflection, loadReflection]) {
    if (!(reflection >= 0 && reflection < 1)) throw new RangeError(`A reflection of ${reflection} is none below 1.`);
  }
  const { s11, s21, s22 } = between;
  for (const s of [s11, s21, s22]) if (!(s >= 0 && s <= 1)) throw new RangeError(`|S| = ${s} is not passive.`);
  const both = sourceReflection * loadReflection;
  const error = sourceReflection * s11 + loadReflection * s22 + both * s11 * s22 + both * s21 * s21;
  if (error >= 1) throw new RangeError(`Reflections that add up to ${error} leave no lower bound.`);
  return { plusDb: 20 * Math.log10(1 + error), minusDb: 20 * Math.log10(1 - error) };
}

/** A mismatch as a contribution: U-shaped, by the larger of its bounds. Source: LAB34 3.4.3. */
export function mismatchContribution(name: string, bounds: MismatchBounds, source: string): Contribution {
  const valueDb = Math.max(bounds.plusDb, -bounds.minusDb);
  return { name, valueDb, distribution: { shape: 'U-shaped' }, sensitivity: 1, source };
}

/** |Γ| = (VSWR − 1) / (VSWR + 1). Source: definition. Throws RangeError below 1. */
export function reflectionFromVswr(vswr: number): number {
  if (!(vswr >= 1 && Number.isFinite(vswr))) throw new RangeError(`A VSWR of ${vswr} is none.`);
  return (vswr - 1) / (vswr + 1);
}

/** Return loss −20 log10 |Γ|; null for a perfect match, which returns nothing. Throws RangeError outside 0 to 1. */
export function returnLossDb(reflection: number): number | null {
  if (!(reflection >= 0 && reflection <= 1)) throw new RangeError(`A reflection of ${reflection} is none.`);
  return reflection === 0 ? null : -20 * Math.log10(reflection);
}
