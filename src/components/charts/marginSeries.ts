import type { WindowView } from '@/schemas/sweep';
import type { Span } from './scale';

export type ChartMode = 'margin' | 'level';
export type WindowTrace = WindowView['traces'][number];

/** What Chart.js draws without parsing; y is NaN where the line breaks. */
export interface DrawnPoint {
  x: number;
  y: number;
}

/** Highest and lowest drawn value of one column: dB over the limit, or level. null where there is none. */
export function columnValues(trace: WindowTrace, i: number, mode: ChartMode): { high: number; low: number } | null {
  const high = mode === 'margin' ? negated(trace.marginMin[i]) : trace.levelMax[i];
  const low = mode === 'margin' ? negated(trace.marginMax[i]) : trace.levelMin[i];
  return typeof high === 'number' && typeof low === 'number' ? { high, low } : null;
}

const negated = (value: number | null | undefined) => (typeof value === 'number' ? 0 - value : null);

function appendColumns(
  out: DrawnPoint[],
  trace: WindowTrace,
  mode: ChartMode,
  takes: (hz: number) => boolean,
  breaks: readonly Span[],
): void {
  for (let i = 0; i < trace.frequencyHz.length; i++) {
    const x = trace.frequencyHz[i]!;
    if (!takes(x)) continue;
    const before = out.at(-1);
    const values = columnValues(trace, i, mode);
    if (!values) {
      if (before && !Number.isNaN(before.y)) out.push({ x, y: NaN });
      continue;
    }
    if (before && breaks.some((gap) => before.x <= gap.fromHz && x >= gap.toHz)) out.push({ x, y: NaN });
    // The end nearer to the point before comes first, so that the line crosses each column once.
    const rising = before && Math.abs(before.y - values.low) < Math.abs(before.y - values.high);
    out.push({ x, y: rising ? values.low : values.high });
    if (values.high !== values.low) out.push({ x, y: rising ? values.high : values.low });
  }
}

/**
 * One trace as a single polyline through the minimum and maximum of each column; every extreme is kept, nothing is
 * smoothed. Where a finer window is at hand it replaces the overview inside its own span.
 * @param breaks stretches without points, over which no line may run
 */
export function traceSeries(
  overview: WindowTrace | null,
  detail: WindowTrace | null,
  detailSpan: Span | null,
  mode: ChartMode,
  breaks: readonly Span[] = [],
): DrawnPoint[] {
  const out: DrawnPoint[] = [];
  if (detail && detailSpan) {
    if (overview) appendColumns(out, overview, mode, (hz) => hz < detailSpan.fromHz, breaks);
    appendColumns(out, detail, mode, () => true, breaks);
    if (overview) appendColumns(out, overview, mode, (hz) => hz > detailSpan.toHz, breaks);
  } else if (overview) appendColumns(out, overview, mode, () => true, breaks);
  return out;
}

/** Highest and lowest drawn value of all traces; null when nothing is drawn. */
export function seriesExtremes(window: WindowView | null, mode: ChartMode): { high: number; low: number } | null {
  let found: { high: number; low: number } | null = null;
  for (const trace of window?.traces ?? [])
    for (let i = 0; i < trace.frequencyHz.length; i++) {
      const values = columnValues(trace, i, mode);
      if (!values) continue;
      found = found
        ? { high: Math.max(found.high, values.high), low: Math.min(found.low, values.low) }
        : { high: values.high, low: values.low };
    }
  return found;
}

/** Index of the column nearest to a frequency, on the log axis; null for an empty trace. */
export function nearestColumn(trace: WindowTrace, hz: number): number | null {
  const at = trace.frequencyHz;
  if (at.length === 0) return null;
  let low = 0;
  let high = at.length - 1;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (at[middle]! <= hz) low = middle;
    else high = middle;
  }
  return Math.abs(Math.log(at[low]! / hz)) <= Math.abs(Math.log(at[high]! / hz)) ? low : high;
}
