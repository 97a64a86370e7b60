import type { CandidateView } from '@/schemas/sweep';
import { formatFrequency, formatFrequencyRange } from '@/format/frequencies';
import { formatLevel, formatMargin } from '@/format/quantities';
import { countInWords, DETECTOR_WORDS, VERDICT_WORDS } from '@/format/words';
import type { LineUnit } from '@/emc/kinds';
import type { ChartMode } from './marginSeries';
import type { Span } from './scale';

/** The one sentence that stands for the chart; the table beside it is its text form. */
export function describeChart(
  mode: ChartMode,
  whole: Span,
  limitName: string,
  candidates: readonly CandidateView[],
  total: number,
  measured: boolean,
): string {
  const what = mode === 'margin' ? 'Margin' : 'Level';
  const range = formatFrequencyRange(whole.fromHz, whole.toHz);
  const against = `${what} against ${limitName}, ${range}`;
  if (!measured) return `${against}: nothing is measured yet.`;
  const worst = candidates[0];
  if (!worst) return `${against}: no candidates.`;
  const count = total === 1 ? 'one candidate' : `${countInWords(total)} candidates`;
  const place = `${formatFrequency(worst.frequencyHz)}, ${formatMargin(worst.marginDb)}, ${VERDICT_WORDS[worst.verdict]}`;
  return `${against}: ${count}, the worst at ${place}.`;
}

/** What a candidate's mark says of itself. */
export function describeCandidate(candidate: CandidateView, unit: LineUnit): string {
  const where =
    candidate.kind === 'floor'
      ? `noise floor ${formatFrequencyRange(candidate.fromHz, candidate.toHz)}, worst at `
      : '';
  return [
    `Candidate ${candidate.rank}`,
    `${where}${formatFrequency(candidate.frequencyHz)}`,
    DETECTOR_WORDS[candidate.detector],
    formatLevel(candidate.level, unit),
    formatMargin(candidate.marginDb),
    VERDICT_WORDS[candidate.verdict],
  ].join(', ');
}
