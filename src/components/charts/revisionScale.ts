import type { PathPoint } from './limitPath';
import type { Range } from './scale';

/** Values of two revisions with room above and below, at least 6 dB in all, ends on whole steps. */
export function revisionRange(values: readonly number[]): Range {
  const low = values.reduce((least, one) => Math.min(least, one), Infinity);
  const high = values.reduce((most, one) => Math.max(most, one), -Infinity);
  if (!Number.isFinite(low) || !Number.isFinite(high)) return { top: 10, bottom: 0 };
  const room = Math.max((high - low) * 0.12, (6 - (high - low)) / 2, 0.5);
  const step = niceStep((high - low + 2 * room) / 6);
  return { top: Math.ceil((high + room) / step) * step, bottom: Math.floor((low - room) / step) * step };
}

/** A strip around zero that holds the largest difference. */
export function stripRange(largestDb: number): Range {
  const most = Math.max(0.5, Math.abs(largestDb) * 1.25);
  const step = niceStep(most / 2);
  const top = Math.ceil(most / step) * step;
  return { top, bottom: -top };
}

function niceStep(atLeast: number): number {
  const decade = 10 ** Math.floor(Math.log10(atLeast));
  return decade * ([1, 2, 5].find((factor) => factor * decade >= atLeast - 1e-9) ?? 10);
}

/** Whole steps inside a range, so many that each keeps 22 px. */
export function rangeTicks({ top, bottom }: Range, heightPx: number): number[] {
  const step = niceStep(((top - bottom) / heightPx) * 26);
  const ticks: number[] = [];
  for (let n = Math.ceil(bottom / step - 1e-9); n * step <= top + 1e-9; n++)
    ticks.push(Number((n * step).toFixed(6)) + 0);
  return ticks;
}

/** A table as a line: straight over log f from row to row, nothing beyond its ends. */
export function tableLine(frequencyHz: readonly number[], valueDb: readonly number[]): PathPoint[] {
  return frequencyHz.map((hz, i) => ({ hz, value: valueDb[i]! }));
}
