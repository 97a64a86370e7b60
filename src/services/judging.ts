import type { DecisionRule, Port, Purpose } from '@/emc/kinds';
import { ucisprSteps } from '@/emc/ucispr';
import type { SignalPathRevision } from '@/models/signalPathRevision';
import type { LimitLineView } from '@/schemas/sweep';
import type { Judging } from './importTasks';
import { toCoreLine } from './limitSets';
import type { LoadedTerm } from './signalPaths';

/** What a reading is judged with; whoever previews, keeps, judges again or shows a Working puts it together here. */
export interface JudgedWith {
  /** null without a path: then the uncertainty is unknown and nothing is concluded. */
  revision: Pick<SignalPathRevision, 'uncertainty'> | null;
  terms: readonly LoadedTerm[];
  lines: readonly LimitLineView[];
  purpose: Purpose;
  port: Port;
  rule: DecisionRule;
  partial?: boolean;
}

export function judgingOf({ revision, terms, lines, purpose, port, rule, partial = false }: JudgedWith): Judging {
  return {
    terms: terms.map(({ term }) => term),
    lines: lines.map(toCoreLine),
    uncertainty: revision?.uncertainty ?? { prescan: [], final: [] },
    purpose,
    port,
    rule,
    ucispr: ucisprSteps(port),
    partial,
  };
}
