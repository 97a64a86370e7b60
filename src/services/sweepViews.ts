import { ownLine } from '@/emc/pairing';
import type { Candidate, Columns, EvaluationInput, Trace } from '@/emc/types';
import { preparePath } from '@/emc/correction';
import type { CandidateView, SweepView, WindowView } from '@/schemas/sweep';

/** Columns as the API answers them: a margin is null where there is no limit. */
export function columnsView(index: number, columns: Columns): WindowView['traces'][number] {
  const margin = (values: Float32Array) => Array.from(values, (value, i) => (columns.hasMargin[i] ? value : null));
  return {
    index,
    frequencyHz: [...columns.frequencyHz],
    levelMin: [...columns.levelMin],
    levelMax: [...columns.levelMax],
    marginMin: margin(columns.marginMin),
    marginMax: margin(columns.marginMax),
  };
}

export function candidateOf(candidate: Candidate, traces: readonly Pick<Trace, 'index' | 'detector'>[]): CandidateView {
  const trace = traces.find(({ index }) => index === candidate.traceIndex)!;
  return { ...candidate, detector: trace.detector };
}

export function traceViews(input: EvaluationInput): SweepView['traces'] {
  return input.traces.map(({ index, name, detector, unit, rbwHz, frequencyHz }) => {
    const { levelUnit } = preparePath(unit, input.terms);
    const lowestHz = frequencyHz.reduce((low, f) => Math.min(low, f), Infinity);
    const highestHz = frequencyHz.reduce((high, f) => Math.max(high, f), 0);
    const line = ownLine({ index, detector, levelUnit, lowestHz, highestHz }, input.lines);
    return { index, name, detector, unit, rbwHz, lineId: line?.id ?? null };
  });
}
