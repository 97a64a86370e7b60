import { guardFrom } from './guard';
import type { DecisionRule, Verdict } from './kinds';
import { ucisprExcessDb } from './ucispr';
import { decide as judge, type Reach } from './verdict';

/** What a rule can say of one level. */
export type Decided = Extract<Verdict, 'under' | 'inconclusive' | 'over'>;

/** A level beside its limit, in the same unit; what nobody has stated is null. */
export interface DecisionFacts {
  level: number;
  limit: number;
  /** The laboratory's expanded uncertainty (k = 2). */
  expandedUDb: number | null;
  ucisprDb: number | null;
}

export interface Decision {
  /** Null where the rule needs what nobody has stated. */
  verdict: Decided | null;
  /** The level that is compared, with what the rule adds to it; null without a verdict. */
  comparedAs: number | null;
  /** What the rule did, or what it misses, as a sentence. */
  because: string;
}

/**
 * Judges a level by one of three rules. Throws RangeError on figures that are none, and on a rule that is none.
 *
 * - `guarded-by-u`: under where the margin is more than U, over where the level is more than U above the limit,
 *   inconclusive between (ISO/IEC Guide 98-4, JCGM 106:2012; a margin of exactly U is inconclusive).
 * - `cispr-16-4-2`: adds to the level what U is above Ucispr, then compares it with the limit; on the limit is under
 *   (CISPR 16-4-2:2011 clause 4.1).
 * - `simple-acceptance`: compares the level itself; on the limit is under (ILAC-G8:09/2019 4.2.1).
 */
export function decide(rule: DecisionRule, { level, limit, expandedUDb, ucisprDb }: DecisionFacts): Decision {
  if (!Number.isFinite(level) || !Number.isFinite(limit)) {
    throw new RangeError(`A level of ${level} against a limit of ${limit} cannot be judged.`);
  }
  const marginDb = limit - level;
  const verdict = verdictOfMargin(rule, marginDb, expandedUDb, ucisprDb);
  if (verdict === null) return { verdict, comparedAs: null, because: missingFor(rule, expandedUDb) };
  const addedDb = rule === 'cispr-16-4-2' ? ucisprExcessDb(expandedUDb!, ucisprDb!) : 0;
  return { verdict, comparedAs: level + addedDb, because: becauseOf(rule, verdict, addedDb) };
}

/** `decide` for a margin (limit − level) alone; null where the rule needs what is null. Throws as it does. */
export function verdictOfMargin(
  rule: DecisionRule,
  marginDb: number,
  expandedUDb: number | null,
  ucisprDb: number | null,
): Decided | null {
  if (!Number.isFinite(marginDb)) throw new RangeError(`Margin ${marginDb} dB is no figure.`);
  for (const figure of [expandedUDb, ucisprDb]) {
    if (figure !== null && !(figure >= 0 && Number.isFinite(figure))) {
      throw new RangeError(`Expanded uncertainty ${figure} dB is no figure.`);
    }
  }
  const db = askedBy(rule, expandedUDb, ucisprDb);
  return db === null ? null : (judge(DECISIVE, marginDb, guardFrom(rule, db)) as Decided);
}

/** A reading that can show either; what neither settles is inconclusive. */
const DECISIVE: Reach = { under: true, over: true, otherwise: 'inconclusive' };

function askedBy(rule: DecisionRule, expandedUDb: number | null, ucisprDb: number | null): number | null {
  switch (rule) {
    case 'guarded-by-u':
      return expandedUDb;
    case 'cispr-16-4-2':
      return expandedUDb === null || ucisprDb === null ? null : ucisprExcessDb(expandedUDb, ucisprDb);
    case 'simple-acceptance':
      return 0;
    default:
      throw new RangeError(`${String(rule)} is no decision rule.`);
  }
}

function missingFor(rule: DecisionRule, expandedUDb: number | null): string {
  if (expandedUDb === null) return 'The rule needs the expanded uncertainty here, and none is stated.';
  return `The rule ${rule} needs Ucispr for this measurement, and none is stated.`;
}

function becauseOf(rule: DecisionRule, verdict: Decided, addedDb: number): string {
  if (rule === 'guarded-by-u') {
    if (verdict === 'inconclusive') return 'The margin is within the expanded uncertainty.';
    return `The level is ${verdict} the limit by more than the expanded uncertainty.`;
  }
  const place = verdict === 'under' ? 'not over' : 'over';
  if (rule === 'simple-acceptance') return `The level itself is ${place} the limit; uncertainty has no part in it.`;
  if (addedDb > 0) return `With what the uncertainty is above Ucispr added, the level is ${place} the limit.`;
  return `The uncertainty is not above Ucispr, and the level itself is ${place} the limit.`;
}
