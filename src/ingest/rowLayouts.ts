import type { CleanBytes } from './bytes';
import { splitCells } from './cells';
import { statsOf } from './columnStats';
import { textNumberReader } from './numbers';
import type { Line } from './sample';
import { lineEndFrom, textOf } from './sample';
import { columnOf, type Block, type Scan } from './scan';

/** One row per hop: low edge, high edge, bin width, perhaps a sample count, then the levels of the bins. */
export interface HopRows {
  /** Columns of `cells`. */
  low: number;
  binWidth: number;
  firstLevel: number;
  /** Bins of one hop; a further value that repeats the last bin is left out. */
  bins: number;
  repeated: boolean;
}

export function hopRowsIn(scan: Scan, block: Block): HopRows | null {
  if (block.rows < 2) return null;
  const wide = scan.columns.length;
  const { data } = scan;
  const from = block.firstRow;
  const to = block.firstRow + block.rows;
  for (let low = 0; low + 4 <= wide; low++) {
    const width = data[low + 1]![from]! - data[low]![from]!;
    const bin = data[low + 2]![from]!;
    const bins = Math.round(width / bin);
    if (!(width > 0) || !(bin > 0) || bins < 1 || Math.abs(width / bin - bins) > 1e-6 * bins) continue;
    let fits = true;
    let joins = 0;
    for (let row = from; row < to && fits; row++) {
      fits = Math.abs(data[low + 1]![row]! - data[low]![row]! - width) <= 1e-6 * width && data[low + 2]![row] === bin;
      if (row > from && Math.abs(data[low]![row]! - data[low + 1]![row - 1]!) <= 1e-6 * width) joins++;
    }
    if (!fits || joins < 0.5 * (block.rows - 1)) continue;
    const after = wide - low - 3;
    const count = statsOf(columnOf(scan, low + 3, from, block.rows));
    const counts = Number.isInteger(count.min) && count.min > 0 && count.min === count.max && after > bins;
    const firstLevel = low + 3 + (counts ? 1 : 0);
    const values = wide - firstLevel;
    if (values === bins) return { low, binWidth: low + 2, firstLevel, bins, repeated: false };
    if (values !== bins + 1) continue;
    let repeated = true;
    for (let row = from; row < to && repeated; row++) {
      repeated = data[wide - 1]![row] === data[wide - 2]![row];
    }
    if (repeated) return { low, binWidth: low + 2, firstLevel, bins, repeated };
  }
  return null;
}

/** One row per moment, one column per frequency; the frequencies run across a line above the rows. */
export interface TimeRows {
  /** 1-based line of the frequencies. */
  line: number;
  /** As written, left to right. */
  frequencies: string[];
  /** Column of `cells` of the first level. */
  firstLevel: number;
  /** The line of frequencies reads as a row of the shape; it is row 0 then. */
  firstRowIsHeading: boolean;
}

const FEWEST_COLUMNS = 5;

function monotone(values: readonly number[]): boolean {
  const sense = Math.sign(values[1]! - values[0]!);
  return sense !== 0 && values.every((value, i) => i === 0 || Math.sign(value - values[i - 1]!) === sense);
}

export function timeRowsIn(clean: CleanBytes, scan: Scan, block: Block, before: readonly Line[]): TimeRows | null {
  const { template, columns, data } = scan;
  const read = textNumberReader(template);
  const firstText = template.contents[0] === 'text';
  const written = before.filter(({ text }) => text.trim() !== '');
  const own: Line = {
    line: block.firstLine,
    text: textOf(clean.bytes, block.from, lineEndFrom(clean.bytes, block.from)),
    from: 0,
    next: 0,
  };
  for (const [heading, isRow] of [[written.at(-1), false] as const, [own, true] as const]) {
    if (!heading) continue;
    const row = splitCells(heading.text, template.delimiter);
    // Numbers only from the first level on; the corner above the time column is empty or text.
    for (const skip of firstText ? [0] : [1]) {
      const levels = columns.slice(skip);
      if (levels.length < FEWEST_COLUMNS || (isRow && block.rows < 2)) continue;
      const corner = row.slice(0, levels[0]).join('');
      if (read(corner) !== null || /^\d/.test(corner)) continue;
      const frequencies = levels.map((column) => row[column] ?? '');
      const values = frequencies.map((text) => read(text));
      if (values.some((value) => value === null) || !monotone(values as number[])) continue;
      const first = block.firstRow + (isRow ? 1 : 0);
      const across = levels.map((_, i) => data[skip + i]![first]!);
      if (monotone(across)) continue;
      return { line: heading.line, frequencies, firstLevel: skip, firstRowIsHeading: isRow };
    }
  }
  return null;
}
