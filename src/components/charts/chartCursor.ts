import type { CandidateView, WindowView } from '@/schemas/sweep';
import { formatFrequency } from '@/format/frequencies';
import { formatLevel, marginText } from '@/format/quantities';
import { DETECTOR_MARKS } from '@/format/words';
import type { LineUnit } from '@/emc/kinds';
import type { ChartSubject } from './chartSubject';
import { columnValues, nearestColumn, type ChartMode } from './marginSeries';
import type { TipText } from './PointTip';

/** What the pointer or the keyboard rests on. */
export type Cursor = { kind: 'candidate'; rank: number } | { kind: 'trace'; traceIndex: number; hz: number } | null;

/** The whole range at hand, and the finer window inside it when there is one. */
export interface Layers {
  overview: WindowView | null;
  detail: WindowView | null;
}

/** The finest window that holds a frequency. */
export function windowAt({ overview, detail }: Layers, hz: number): WindowView | null {
  return detail && hz >= detail.fromHz && hz <= detail.toHz ? detail : overview;
}

/** A point of a trace under the cursor: the highest reading of the nearest column. */
export interface TracePoint {
  traceIndex: number;
  hz: number;
  value: number;
  level: number;
  marginDb: number | null;
}

export function tracePoint(window: WindowView, traceIndex: number, hz: number, mode: ChartMode): TracePoint | null {
  const trace = window.traces.find(({ index }) => index === traceIndex);
  const i = trace ? nearestColumn(trace, hz) : null;
  if (!trace || i === null) return null;
  const values = columnValues(trace, i, mode);
  const level = trace.levelMax[i];
  if (!values || typeof level !== 'number') return null;
  const value = values.high;
  return { traceIndex, hz: trace.frequencyHz[i]!, value, level, marginDb: trace.marginMin[i] ?? null };
}

/** The trace whose point at this frequency is nearest to a value of the y axis. */
export function nearestTrace(window: WindowView, hz: number, value: number, mode: ChartMode): TracePoint | null {
  const points = window.traces.flatMap(({ index }) => tracePoint(window, index, hz, mode) ?? []);
  return points.sort((a, b) => Math.abs(a.value - value) - Math.abs(b.value - value))[0] ?? null;
}

/** Moves along a trace by so many points of the sweep, and by one drawn column at the least. */
export function stepAlong(
  window: WindowView,
  traceIndex: number,
  hz: number,
  points: number,
  stepHz: number | null,
): number {
  const trace = window.traces.find(({ index }) => index === traceIndex);
  const i = trace ? nearestColumn(trace, hz) : null;
  if (!trace || i === null) return hz;
  const byColumn = trace.frequencyHz[Math.min(trace.frequencyHz.length - 1, Math.max(0, i + Math.sign(points)))]!;
  if (stepHz === null) {
    const many = Math.min(trace.frequencyHz.length - 1, Math.max(0, i + points));
    return trace.frequencyHz[many]!;
  }
  const byPoints = hz + points * stepHz;
  return points > 0 ? Math.max(byColumn, byPoints) : Math.min(byColumn, byPoints);
}

export function candidateTip(candidate: CandidateView, orientation: string, unit: LineUnit): TipText {
  return {
    frequency: formatFrequency(candidate.frequencyHz),
    how: [DETECTOR_MARKS[candidate.detector], orientation].filter(Boolean).join(' '),
    level: formatLevel(candidate.level, unit),
    margin: marginText(candidate.marginDb),
    verdict: candidate.verdict,
  };
}

export function traceTip(point: TracePoint, subject: ChartSubject, unit: LineUnit): TipText {
  const trace = subject.traces.find(({ index }) => index === point.traceIndex);
  return {
    frequency: formatFrequency(point.hz),
    how: [trace ? DETECTOR_MARKS[trace.detector] : '', subject.orientation].filter(Boolean).join(' '),
    level: formatLevel(point.level, unit),
    margin: point.marginDb === null ? { figure: '', word: 'no limit' } : marginText(point.marginDb),
    verdict: null,
  };
}

/** The same point as one spoken line. */
export function spokenPoint(tip: TipText): string {
  return [tip.frequency, tip.how, tip.level, `${tip.margin.figure} ${tip.margin.word}`.trim()]
    .filter(Boolean)
    .join(', ');
}
