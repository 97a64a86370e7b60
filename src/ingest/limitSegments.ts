import type { LimitSegment } from '@/emc/types';
import { IngestError } from './ingestError';
import type { LimitRow, LimitTable } from './limitTable';
import { shifted } from './numbers';
import { TO_HZ, type FrequencyUnit } from './units';

/** How a limit runs where it differs at the two ends; `hold` is for break points alone: each holds until the next. */
export type Between = LimitSegment['over'] | 'hold';

export interface LimitChoice {
  frequencyUnit?: FrequencyUnit;
  between?: Between;
}

/** The rule that words name: `straight in log frequency`, `linear`, `holds`; null when they name none. */
export function betweenIn(words: string | null | undefined): Between | null {
  if (!words) return null;
  if (/log/i.test(words)) return 'log-frequency';
  if (/lin/i.test(words)) return 'linear-frequency';
  return /hold|step|flat/i.test(words) ? 'hold' : null;
}

/**
 * Whether nobody says how the line runs between two different limits. Break points that repeat a frequency draw their
 * own steps, so that what lies between two of them slopes; without any repeat they may also hold until the next.
 */
export function betweenIsOpen(table: LimitTable): boolean {
  if (betweenIn(table.stated.between?.value) !== null) return false;
  const sloping =
    table.shape === 'segments'
      ? table.rows.filter(({ limits: [start, stop = start] }) => start !== stop)
      : table.rows.filter((row, i) => {
          const next = table.rows[i + 1];
          return next && next.limits[0] !== row.limits[0] && next.frequencies[0] !== row.frequencies[0];
        });
  return sloping.some(({ rule }) => betweenIn(rule) === null);
}

/**
 * The segments of a table, ascending, each with its rule.
 * @throws IngestError with the line where frequencies do not rise, or an answer is missing
 */
export function readLimitSegments(table: LimitTable, choice: LimitChoice = {}): LimitSegment[] {
  const unit = choice.frequencyUnit ?? table.frequencyUnit;
  if (unit === null) {
    const message = 'The unit of the frequencies is not settled. Say which before the limits are read.';
    throw new IngestError(null, 'no frequency unit', 'Hz, kHz, MHz or GHz', message);
  }
  const between = choice.between ?? betweenIn(table.stated.between?.value);
  const hz = (text: string) => shifted(text, TO_HZ[unit]);
  const ruled = (row: LimitRow) => betweenIn(row.rule) ?? between ?? 'log-frequency';
  const segments = table.shape === 'segments' ? fromSegments(table, hz, ruled) : fromPoints(table, hz, ruled);
  if (between === null && betweenIsOpen(table)) {
    const message = 'Nothing says how the line runs between two limits: straight in log frequency or in frequency.';
    throw new IngestError(null, 'no rule between two limits', 'log frequency or linear frequency', message);
  }
  return segments.sort((a, b) => a.startHz - b.startHz || a.stopHz - b.stopHz);
}

type Hertz = (text: string) => number;
type Ruled = (row: LimitRow) => Between;

function fromSegments({ rows }: LimitTable, hz: Hertz, ruled: Ruled): LimitSegment[] {
  return rows.map((row) => {
    const [startHz, stopHz] = row.frequencies.map(hz) as [number, number];
    if (!(startHz > 0 && stopHz > startHz)) {
      const found = `${row.frequencies[0]} to ${row.frequencies[1]}`;
      const message = `Line ${row.line}: ${found} is no range. The stop lies above the start, and the start above 0 Hz.`;
      throw new IngestError(row.line, found, 'a start below its stop', message);
    }
    const [startLimit, stopLimit = startLimit] = row.limits as [number, number?];
    const over = ruled(row);
    return { startHz, stopHz, startLimit, stopLimit, over: over === 'hold' ? 'log-frequency' : over };
  });
}

/** Two points at one frequency are a step; the lower limit governs on it, as everywhere (src/emc/limitLine.ts). */
function fromPoints({ rows }: LimitTable, hz: Hertz, ruled: Ruled): LimitSegment[] {
  const read = rows.map((row) => ({ row, at: hz(row.frequencies[0]!), limit: row.limits[0]! }));
  const points = read.length > 1 && read[0]!.at > read.at(-1)!.at ? read.toReversed() : read;
  const segments: LimitSegment[] = [];
  for (const [i, point] of points.entries()) {
    const { row, at } = point;
    if (at <= 0) {
      const message = `Line ${row.line}: ${row.frequencies[0]} is no frequency. Take the row out.`;
      throw new IngestError(row.line, row.frequencies[0]!, 'a frequency above 0 Hz', message);
    }
    const before = points[i - 1];
    if (!before) continue;
    if (at < before.at) {
      const message = `Line ${row.line}: ${row.frequencies[0]} follows ${before.row.frequencies[0]}. The frequencies of a limit line rise; a step repeats one.`;
      throw new IngestError(row.line, row.frequencies[0]!, 'rising frequencies', message);
    }
    if (at === before.at) {
      if (points[i - 2]?.at !== at) continue;
      const message = `Line ${row.line}: ${row.frequencies[0]} stands three times. A step has two limits, before and after it.`;
      throw new IngestError(row.line, `${row.frequencies[0]} three times`, 'a frequency at most twice', message);
    }
    const over = ruled(before.row);
    const stopLimit = over === 'hold' ? before.limit : point.limit;
    const segment = { startHz: before.at, stopHz: at, startLimit: before.limit, stopLimit };
    segments.push({ ...segment, over: over === 'hold' ? 'log-frequency' : over });
  }
  if (segments.length === 0) {
    const line = rows[0]!.line;
    const message = `Line ${line} is the only frequency. A limit line needs a stretch: two break points or a start and a stop.`;
    throw new IngestError(line, 'one frequency', 'two or more', message);
  }
  return segments;
}

/** Stretches that the line leaves out between its ends, and those in which several segments say a limit. */
export function limitHoles(
  segments: readonly LimitSegment[],
): { fromHz: number; toHz: number; kind: 'hole' | 'overlap' }[] {
  const found: { fromHz: number; toHz: number; kind: 'hole' | 'overlap' }[] = [];
  let reached = segments[0]?.stopHz ?? 0;
  for (const { startHz, stopHz } of segments.slice(1)) {
    if (startHz > reached) found.push({ fromHz: reached, toHz: startHz, kind: 'hole' });
    if (startHz < reached) found.push({ fromHz: startHz, toHz: Math.min(stopHz, reached), kind: 'overlap' });
    reached = Math.max(reached, stopHz);
  }
  return found;
}
