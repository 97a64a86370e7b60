import type { JudgedSegment } from './segment';
import { POINT } from './correction';
import type { Columns } from './types';

// Held as locals: a bundler may turn an imported name into a getter, which a loop over a million points would feel.
const { known } = POINT;

/** Columns of the whole-range layer that is kept with an evaluation. */
export const LAYER_COLUMNS = 1024;

/** What columns are made from; `JudgedSegment` is one. */
export type ColumnPoints = Pick<JudgedSegment, 'frequencyHz' | 'logHz' | 'level' | 'state' | 'marginDb' | 'hasMargin'>;

export interface ColumnAccumulator {
  /** Points in any order and any number of calls; those outside the window, or without a level, are left out. */
  add(points: ColumnPoints): void;
  finish(): Columns;
}

/** Extremes of one trace over a window, all points at once. See `columnAccumulator`. */
export function columnsOf(points: ColumnPoints, fromHz: number, toHz: number, columns: number): Columns {
  const accumulator = columnAccumulator(fromHz, toHz, columns);
  accumulator.add(points);
  return accumulator.finish();
}

/**
 * Collects the lowest and highest level and margin of every column of a window, closed at both ends, whose columns
 * are equally wide in log f. Only columns that hold a point appear. A column with exactly one point has that point's
 * frequency, any other its centre (geometric mean of its edges). Extremes are rounded once, to Float32.
 * Throws RangeError on a window that is no range or a count below 1. A window of one frequency is a single column.
 */
export function columnAccumulator(fromHz: number, toHz: number, columns: number): ColumnAccumulator {
  if (!(fromHz > 0 && toHz >= fromHz && toHz < Infinity)) throw new RangeError(`${fromHz} to ${toHz} Hz is no window.`);
  if (!(Number.isInteger(columns) && columns >= 1)) throw new RangeError(`${columns} is no number of columns.`);
  const logFrom = Math.log(fromHz);
  const logSpan = Math.log(toHz) - logFrom;
  const perLog = logSpan > 0 ? columns / logSpan : 0;
  const count = new Uint32Array(columns);
  const onlyHz = new Float64Array(columns);
  const hasMargin = new Uint8Array(columns);
  const levelMin = new Float64Array(columns).fill(Infinity);
  const levelMax = new Float64Array(columns).fill(-Infinity);
  const marginMin = new Float64Array(columns).fill(Infinity);
  const marginMax = new Float64Array(columns).fill(-Infinity);

  function add(points: ColumnPoints): void {
    const { frequencyHz, logHz, level, state, marginDb } = points;
    for (let i = 0; i < frequencyHz.length; i++) {
      const f = frequencyHz[i]!;
      if (f < fromHz || f > toHz || state[i] !== known) continue;
      const column = Math.min(columns - 1, Math.max(0, Math.floor((logHz[i]! - logFrom) * perLog)));
      count[column]!++;
      onlyHz[column] = f;
      if (level[i]! < levelMin[column]!) levelMin[column] = level[i]!;
      if (level[i]! > levelMax[column]!) levelMax[column] = level[i]!;
      if (points.hasMargin[i] === 0) continue;
      hasMargin[column] = 1;
      if (marginDb[i]! < marginMin[column]!) marginMin[column] = marginDb[i]!;
      if (marginDb[i]! > marginMax[column]!) marginMax[column] = marginDb[i]!;
    }
  }

  function finish(): Columns {
    const filled: number[] = [];
    for (let column = 0; column < columns; column++) if (count[column]! > 0) filled.push(column);
    const centreHz = (column: number) => Math.exp(logFrom + ((column + 0.5) / columns) * logSpan);
    const margin = (extreme: Float64Array) =>
      Float32Array.from(filled, (column) => (hasMargin[column] ? extreme[column]! : 0));
    return {
      frequencyHz: Float64Array.from(filled, (column) => (count[column] === 1 ? onlyHz[column]! : centreHz(column))),
      levelMin: Float32Array.from(filled, (column) => levelMin[column]!),
      levelMax: Float32Array.from(filled, (column) => levelMax[column]!),
      marginMin: margin(marginMin),
      marginMax: margin(marginMax),
      hasMargin: Uint8Array.from(filled, (column) => hasMargin[column]!),
    };
  }

  return { add, finish };
}
