import type { DifferenceView } from '@/schemas/comparison';
import type { WindowView } from '@/schemas/sweep';
import { nearestColumn, columnValues, type ChartMode, type WindowTrace } from './marginSeries';
import type { Span } from './scale';

/** Both runs over one stretch of frequency, and their difference there. */
export interface Beside extends Span {
  columns: number;
  a: WindowView['traces'];
  b: WindowView['traces'];
  differences: readonly DifferenceView[];
}

/** A trace of each run, laid over each other. */
export type ShownPair = Pick<DifferenceView, 'a' | 'b'>;

export function traceOf(beside: Beside | null, side: 'a' | 'b', pair: ShownPair | null): WindowTrace | null {
  return beside && pair ? (beside[side].find(({ index }) => index === pair[side]) ?? null) : null;
}

export function differenceOfPair(beside: Beside | null, pair: ShownPair | null): DifferenceView | null {
  return beside?.differences.find(({ a, b }) => a === pair?.a && b === pair?.b) ?? null;
}

/** The stretch that holds a frequency; null where the runs have no difference. */
export function stretchAt(difference: DifferenceView | null, hz: number): number | null {
  if (!difference) return null;
  const { fromHz, toHz } = difference;
  let low = 0;
  let high = fromHz.length - 1;
  while (low <= high) {
    const middle = (low + high) >> 1;
    if (hz < fromHz[middle]!) high = middle - 1;
    else if (hz > toHz[middle]!) low = middle + 1;
    else return middle;
  }
  return null;
}

/** What both runs read at a frequency: the highest of the nearest column of each, and their difference there. */
export interface BesidePoint {
  hz: number;
  a: { value: number; level: number; marginDb: number | null } | null;
  b: { value: number; level: number; marginDb: number | null } | null;
  differenceDb: number | null;
}

export function pointBeside(beside: Beside, pair: ShownPair, hz: number, mode: ChartMode): BesidePoint | null {
  const [b, a] = [sideAt(beside, 'b', pair, hz, mode), sideAt(beside, 'a', pair, hz, mode)];
  const at = b?.hz ?? a?.hz;
  if (at === undefined) return null;
  const difference = differenceOfPair(beside, pair);
  const stretch = stretchAt(difference, at);
  return { hz: at, a, b, differenceDb: stretch === null ? null : difference!.differenceDb[stretch]! };
}

function sideAt(beside: Beside, side: 'a' | 'b', pair: ShownPair, hz: number, mode: ChartMode) {
  const trace = traceOf(beside, side, pair);
  const i = trace ? nearestColumn(trace, hz) : null;
  if (!trace || i === null) return null;
  const values = columnValues(trace, i, mode);
  const level = trace.levelMax[i];
  // Past its end a run has no nearest point but its last.
  const near = Math.abs(Math.log(trace.frequencyHz[i]! / hz)) < (2 * Math.log(beside.toHz / beside.fromHz)) / 64;
  if (!values || typeof level !== 'number' || !near) return null;
  return { hz: trace.frequencyHz[i]!, value: values.high, level, marginDb: trace.marginMin[i] ?? null };
}

/** The strip's half height in dB: 10, 20, 30…, to hold the largest difference that is drawn. */
export function stripReachDb(differences: readonly number[]): number {
  const largest = differences.reduce((most, db) => Math.max(most, Math.abs(db)), 0);
  return Math.min(60, Math.max(10, Math.ceil((largest + 0.5) / 10) * 10));
}

/**
 * The strip as one outline per unbroken run of stretches, from the zero line and back to it. Values past `reachDb` end
 * at the edge.
 */
export function stripPath(
  { fromHz, toHz, differenceDb }: DifferenceView,
  span: Span,
  reachDb: number,
  x: (hz: number) => number,
  y: (db: number) => number,
): { area: string; line: string } {
  const zero = y(0);
  let area = '';
  let line = '';
  let reachedHz = NaN;
  for (let i = 0; i < fromHz.length; i++) {
    if (toHz[i]! < span.fromHz || fromHz[i]! > span.toHz) continue;
    const [left, right] = [x(Math.max(fromHz[i]!, span.fromHz)), x(Math.min(toHz[i]!, span.toHz))];
    const at = y(Math.max(-reachDb, Math.min(reachDb, differenceDb[i]!)));
    if (fromHz[i] === reachedHz) {
      area += `V${at}H${right}`;
      line += `V${at}H${right}`;
    } else {
      area += `${area ? `V${zero}Z` : ''}M${left} ${zero}V${at}H${right}`;
      line += `M${left} ${at}H${right}`;
    }
    reachedHz = toHz[i]!;
  }
  return { area: area && `${area}V${zero}Z`, line };
}
