import { POINT } from './correction';
import { factorAt } from './factorTable';
import { signOf } from './correction';
import { limitAt } from './limitLine';
import { hangTrace, judgeSegment } from './segment';
import type { EvaluationInput, LimitLine, PathTerm, Trace, Working, WorkingTerm } from './types';
import { expandedAt } from './uncertainty';
import { DBM_TO_DBUV_50_OHM, isReceiverInput, powerAsDbm, toReceiverLevel } from './units';
import { readingVerdict } from './verdict';

/**
 * The column addition behind one figure: the measured point of a trace nearest to a frequency, its reading, every term
 * of its path (those not applied too, with their figure), the level, and the margin to a line: the one asked for, or
 * the first the trace hangs from that has a limit there. Where several points share the nearest frequency the highest
 * reading is shown, as it governs.
 *
 * The applied terms, added in their order, give exactly the level `evaluate` computed. A term whose table has no value
 * there has no figure and is left out; when it was to be applied the level is null and `because` names it.
 * Throws RangeError when the trace or the line is not in the input, or the trace is empty.
 */
export function workingAt(input: EvaluationInput, traceIndex: number, frequencyHz: number, lineId?: string): Working {
  const trace = input.traces.find((one) => one.index === traceIndex);
  if (!trace) throw new RangeError(`There is no trace ${traceIndex}.`);
  const point = nearestPoint(trace, frequencyHz);
  const hz = trace.frequencyHz[point]!;
  const hung = hangTrace(trace, input.terms, input.lines);
  const judged = judgeSegment(hung, Float64Array.of(hz), trace.reading.slice(point, point + 1));
  const level = hung.levelUnit !== null && judged.state[0] === POINT.known ? judged.level[0]! : null;

  const hanging = hung.lines.map((prepared) => prepared.line);
  const line = lineId === undefined ? lineAt(hanging, hz) : input.lines.find((one) => one.id === lineId);
  if (!line && lineId !== undefined) throw new RangeError(`There is no limit line ${lineId}.`);
  const comparable = line && line.unit === hung.levelUnit ? line : null;
  const limit = comparable ? limitAt(comparable, hz) : null;
  const marginDb = level !== null && limit !== null ? limit - level : null;
  const steps = input.purpose === 'final' ? input.uncertainty.final : input.uncertainty.prescan;
  const uncertaintyDb = expandedAt(steps, hz);

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
    ...judgement(input, trace, line ?? null, { marginDb, uncertaintyDb, level, hz, comparable: comparable !== null }),
  };
}

function judgement(
  input: EvaluationInput,
  trace: Trace,
  line: LimitLine | null,
  at: { marginDb: number | null; uncertaintyDb: number | null; level: number | null; hz: number; comparable: boolean },
): Pick<Working, 'verdict' | 'because'> {
  const without = (because: string) => ({ verdict: 'not-covered' as const, because });
  if (at.level === null) return without(noLevelBecause(input, trace, at.hz));
  if (!line) return without('No limit line holds at this frequency.');
  if (!at.comparable) return without(`A limit in ${line.unit} says nothing about a level in another unit.`);
  if (at.marginDb === null) return without(`${line.name} has no limit at this frequency.`);
  return readingVerdict({
    marginDb: at.marginDb,
    uncertaintyDb: at.uncertaintyDb,
    detector: trace.detector,
    rbwHz: trace.rbwHz,
    vbwHz: trace.vbwHz,
    rbwShape: trace.rbwShape,
    lineDetector: line.detector,
    requiredBandwidthHz: line.bandwidthHz,
    purpose: input.purpose,
  });
}

function noLevelBecause(input: EvaluationInput, trace: Trace, hz: number): string {
  if (trace.unit === 'dB') return 'Readings in relative dB are no level.';
  const lacking = input.terms.find((term) => term.applied && factorAt(term.table, hz) === null);
  return lacking ? `${lacking.table.name} has no value at this frequency.` : 'The reading is no level.';
}

/** The reading in its own unit, then what makes it a level at the receiver's input. */
function readingTerms(trace: Trace, reading: number): WorkingTerm[] {
  const { unit } = trace;
  const given = { ...PLAIN, figure: reading, unit, name: 'reading' };
  if (!Number.isFinite(reading)) return [];
  if (unit === 'dB') return [{ ...given, applied: false, notAppliedBecause: 'relative dB is no level' }];
  if (unit === 'dBuV' || !isReceiverInput(unit)) return [given];
  const conversion = {
    ...PLAIN,
    sign: '+' as const,
    figure: DBM_TO_DBUV_50_OHM,
    unit: 'dB',
    name: 'dBm to dBµV in 50 ohm',
  };
  if (unit === 'dBm') return [given, conversion];
  const notAdded = { ...given, applied: false, notAppliedBecause: 'its level is added instead' };
  const level = toReceiverLevel(reading, unit);
  if (level === null) return [notAdded];
  const dbm = powerAsDbm(reading, unit);
  if (dbm === null) return [notAdded, { ...PLAIN, figure: level, unit: 'dBuV', name: 'reading as a level' }];
  return [notAdded, { ...PLAIN, figure: dbm, unit: 'dBm', name: 'reading as a level' }, conversion];
}

function pathTerms(terms: readonly PathTerm[], hz: number): WorkingTerm[] {
  return terms.flatMap((term): WorkingTerm[] => {
    const factor = factorAt(term.table, hz);
    if (factor === null) return [];
    const { valueDb, ...rows } = factor;
    return [
      {
        sign: signOf(term.table.quantity) > 0 ? '+' : '−',
        figure: valueDb,
        unit: term.table.quantity === 'antenna-factor' ? 'dB/m' : 'dB',
        name: term.name,
        termId: term.id,
        applied: term.applied,
        notAppliedBecause: term.applied ? null : (term.notAppliedBecause ?? null),
        rows,
      },
    ];
  });
}

const PLAIN = { sign: '' as const, termId: null, applied: true, notAppliedBecause: null, rows: null };

function lineAt(lines: readonly LimitLine[], hz: number): LimitLine | undefined {
  return lines.find((line) => limitAt(line, hz) !== null);
}

function nearestPoint({ frequencyHz, reading, name }: Trace, targetHz: number): number {
  if (frequencyHz.length === 0) throw new RangeError(`${name} holds no points.`);
  let nearest = 0;
  for (let i = 1; i < frequencyHz.length; i++) {
    const closer = Math.abs(frequencyHz[i]! - targetHz) - Math.abs(frequencyHz[nearest]! - targetHz);
    const sameHz = frequencyHz[i] === frequencyHz[nearest];
    if (closer < 0 || (sameHz && reading[i]! > reading[nearest]!)) nearest = i;
  }
  return nearest;
}
