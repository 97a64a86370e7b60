import { budgetOf, type Contribution } from './budget';
import type { LineUnit } from './kinds';
import { piecesOf } from './pieces';
import type { UncertaintyStep } from './types';
import { expandedAt } from './uncertainty';

/** The budget of one signal path for one quantity over one range of frequency. */
export interface UncertaintyBudget {
  pathId: string;
  /** The quantity, by the unit of its level. */
  quantity: LineUnit;
  startHz: number;
  stopHz: number;
  contributions: readonly Contribution[];
}

/**
 * The expanded uncertainty of one path and quantity as steps over frequency, ascending; outside every budget there is
 * none. Ranges may share an edge. Throws RangeError where ranges overlap, where budgets are of more than one path or
 * quantity, and as `budgetOf` does.
 */
export function uncertaintySteps(budgets: readonly UncertaintyBudget[]): UncertaintyStep[] {
  piecesOf(budgets, 'Budget');
  const ascending = [...budgets].sort((a, b) => a.startHz - b.startHz);
  ascending.forEach((budget, i) => {
    const before = ascending[i - 1];
    if (!before) return;
    if (budget.pathId !== before.pathId || budget.quantity !== before.quantity) {
      const both = `${before.pathId} in ${before.quantity} and ${budget.pathId} in ${budget.quantity}`;
      throw new RangeError(`Budgets of ${both} are not of one path and quantity.`);
    }
    if (budget.startHz < before.stopHz) {
      throw new RangeError(`Two budgets claim ${budget.startHz} to ${Math.min(before.stopHz, budget.stopHz)} Hz.`);
    }
  });
  return ascending.map(({ startHz, stopHz, contributions }) => {
    return { startHz, stopHz, expandedDb: budgetOf(contributions).expandedDb };
  });
}

/** A stretch where the prescan claims to be more certain than the final; a single frequency where both ends are one. */
export interface PrescanBelowFinal {
  fromHz: number;
  toHz: number;
  prescanDb: number;
  finalDb: number;
}

/**
 * Where the uncertainty stated for a prescan is below that for a final, ascending; empty when it nowhere is. A final
 * contains what a prescan leaves out (maximising, the detector's own time), so such a statement is an error. Where
 * either is unknown nothing is said. Throws RangeError on steps that cannot be used.
 */
export function prescanBelowFinal(
  prescan: readonly UncertaintyStep[],
  final: readonly UncertaintyStep[],
): PrescanBelowFinal[] {
  const { edgesHz } = piecesOf([...prescan, ...final], 'Uncertainty');
  const below: PrescanBelowFinal[] = [];
  const look = (fromHz: number, toHz: number) => {
    const prescanDb = expandedAt(prescan, (fromHz + toHz) / 2);
    const finalDb = expandedAt(final, (fromHz + toHz) / 2);
    if (prescanDb === null || finalDb === null || prescanDb >= finalDb) return;
    const last = below[below.length - 1];
    const follows = last !== undefined && last.toHz === fromHz;
    if (follows && fromHz === toHz) return;
    if (follows && last.prescanDb === prescanDb && last.finalDb === finalDb) last.toHz = toHz;
    else below.push({ fromHz, toHz, prescanDb, finalDb });
  };
  edgesHz.forEach((hz, i) => {
    look(hz, hz);
    const next = edgesHz[i + 1];
    if (next !== undefined) look(hz, next);
  });
  return below;
}
