import { budgetOf } from '@/emc/budget';
import { prescanBelowFinal, uncertaintySteps } from '@/emc/budgetSteps';
import type { LineUnit, Port } from '@/emc/kinds';
import { besideUcispr, type BesideUcispr } from '@/emc/ucispr';
import { Invalid, type Issue } from '@/errors';
import type { SignalPathRevision } from '@/models/signalPathRevision';
import type { StoredBudget, StoredUncertainty } from '@/models/stored';
import type { UncertaintyView } from '@/schemas/paths';

/** What a level on a port is stated in. */
const QUANTITIES: Record<Port, LineUnit> = { enclosure: 'dBuV/m', 'ac-mains': 'dBuV', 'wired-network': 'dBuV' };
export const PURPOSES_WITH_U = ['prescan', 'final'] as const;

/**
 * The steps that a budget gives. Throws Invalid, with every place at once, on ranges that overlap and where the prescan
 * claims to be more certain than the final.
 */
export function stepsOf(budget: StoredBudget, port: Port, pathId: string): StoredUncertainty {
  const issues: Issue[] = [];
  const steps: StoredUncertainty = { prescan: [], final: [] };
  for (const purpose of PURPOSES_WITH_U) {
    const claims = budget[purpose].map((range) => ({ ...range, pathId, quantity: QUANTITIES[port] }));
    const twice = overlapIn(claims);
    if (twice) issues.push({ pointer: `/budget/${purpose}`, message: twice });
    else steps[purpose] = uncertaintySteps(claims);
  }
  if (issues.length === 0) issues.push(...belowFinal(steps));
  if (issues.length > 0) throw new Invalid(issues);
  return steps;
}

function overlapIn(ranges: readonly { startHz: number; stopHz: number }[]): string | null {
  const ascending = [...ranges].sort((a, b) => a.startHz - b.startHz);
  for (const [i, range] of ascending.entries()) {
    const before = ascending[i - 1];
    if (!before || range.startHz >= before.stopHz) continue;
    return `has two budgets ${stretch(range.startHz, Math.min(before.stopHz, range.stopHz))}`;
  }
  return null;
}

function belowFinal({ prescan, final }: StoredUncertainty): Issue[] {
  return prescanBelowFinal(prescan, final).map(({ fromHz, toHz, prescanDb, finalDb }) => ({
    pointer: '/budget/prescan',
    message:
      `is below the final ${stretch(fromHz, toHz)}: ${prescanDb.toFixed(2)} dB against ` +
      `${finalDb.toFixed(2)} dB. A prescan leaves out what a final contains, so it is never more certain`,
  }));
}

const stretch = (fromHz: number, toHz: number) =>
  fromHz === toHz ? `at ${fromHz / 1e6} MHz` : `from ${fromHz / 1e6} to ${toHz / 1e6} MHz`;

/** Each stated or computed step of a revision with its budget and its place beside Ucispr, prescan first. */
export function uncertaintyViews({ uncertainty, budget }: SignalPathRevision, port: Port): UncertaintyView[] {
  return PURPOSES_WITH_U.flatMap((purpose) =>
    uncertainty[purpose].map((step): UncertaintyView => {
      const { startHz, stopHz } = step;
      const range = budget?.[purpose].find((one) => one.startHz === startHz && one.stopHz === stopHz);
      return {
        purpose,
        ...step,
        budget: range ? computed(range.contributions) : null,
        ucispr: besideUcispr(step, port).map(forReader),
      };
    }),
  );
}

function computed(contributions: StoredBudget['final'][number]['contributions']): UncertaintyView['budget'] {
  const { rows, ...result } = budgetOf(contributions);
  return {
    ...result,
    rows: rows.map(({ contribution, ...row }) => {
      return { ...contribution, degreesOfFreedom: contribution.degreesOfFreedom ?? null, ...row };
    }),
  };
}

function forReader({ fromHz, toHz, measurement, edition, ucisprDb, excessDb }: BesideUcispr) {
  return { fromHz, toHz, measurement, edition, ucisprDb, excessDb };
}
