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

/** The traces of a run, each with the line it hangs from. `range` is that of the axis they share. */
export function traceViews(
  heads: readonly Omit<SweepView['traces'][number], 'lineId'>[],
  range: { firstHz: number; lastHz: number },
  { terms, lines }: Pick<EvaluationInput, 'terms' | 'lines'>,
): SweepView['traces'] {
  return heads.map(({ index, name, detector, unit, rbwHz }) => {
    const { levelUnit } = preparePath(unit, terms);
    const { firstHz: lowestHz, lastHz: highestHz } = range;
    const line = ownLine({ index, detector, levelUnit, lowestHz, highestHz }, lines);
    return { index, name, detector, unit, rbwHz, lineId: line?.id ?? null };
  });
}
