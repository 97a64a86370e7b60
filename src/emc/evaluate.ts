import { axisRange, axisSteps, onAxis } from './axis';
import { candidatesOf, LISTED_AT_LEAST, rankCandidates, type Unranked } from './candidates';
import { columnAccumulator, LAYER_COLUMNS } from './columns';
import { gapsOf, spansOf, type Span } from './coverage';
import { guardSteps, leavesBetween } from './guard';
import { VERDICTS, type Purpose, type Verdict } from './kinds';
import { prepareLine, type PreparedLine } from './limitLine';
import { POINTS_PER_TURN } from './pace';
import { JUDGED, judgeInto, pairPoints, type PairPoints, type PreparedGuard } from './pair';
import { tracesFor, type PairableTrace } from './pairing';
import { governed } from './repeats';
import { findCandidates } from './search';
import { hangTrace, judgeSegment, logarithmsInto, type HungTrace } from './segment';
import type { Columns, Evaluation, EvaluationInput, JudgedPair, LimitLine, Trace } from './types';
import { prepareUncertainty } from './uncertainty';
import { reachOf, worstVerdict } from './verdict';

/** Named in every evaluation. A change that moves any figure or verdict raises the number. */
export const ENGINE = 'stillfield-emc 2';

/**
 * Evaluates one run: levels, margins, verdicts, candidates, coverage and the layer each trace is drawn from. Yields
 * about every 16384 points and returns the evaluation; the same input gives the same bits however it is paced.
 *
 * The verdict is the worst of the candidates and of the gaps (not covered); an ambient run, or one without a limit
 * line, is not covered. A partial run is never under and leaves all of its lines open. `counts` counts candidates by verdict, and every gap as not covered.
 * What a file can hold never throws: a reading that is no finite figure, and a point at 0 Hz, below or at none, is not
 * read. Throws RangeError on tables, lines, paths or uncertainties that cannot be used.
 */
export function* evaluate(input: EvaluationInput): Generator<void, Evaluation> {
  const steps = input.purpose === 'final' ? input.uncertainty.final : input.uncertainty.prescan;
  const guarded: PreparedGuard = {
    uncertainty: prepareUncertainty(steps),
    guard: leavesBetween(input.rule) ? null : prepareUncertainty(guardSteps(input.rule, steps, input.ucispr ?? [])),
  };
  const sweeps = input.traces.map((trace) => sweepOf(trace, input));
  const asked = input.lines.map((line) => ({ line: prepareLine(line), by: tracesFor(line, sweeps) }));

  const judgements: PairJudgement[] = [];
  const layers: Columns[] = [];
  const axes = new Map<Float64Array, SharedAxis>();
  for (const sweep of sweeps) {
    const lines = asked.filter(({ by }) => by.includes(sweep)).map(({ line }) => line);
    const { frequencyHz } = sweep.trace;
    const axis = axes.get(frequencyHz) ?? { logHz: new Float64Array(frequencyHz.length), known: 0, steps: new Map() };
    axes.set(frequencyHz, axis);
    layers.push(yield* judgeSweep(sweep, axis, lines, guarded, input, judgements));
  }

  const of = (line: LimitLine) => judgements.filter((judgement) => judgement.line === line);
  const gaps = input.lines.flatMap((line) =>
    gapsOf(
      line,
      of(line).flatMap(({ spans }) => spans),
      input.partial,
    ),
  );
  const pairs = input.lines.flatMap((line) => of(line).map(({ pair }) => pair));
  const candidates = rankCandidates(
    judgements.flatMap(({ open }) => open),
    judgements.flatMap(({ others }) => others),
  );
  const counts = Object.fromEntries(VERDICTS.map((verdict) => [verdict, 0])) as Record<Verdict, number>;
  for (const { verdict } of candidates) counts[verdict]++;
  counts['not-covered'] += gaps.length;
  const uncovered: Verdict[] = gaps.length > 0 ? ['not-covered'] : [];
  const worst = worstVerdict([...candidates.map((candidate) => candidate.verdict), ...uncovered]) ?? 'not-covered';
  // Of a partial run no candidate is under; this holds where it has neither candidate nor gap to say so.
  const verdict = input.partial && worst === 'under' ? 'not-covered' : worst;
  return { engine: ENGINE, verdict, counts, pairs, candidates, gaps, layers };
}

/** `evaluate` in one go. */
export function evaluateNow(input: EvaluationInput): Evaluation {
  const run = evaluate(input);
  for (;;) {
    const step = run.next();
    if (step.done) return step.value;
  }
}

