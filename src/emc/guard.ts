import type { DecisionRule } from './kinds';
import { EQUAL_WITHIN_DB } from './guardBand';
import type { UncertaintyStep } from './types';
import { ucisprExcessDb } from './ucispr';
import { expandedAt } from './uncertainty';

/** What a rule asks of a margin at one frequency. */
export interface Guard {
  /** Under where the margin is larger. */
  db: number;
  /** Whether the rule leaves inconclusive what is neither more than `db` under nor more than `db` over. */
  between: boolean;
}

/** Guarded by U is the only rule that leaves anything between under and over. */
export const leavesBetween = (rule: DecisionRule): boolean => rule === 'guarded-by-u';

/**
 * What a rule adds to every level over frequency, before it is compared: U less Ucispr where U is the larger, by CISPR
 * 16-4-2; nothing by simple acceptance. Nowhere where either is not stated. The steps of `guarded-by-u` are U itself.
 */
export function guardSteps(
  rule: DecisionRule,
  uncertainty: readonly UncertaintyStep[],
  ucispr: readonly UncertaintyStep[],
): readonly UncertaintyStep[] {
  if (rule === 'guarded-by-u') return uncertainty;
  if (rule === 'simple-acceptance') return uncertainty.map((step) => ({ ...step, expandedDb: 0 }));
  return uncertainty.flatMap((own) =>
    ucispr.flatMap((published) => {
      const startHz = Math.max(own.startHz, published.startHz);
      const stopHz = Math.min(own.stopHz, published.stopHz);
      if (!(startHz < stopHz)) return [];
      return [{ startHz, stopHz, expandedDb: ucisprExcessDb(own.expandedDb, published.expandedDb) }];
    }),
  );
}

/** What a rule adds to a level at one frequency, dB; null where it misses a figure. */
export function addedAt(
  rule: DecisionRule,
  uncertainty: readonly UncertaintyStep[],
  ucispr: readonly UncertaintyStep[],
  frequencyHz: number,
): number | null {
  const db = expandedAt(guardSteps(rule, uncertainty, ucispr), frequencyHz);
  return db !== null && leavesBetween(rule) ? 0 : db;
}

/** The guard of what a rule asks or adds, dB. A level on the limit, as near as a reading is kept, is not over it. */
export function guardFrom(rule: DecisionRule, db: number): Guard {
  return leavesBetween(rule) ? { db, between: true } : { db: db - EQUAL_WITHIN_DB, between: false };
}

/** The guard at one frequency; null where the rule has none. */
export function guardAt(
  rule: DecisionRule,
  uncertainty: readonly UncertaintyStep[],
  ucispr: readonly UncertaintyStep[],
  frequencyHz: number,
): Guard | null {
  const db = expandedAt(guardSteps(rule, uncertainty, ucispr), frequencyHz);
  return db === null ? null : guardFrom(rule, db);
}
