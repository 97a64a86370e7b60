import { isFrequency } from './axis';
import { POINT } from './correction';
import { limitAt } from './limitLine';
import { hangTrace, judgeSegment, type HungTrace } from './segment';
import type { EvaluationInput, LimitLine, Trace, Working } from './types';
import { addedAt, guardAt, type Guard } from './guard';
import { expandedAt } from './uncertainty';
import { readingVerdict } from './verdict';
import { noFactorBecause, pathTerms, readingTerms } from './workingTerms';

/**
 * The column addition behind one figure: the measured point of a trace nearest to a frequency, its reading, every term
 * of its path (those not applied too, with their figure), the level, and the margin to a line: the one asked for, or
 * the first the trace hangs from that has a limit there. Where several points are equally near (joined pieces, two
 * passes over one range, the middle of a step) the one with the smallest margin is shown: it governs, and a candidate
 * at its frequency came from it. `pointIndex` addresses a point of the trace exactly instead, from 0 in file order.
 *
 * The applied terms, added in their order, give exactly the level `evaluate` computed. A term whose table has no value
 * there has no figure and is left out; when it was to be applied the level is null and `because` names it.
 * Throws RangeError when the trace, the point or the line is not in the input, or no point has a frequency.
 */
export function workingAt(
  input: EvaluationInput,
  traceIndex: number,
  frequencyHz: number,
  lineId?: string,
  pointIndex?: number,
): Working {
  const trace = input.traces.find((one) => one.index === traceIndex);
  if (!trace) throw new RangeError(`There is no trace ${traceIndex}.`);
  const asked = lineId === undefined ? null : input.lines.find((one) => one.id === lineId);
  if (asked === undefined) throw new RangeError(`There is no limit line ${lineId}.`);
  if (pointIndex !== undefined && !(pointIndex in trace.reading)) {
    throw new RangeError(`${trace.name} has no point ${pointIndex}.`);
  }
  const hung = hangTrace(trace, input.terms, input.lines);
  const points = pointIndex === undefined ? nearestPoints(trace, frequencyHz) : [pointIndex];
  const { point, hz, level, line, comparable, limit, marginDb } = points
    .map((one) => figuresAt(trace, hung, asked, one))
    .reduce((worst, one) => (worse(one, worst) ? one : worst));
  const steps = input.purpose === 'final' ? input.uncertainty.final : input.uncertainty.prescan;
  const uncertaintyDb = expandedAt(steps, hz);
  const guard = guardAt(input.rule, steps, input.ucispr ?? [], hz);

  return {
    traceIndex,
    lineId: line?.id ?? null,
    frequencyHz: hz,
    terms: [...readingTerms(trace, trace.reading[point]!), ...pathTerms(input.terms, hz)],
    level,
    levelUnit: hung.levelUnit,
    limit,
    marginDb,
    uncertaintyDb,
    addedDb: addedAt(input.rule, steps, input.ucispr ?? [], hz),
    ...judgement(input, trace, line, { marginDb, uncertaintyDb, guard, level, hz, comparable: comparable !== null }),
  };
}

interface Figures {
  point: number;
  hz: number;
  level: number | null;
  line: LimitLine | null;
  /** The line, when it is in the unit of the level. */
  comparable: LimitLine | null;
  limit: number | null;
  marginDb: number | null;
}

function figuresAt(trace: Trace, hung: HungTrace, asked: LimitLine | null, point: number): Figures {
  const hz = trace.frequencyHz[point]!;
  const judged = judgeSegment(hung, Float64Array.of(hz), trace.reading.slice(point, point + 1));
  const level = hung.levelUnit !== null && judged.state[0] === POINT.known ? judged.level[0]! : null;
  const line = asked ?? lineAt(hung.lines, hz);
  const comparable = line && line.unit === hung.levelUnit ? line : null;
  const limit = comparable && isFrequency(hz) ? limitAt(comparable, hz) : null;
  const marginDb = level !== null && limit !== null ? limit - level : null;
  return { point, hz, level, line, comparable, limit, marginDb };
}

/** The smaller margin is the worse; where there is none, the higher level; what holds no level comes last. */
function worse(a: Figures, b: Figures): boolean {
  if (a.marginDb !== null || b.marginDb !== null) return (a.marginDb ?? Infinity) < (b.marginDb ?? Infinity);
  return (a.level ?? -Infinity) > (b.level ?? -Infinity);
}

function judgement(
  input: EvaluationInput,
  trace: Trace,
  line: LimitLine | null,
  at: {
    marginDb: number | null;
    uncertaintyDb: number | null;
    guard: Guard | null;
    level: number | null;
    hz: number;
    comparable: boolean;
  },
): Pick<Working, 'verdict' | 'because'> {
  const without = (because: string) => ({ verdict: 'not-covered' as const, because });
  if (at.level === null) return without(noLevelBecause(input, trace, at.hz));
  if (!line) return without('No limit line holds at this frequency.');
  if (!at.comparable) return without(`A limit in ${line.unit} says nothing about a level in another unit.`);
  if (at.marginDb === null) return without(`${line.name} has no limit at this frequency.`);
  return readingVerdict({
    marginDb: at.marginDb,
    uncertaintyDb: at.uncertaintyDb,
    guard: at.guard,
    detector: trace.detector,
    rbwHz: trace.rbwHz,
    vbwHz: trace.vbwHz,
    rbwShape: trace.rbwShape,
    lineDetector: line.detector,
    requiredBandwidthHz: line.bandwidthHz,
    purpose: input.purpose,
    partial: input.partial,
  });
}

function noLevelBecause(input: EvaluationInput, trace: Trace, hz: number): string {
  if (trace.unit === 'dB') return 'Readings in relative dB are no level.';
  return noFactorBecause(input.terms, hz) ?? 'The reading is no level.';
}

function lineAt(lines: HungTrace['lines'], hz: number): LimitLine | null {
  if (!isFrequency(hz)) return null;
  return lines.find(({ line }) => limitAt(line, hz) !== null)?.line ?? null;
}

/** Every point at the smallest distance from a frequency; never empty. */
function nearestPoints({ frequencyHz, name }: Trace, targetHz: number): number[] {
  let nearestHz = Infinity;
  let points: number[] = [];
  for (let i = 0; i < frequencyHz.length; i++) {
    if (!isFrequency(frequencyHz[i]!)) continue;
    const awayHz = Math.abs(frequencyHz[i]! - targetHz);
    if (awayHz < nearestHz) {
      nearestHz = awayHz;
      points = [i];
    } else if (awayHz === nearestHz) points.push(i);
  }
  if (points.length === 0) throw new RangeError(`${name} holds no point near ${targetHz} Hz.`);
  return points;
}