/** A trace with its path and its range; an empty one has no range and reaches no line. */
interface Sweep extends PairableTrace {
  trace: Trace;
  hung: HungTrace;
}

function sweepOf(given: Trace, { terms, lines }: EvaluationInput): Sweep {
  const trace = onAxis(given);
  const hung = hangTrace(trace, terms, lines);
  const range = axisRange(trace.frequencyHz) ?? { lowestHz: Infinity, highestHz: 0 };
  return { trace, hung, index: trace.index, detector: trace.detector, levelUnit: hung.levelUnit, ...range };
}

/** What one trace shows about one line. */
interface PairJudgement {
  line: LimitLine;
  pair: JudgedPair;
  open: Unranked[];
  others: Unranked[];
  spans: Span[];
}

/** What the traces of one axis need not compute again. */
interface SharedAxis {
  /** Natural logarithms of its first `known` frequencies. */
  logHz: Float64Array;
  known: number;
  /** By bandwidth. */
  steps: Map<number, Uint8Array>;
}

function stepsOf({ steps }: SharedAxis, frequencyHz: Float64Array, bandwidthHz: number): Uint8Array {
  const before = steps.get(bandwidthHz) ?? axisSteps(frequencyHz, bandwidthHz);
  steps.set(bandwidthHz, before);
  return before;
}

/** Judges a trace against its lines, appending a judgement for each; returns the layer it is drawn from. */
function* judgeSweep(
  { trace, hung, lowestHz, highestHz }: Sweep,
  axis: SharedAxis,
  lines: readonly PreparedLine[],
  guarded: PreparedGuard,
  kind: { purpose: Purpose; partial?: boolean },
  judgements: PairJudgement[],
): Generator<void, Columns> {
  const { frequencyHz, reading } = trace;
  const points = reading.length;
  const layer = points > 0 ? columnAccumulator(lowestHz, highestHz, LAYER_COLUMNS) : columnAccumulator(1, 1, 1);
  const pairs = lines.map((line) => {
    const bandwidthHz = trace.rbwHz ?? line.line.bandwidthHz;
    return {
      line,
      bandwidthHz,
      points: pairPoints(frequencyHz, stepsOf(axis, frequencyHz, bandwidthHz), guarded.guard === null),
    };
  });
  for (let from = 0; from < points; from += POINTS_PER_TURN) {
    const to = Math.min(from + POINTS_PER_TURN, points);
    const hz = frequencyHz.subarray(from, to);
    const logHz = axis.logHz.subarray(from, to);
    if (axis.known < to) logarithmsInto(logHz, hz);
    axis.known = Math.max(axis.known, to);
    const segment = judgeSegment(hung, hz, reading.subarray(from, to), logHz);
    layer.add(segment);
    for (const pair of pairs) judgeInto(pair.points, segment, pair.line, guarded, from);
    yield;
  }
  for (const pair of pairs) {
    const { line } = pair.line;
    const reach = reachOf(trace, line, kind.purpose);
    const places = yield* findCandidates(pair.points, reach, pair.bandwidthHz, LISTED_AT_LEAST);
    const found = yield* governed(pair.points, places);
    const { open, others } = candidatesOf(found, trace, hung, pair.line, pair.points, kind);
    yield;
    const spans = yield* spansOf(pair.points, trace.rbwHz);
    const judged = { traceIndex: trace.index, lineId: line.id, ...worstOf(pair.points) };
    judgements.push({ line, pair: judged, open, others, spans });
  }
  return layer.finish();
}

// Held as locals: a bundler may turn an imported name into a getter, which a loop over a million points would feel.
const { yes, noUncertainty } = JUDGED;

/** Points that have a level and a limit, and the worst of them; uncertainty has no part in a margin. */
function worstOf(pair: PairPoints): Pick<JudgedPair, 'points' | 'worstMarginDb' | 'worstFrequencyHz'> {
  let points = 0;
  let worst = -1;
  for (let i = 0; i < pair.judged.length; i++) {
    if (pair.judged[i] !== yes && pair.judged[i] !== noUncertainty) continue;
    points++;
    if (worst < 0 || pair.marginDb[i]! < pair.marginDb[worst]!) worst = i;
  }
  if (worst < 0) return { points, worstMarginDb: null, worstFrequencyHz: null };
  return { points, worstMarginDb: pair.marginDb[worst]!, worstFrequencyHz: pair.frequencyHz[worst]! };
}
