import { afterLineEnd, type CleanBytes } from './bytes';
import { isComment, splitCells } from './cells';
import { IngestError } from './ingestError';
import { textNumberReader } from './numbers';
import { rowMatcher } from './rowMatcher';
import { lineEndFrom, LONGEST_LINE, textOf } from './sample';
import type { Template } from './template';

/** Rows without other text between them; blank and comment lines do not end a block. */
export interface Block {
  /** Index of the first row in `cells`. */
  firstRow: number;
  rows: number;
  firstLine: number;
  lastLine: number;
  from: number;
  /** Byte offsets of the last row and of the line after it. */
  lastFrom: number;
  next: number;
  /** First line after the block that is neither row, blank nor comment; null at the end of the file. */
  gap: { line: number; from: number; lines: number } | null;
}

export interface Scan {
  template: Template;
  /** File column of each column of `cells`. */
  columns: number[];
  /** Row by row. A hole in a sparse column is NaN here and never leaves the ingest. */
  cells: Float64Array;
  rows: number;
  blocks: Block[];
  /** Byte offset of every row, kept only where rows carry text (time stamps, table names). */
  rowFrom: Uint32Array | null;
}

/** Numbers in one file: 24 million are 192 MB. */
export const MOST_CELLS = 24_000_000;
const MOST_BLOCKS = 5000;
const ROWS_PER_STEP = 16_384;

/**
 * Reads every row of the shape. Rows of plain numbers go through the byte reader, others through papaparse.
 * @param shifts powers of ten per file column, for a frequency unit
 * @throws IngestError when the file holds more numbers or interruptions than one sweep can have
 */
export function* scanSteps(clean: CleanBytes, template: Template, shifts: number[] = []): Generator<void, Scan> {
  const { bytes } = clean;
  const { contents } = template;
  const columns = contents.flatMap((content, i) => (content === 'number' || content === 'sparse' ? [i] : []));
  const wide = columns.length;
  const most = Math.min(clean.lines * wide, MOST_CELLS + wide);
  let cells = new Float64Array(Math.min(most, 65_536 * wide));
  let rowFrom = contents.includes('text') ? new Uint32Array(Math.min(clean.lines, 65_536)) : null;
  const match = rowMatcher(bytes, template, shifts);
  const readText = textNumberReader(template);
  const plain = template.thousands === null;

  /** Irregular rows: quotes, grouped digits, typographic minus. */
  const matchText = (text: string, at: number): boolean => {
    const row = splitCells(text, template.delimiter);
    for (let i = contents.length; i < row.length; i++) if (row[i] !== '') return false;
    let out = at;
    for (const [i, content] of contents.entries()) {
      const cell = row[i] ?? '';
      if (content === 'text' ? cell === '' : content === 'empty' && cell !== '') return false;
      if (content !== 'number' && content !== 'sparse') continue;
      const value = cell === '' && content === 'sparse' ? NaN : readText(cell, shifts[i] ?? 0);
      if (value === null) return false;
      cells[out++] = value;
    }
    return true;
  };

  const blocks: Block[] = [];
  let block: Block | null = null;
  let rows = 0;
  let at = 0;
  let work = 0;
  for (let line = 1; at < bytes.length; line++) {
    if ((rows + 1) * wide > cells.length) {
      if ((rows + 1) * wide > MOST_CELLS) {
        const message = `Line ${line}: more than ${MOST_CELLS} numbers. Split the file and drop the parts.`;
        throw new IngestError(line, `more than ${MOST_CELLS} numbers`, 'one sweep per file', message);
      }
      const larger = new Float64Array(Math.min(most, cells.length * 2));
      larger.set(cells);
      cells = larger;
    }
    const out = rows * wide;
    let next = plain ? match(at, cells, out) : -1;
    if (next < 0) {
      const end = lineEndFrom(bytes, at);
      next = end < bytes.length ? afterLineEnd(bytes, end) : end;
      work += (end - at) >> 6;
      const text = end - at > LONGEST_LINE ? null : end === at ? '' : textOf(bytes, at, end);
      const worth = text !== null && (!plain || /["\u2212\u00a0\u2009\u202f]/.test(text));
      if (!(worth && matchText(text, out))) {
        const skipped = text !== null && (text.trim() === '' || isComment(text));
        if (block && !skipped) {
          block.gap ??= { line, from: at, lines: 0 };
          block.gap.lines++;
        }
        at = next;
        if (++work >= ROWS_PER_STEP) {
          work = 0;
          yield;
        }
        continue;
      }
    }
    if (block === null || block.gap !== null) {
      block = { firstRow: rows, rows: 0, firstLine: line, lastLine: line, from: at, lastFrom: at, next, gap: null };
      blocks.push(block);
      if (blocks.length > MOST_BLOCKS) {
        const message = `Line ${line}: rows of numbers are interrupted by other lines more than ${MOST_BLOCKS} times. Export the trace as one table.`;
        throw new IngestError(line, `${MOST_BLOCKS} pieces`, 'one table', message);
      }
    }
    if (rowFrom) {
      if (rows >= rowFrom.length) {
        const larger = new Uint32Array(rowFrom.length * 2);
        larger.set(rowFrom);
        rowFrom = larger;
      }
      rowFrom[rows] = at;
    }
    block.rows++;
    block.lastLine = line;
    block.lastFrom = at;
    block.next = next;
    rows++;
    at = next;
    if (++work >= ROWS_PER_STEP) {
      work = 0;
      yield;
    }
  }
  return { template, columns, cells, rows, blocks, rowFrom };
}

/** One column of a stretch of rows. */
export function columnOf(scan: Scan, column: number, firstRow: number, rows: number): Float64Array {
  const wide = scan.columns.length;
  const values = new Float64Array(rows);
  for (let i = 0, at = firstRow * wide + column; i < rows; i++, at += wide) values[i] = scan.cells[at]!;
  return values;
}

/** Line of a row within its block: blank and comment lines between rows make it later than its place would say. */
export function lineOfRow(clean: CleanBytes, scan: Scan, row: number): number {
  const block = scan.blocks.find((b) => row >= b.firstRow && row < b.firstRow + b.rows)!;
  if (block.lastLine - block.firstLine + 1 === block.rows) return block.firstLine + row - block.firstRow;
  const match = rowMatcher(clean.bytes, scan.template, []);
  const spare = new Float64Array(scan.columns.length);
  let line = block.firstLine;
  for (let at = block.from, seen = block.firstRow; ; line++) {
    const next = match(at, spare, 0);
    if (next >= 0 && seen++ === row) return line;
    if (next >= 0) at = next;
    else {
      const end = lineEndFrom(clean.bytes, at);
      if (end >= clean.bytes.length) return line;
      at = afterLineEnd(clean.bytes, end);
    }
  }
}
