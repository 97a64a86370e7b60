import type { Detector, LineDetector, Verdict } from '@/emc/kinds';
import type { Candidate, CoverageGap } from '@/emc/types';
import { formatFrequency } from './frequencies';
import { formatUncertainty, marginText } from './quantities';
import { capitalised, countInWords, DETECTOR_WORDS, LINE_WORDS } from './words';

/** A stretch of the finding sentence: words, or a figure with its unit (set in mono; the governing one `strong`). */
export interface FindingRun {
  text: string;
  figure?: boolean;
  strong?: boolean;
  /** What a person has to know beside the verdict; ochre. */
  remark?: boolean;
}

type Worst = Pick<
  Candidate,
  'kind' | 'traceIndex' | 'lineId' | 'frequencyHz' | 'fromHz' | 'toHz' | 'marginDb' | 'uncertaintyDb' | 'verdict'
>;

/** The part of an evaluation that the sentence is made of; `counts` counts candidates by their verdict. */
export interface FindingEvaluation {
  verdict: Verdict;
  counts: Partial<Record<Verdict, number>>;
  worst: Worst | null;
  gaps: readonly Pick<CoverageGap, 'fromHz' | 'toHz' | 'because'>[];
}

export interface FindingTrace {
  index: number;
  detector: Detector;
}
export interface FindingLine {
  id: string;
  detector: LineDetector;
}

const GAP_WORDS: Record<CoverageGap['because'], string> = {
  'no-trace': 'no trace is judged there',
  'no-factor': 'a factor is missing there',
  'no-uncertainty': 'the uncertainty is not known there',
  partial: 'the file breaks off and was kept in part',
  gap: 'the sweep has a hole there, or steps wider than the RBW',
};

const plain = (text: string): FindingRun => ({ text });
const figure = (text: string): FindingRun => ({ text, figure: true });
const strong = (text: string): FindingRun => ({ text, figure: true, strong: true });

/**
 * The sentence a sweep sheet opens with: the governing emission first, then what else waits, then what is settled, then
 * what is not covered. `Over by 6.2 dB at 144.018 MHz. Three more need a final; eight are under.`
 */
export function findingOf(
  evaluation: FindingEvaluation,
  traces: readonly FindingTrace[],
  lines: readonly FindingLine[],
): FindingRun[] {
  return joined([
    opening(evaluation, traces, lines),
    others(evaluation),
    evaluation.verdict === 'not-covered' ? [] : uncovered(evaluation.gaps),
  ]);
}

/** The same sentence as one string, for a title, an e-mail or a screen reader. */
export function findingText(runs: readonly FindingRun[]): string {
  return runs.map((run) => run.text).join('');
}

function opening(
  { verdict, worst, gaps }: FindingEvaluation,
  traces: readonly FindingTrace[],
  lines: readonly FindingLine[],
): FindingRun[] {
  if (verdict === 'not-covered') return coverageFirst(worst, gaps);
  if (!worst) return [plain(`${capitalised(WORDLESS[verdict])}.`)];
  const { figure: size, word } = marginText(worst.marginDb);
  const amount = word === 'on the limit' ? plain(word) : strong(`${size} dB`);
  const limit = lines.length > 1 ? limitOf(worst, lines) : '';
  const where = place(worst);
  if (verdict === 'over' || verdict === 'under') {
    const lead = capitalised(verdict);
    if (word === 'on the limit') return [plain(`${lead}, on the limit `), ...where, plain(`${limit}.`)];
    return [plain(`${lead} by `), amount, plain(' '), ...where, plain(`${limit}.`)];
  }
  const position = word === 'on the limit' ? [plain('On the limit ')] : [amount, plain(` ${word} `)];
  if (verdict === 'inconclusive')
    return [
      ...position,
      ...where,
      plain(`${limit}, within `),
      figure(formatUncertainty(worst.uncertaintyDb)),
      plain(': inconclusive.'),
    ];
  const trace = traces.find(({ index }) => index === worst.traceIndex);
  const reading =
    trace && trace.detector !== 'unknown' ? `in ${DETECTOR_WORDS[trace.detector]}` : 'with a detector not stated';
  return [...position, ...where, plain(`${limit} ${reading}: this needs a final.`)];
}

