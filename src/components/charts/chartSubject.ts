import type { LimitLineView, SweepView } from '@/schemas/sweep';
import type { Detector } from '@/emc/kinds';

/** What a chart needs to know of a run besides its points. An upload that is not kept yet has one too. */
export interface ChartSubject {
  firstHz: number;
  lastHz: number;
  stepHz: number | null;
  limitName: string;
  lines: readonly LimitLineView[];
  traces: SweepView['traces'];
  /** U where the rule is guarded by it. */
  uncertainty: SweepView['evaluation']['uncertainty'];
  gaps: SweepView['evaluation']['gaps'];
  /** `H`, `V`, `L1`…, for the tooltip; empty when it does not apply. */
  orientation: string;
  /** Of a file that breaks off: the range that was not read, shaded. */
  notRead?: { fromHz: number; toHz: number };
}

export function chartSubject(
  sweep: Pick<SweepView, 'firstHz' | 'lastHz' | 'stepHz' | 'limitSet' | 'traces' | 'evaluation'>,
  orientation: string,
): ChartSubject {
  return {
    firstHz: sweep.firstHz,
    lastHz: sweep.lastHz,
    stepHz: sweep.stepHz,
    limitName: sweep.limitSet.name,
    lines: sweep.limitSet.lines,
    traces: sweep.traces,
    uncertainty: leftBetween(sweep.evaluation),
    gaps: sweep.evaluation.gaps,
    orientation,
  };
}

/** The band about the limit within which nothing is concluded; a rule that always decides leaves none. */
export function leftBetween({
  decisionRule,
  uncertainty,
}: Pick<SweepView['evaluation'], 'decisionRule' | 'uncertainty'>): ChartSubject['uncertainty'] {
  return decisionRule === 'guarded-by-u' ? uncertainty : [];
}

const UPPERMOST: Detector[] = ['peak', 'quasi-peak'];

/** The trace drawn in ink and filled: the one whose detector reads highest, else the first. */
export function leadingTrace(traces: SweepView['traces']): number | null {
  const leading = UPPERMOST.map((detector) => traces.find((trace) => trace.detector === detector)).find(Boolean);
  return (leading ?? traces[0])?.index ?? null;
}

/** Stretches of the run without points: no line is drawn across them. */
export function holesOf(subject: ChartSubject): { fromHz: number; toHz: number }[] {
  return subject.gaps.filter((gap) => gap.because === 'gap' || gap.because === 'no-trace');
}
