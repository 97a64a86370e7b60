import type { Piece } from './blocks';
import { textNumberReader } from './numbers';
import { columnOf } from './scan';
import type { Table } from './table';

/**
 * Frequencies of one piece as written, or in hertz when the scan was made with a shift.
 * @param shift powers of ten for frequencies that stand in a heading line, outside the scan
 */
export function axisOf(table: Table, piece: Piece, shift = 0): Float64Array {
  const { scan, hop, time } = table;
  if (time) {
    const read = textNumberReader(scan.template);
    return Float64Array.from(time.frequencies, (text) => read(text, shift)!);
  }
  if (!hop) return columnOf(scan, scan.columns.indexOf(table.axisColumn!), piece.firstRow, piece.rows);
  const [low, width] = [scan.data[hop.low]!, scan.data[hop.binWidth]!];
  const axis = new Float64Array(piece.rows * hop.bins);
  for (let i = 0; i < axis.length; i++) {
    const row = piece.firstRow + Math.floor(i / hop.bins);
    axis[i] = low[row]! + (i % hop.bins) * width[row]!;
  }
  return axis;
}

/** Levels of one piece. Row layouts have one trace that runs over several columns; pairs have one per column. */
export function levelsOf(table: Table, piece: Piece, column: number): Float64Array {
  const { scan, hop, time } = table;
  if (time) {
    const from = scan.columns.indexOf(table.levelColumns[0]!);
    return Float64Array.from(table.levelColumns, (_, i) => scan.data[from + i]![piece.firstRow]!);
  }
  if (!hop) return columnOf(scan, scan.columns.indexOf(column), piece.firstRow, piece.rows);
  return Float64Array.from({ length: piece.rows * hop.bins }, (_, i) => {
    return scan.data[hop.firstLevel + (i % hop.bins)]![piece.firstRow + Math.floor(i / hop.bins)]!;
  });
}