/** Said when nothing stood out enough to be a candidate. */
const WORDLESS: Record<Exclude<Verdict, 'not-covered'>, string> = {
  over: 'over the limit',
  'needs-final': 'a final is needed before anything can be said',
  inconclusive: 'inconclusive',
  under: 'under the limit throughout',
};

function coverageFirst(worst: Worst | null, gaps: FindingEvaluation['gaps']): FindingRun[] {
  const ranges = distinct(gaps);
  const [first] = ranges;
  const head: FindingRun[] = !first
    ? [plain('Not covered.')]
    : ranges.length === 1
      ? [plain('Not covered from '), ...span(first), plain(`: ${GAP_WORDS[first.because]}.`)]
      : [
          plain(`Not covered in ${countInWords(ranges.length)} ranges, the first from `),
          ...span(first),
          plain(`: ${GAP_WORDS[first.because]}.`),
        ];
  if (!worst) return head;
  const { figure: size, word } = marginText(worst.marginDb);
  const amount = word === 'on the limit' ? [plain(word)] : [strong(`${size} dB`), plain(` ${word}`)];
  return [...head, plain(' What was measured is closest '), ...place(worst), plain(', '), ...amount, plain('.')];
}

/** `Three more need a final; eight are under.` The governing candidate is not counted again. */
function others({ verdict, counts, worst }: FindingEvaluation): FindingRun[] {
  const left = (of: Verdict) => Math.max(0, (counts[of] ?? 0) - (worst && worst.verdict === of ? 1 : 0));
  const clauses: string[] = [];
  const say = (count: number, more: boolean, one: string, many: string) => {
    if (count > 0)
      clauses.push(`${countInWords(count)}${more && clauses.length === 0 ? ' more' : ''} ${count === 1 ? one : many}`);
  };
  const governed = worst !== null && verdict !== 'not-covered';
  say(left('over'), governed, 'is over', 'are over');
  say(left('needs-final'), governed, 'needs a final', 'need a final');
  say(left('inconclusive'), governed, 'is inconclusive', 'are inconclusive');
  say(left('under'), governed && verdict === 'under', 'is under', 'are under');
  return clauses.length === 0 ? [] : [plain(`${capitalised(clauses.join('; '))}.`)];
}

function uncovered(gaps: FindingEvaluation['gaps']): FindingRun[] {
  const ranges = distinct(gaps);
  const [first] = ranges;
  if (!first) return [];
  if (ranges.length > 1) return [plain(`${capitalised(countInWords(ranges.length))} ranges are not covered.`)];
  return [...span(first), plain(' is not covered.')];
}

/** One range may be missing for several lines; the reader is told of it once. */
function distinct(gaps: FindingEvaluation['gaps']): FindingEvaluation['gaps'] {
  return gaps.filter(
    ({ fromHz, toHz }, at) => gaps.findIndex((gap) => gap.fromHz === fromHz && gap.toHz === toHz) === at,
  );
}

function span({ fromHz, toHz }: { fromHz: number; toHz: number }): FindingRun[] {
  return [figure(formatFrequency(fromHz)), plain(' to '), figure(formatFrequency(toHz))];
}

function place(worst: Worst): FindingRun[] {
  return worst.kind === 'floor'
    ? [plain('in the noise floor from '), ...span(worst)]
    : [plain('at '), figure(formatFrequency(worst.frequencyHz))];
}

function limitOf(worst: Worst, lines: readonly FindingLine[]): string {
  const line = lines.find(({ id }) => id === worst.lineId);
  return line ? ` against the ${LINE_WORDS[line.detector]}` : '';
}

function joined(sentences: FindingRun[][]): FindingRun[] {
  return sentences.filter((runs) => runs.length > 0).flatMap((runs, at) => (at === 0 ? runs : [plain(' '), ...runs]));
}
