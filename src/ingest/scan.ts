import { afterLineEnd, type CleanBytes } from './bytes';
import { splitCells } from './cells';
import { IngestError } from './ingestError';
import { textNumberReader } from './numbers';
import { NO_PLAIN_DECIMALS, rowMatcher } from './rowMatcher';
import { lineEndFrom, LONGEST_LINE, textOf } from './sample';
import type { Template } from './template';

/** Rows without other text between them; blank lines do not end a block. */
export interface Block {
  firstRow: number;
  rows: number;
  firstLine: number;
  lastLine: number;
  from: number;
  /** Byte offsets of the last row and of the line after it. */
  lastFrom: number;
  next: number;
  /** First line after the block that is neither row nor blank; null at the end of the file. */
  gap: { line: number; from: number; lines: number } | null;
}

export interface Scan {
  template: Template;
  /** File column of each column of `data`. */
  columns: number[];
  /** Column by column, then row by row. A hole in a sparse column is NaN here and never leaves the ingest. */
  data: Float64Array[];
  rows: number;
  blocks: Block[];
  /** Per column of `data`: digits after the mark at most, above 15 where that is not all there is to its numbers. */
  decimals: Int32Array;
  /** Byte offset of every row, kept only where rows carry text (time stamps, table names). */
  rowFrom: Uint32Array | null;
}

/** Numbers in one file: 24 million are 192 MB. */
export const MOST_CELLS = 24_000_000;
const MOST_BLOCKS = 5000;
const ROWS_PER_STEP = 16_384;
const BYTES_PER_STEP = 1 << 20;

function tooMuch(line: number, found: string, expected: string, next: string): IngestError {
  return new IngestError(line, found, expected, `Line ${line}: ${found}. ${next}`);
}

/** Irregular rows: quotes (papaparse), grouped digits, typographic minus. Same outcome as the fast reader. */
function textRowReader(template: Template, shifts: readonly number[]) {
  const { contents, delimiter } = template;
  const read = textNumberReader(template);
  return (text: string, data: readonly Float64Array[], row: number): boolean => {
    const cells = splitCells(text, delimiter);
    for (let i = contents.length; i < cells.length; i++) if (cells[i] !== '') return false;
    let out = 0;
    for (const [i, content] of contents.entries()) {
      const cell = cells[i] ?? '';
      if (content === 'text' ? cell === '' : content === 'empty' && cell !== '') return false;
      if (content !== 'number' && content !== 'sparse') continue;
      const value = cell === '' && content === 'sparse' ? NaN : read(cell, shifts[i] ?? 0);
      if (value === null) return false;
      data[out++]![row] = value;
    }
    return true;
  };
}

/**
 * Reads every row of the shape. Rows of plain numbers go through the byte reader, others through papaparse.
 * @param shifts powers of ten per file column, for a frequency unit
 * @throws IngestError when the file holds more numbers or interruptions than one sweep can have
 */
export function* scanSteps(clean: CleanBytes, template: Template, shifts: number[] = []): Generator<void, Scan> {
  const { bytes } = clean;
  const { contents } = template;
  const columns = contents.flatMap((content, i) => (content === 'number' || content === 'sparse' ? [i] : []));
  const mostRows = Math.ceil(MOST_CELLS / columns.length);
  let room = Math.min(clean.lines, mostRows + 1, Math.max(16, Math.floor(3_000_000 / columns.length)));
  let data = columns.map(() => new Float64Array(room));
  let rowFrom = contents.includes('text') ? new Uint32Array(room) : null;
  const match = rowMatcher(bytes, template, shifts);
  const matchText = textRowReader(template, shifts);
  // A comma can be decimal mark and delimiter only where quotes tell them apart.
  const plain = template.thousands === null && template.decimal !== template.delimiter;
  const perStep = Math.max(1, Math.floor((ROWS_PER_STEP * 3) / columns.length));

  const blocks: Block[] = [];
  let block: Block | null = null;
  let rows = 0;
  let line = 1;
  let work = 0;
  const take = (from: number, count: number, lastFrom: number, next: number) => {
    if (block === null || block.gap !== null) {
      block = { firstRow: rows, rows: 0, firstLine: line, lastLine: line, from, lastFrom, next, gap: null };
      blocks.push(block);
      if (blocks.length > MOST_BLOCKS) {
        throw tooMuch(
          line,
          `rows are interrupted over ${MOST_BLOCKS} times`,
          'one table',
          'Export the trace as one table.',
        );
      }
    }
    Object.assign(block, { rows: block.rows + count, lastLine: line + count - 1, lastFrom, next });
    rows += count;
    line += count;
  };

  for (let at = 0; at < bytes.length;) {
    if (rows >= mostRows) {
      throw tooMuch(
        line,
        `more than ${MOST_CELLS} numbers`,
        'one sweep per file',
        'Split the file and drop the parts.',
      );
    }
    if (rows >= room) {
      room = Math.min(clean.lines, mostRows + 1, room * 2);
      const grown = <T extends Float64Array | Uint32Array>(old: T, larger: T) => (larger.set(old), larger);
      data = data.map((old) => grown(old, new Float64Array(room)));
      rowFrom &&= grown(rowFrom, new Uint32Array(room));
    }
    if (plain) {
      const stretch = match.many(at, data, rows, Math.min(perStep, room - rows), rowFrom);
      if (stretch.rows > 0) {
        take(at, stretch.rows, stretch.lastFrom, stretch.next);
        at = stretch.next;
        if (stretch.rows >= perStep) yield;
        continue;
      }
    }
    const end = lineEndFrom(bytes, at);
    const next = end < bytes.length ? afterLineEnd(bytes, end) : end;
    const text = end - at > LONGEST_LINE ? null : end === at ? '' : textOf(bytes, at, end);
    const irregular = text !== null && (!plain || /["\u2212\u00a0\u2009\u202f]/.test(text));
    if (irregular && matchText(text, data, rows)) {
      match.decimals.fill(NO_PLAIN_DECIMALS);
      if (rowFrom) rowFrom[rows] = at;
      take(at, 1, at, next);
    } else {
      const open: Block | null = blocks.at(-1) ?? null;
      if (open && !(text !== null && text.trim() === '')) {
        open.gap ??= { line, from: at, lines: 0 };
        open.gap.lines++;
      }
      line++;
    }
    work += end - at + 256;
    at = next;
    if (work >= BYTES_PER_STEP) {
      work = 0;
      yield;
    }
  }
  return { template, columns, data, rows, blocks, decimals: match.decimals, rowFrom };
}

/** One column over a stretch of rows; a view, not a copy. */
export function columnOf(scan: Scan, column: number, firstRow: number, rows: number): Float64Array {
  return scan.data[column]!.subarray(firstRow, firstRow + rows);
}

/** Line of a row within its block: blank lines between rows make it later than its place would say. */
export function lineOfRow(clean: CleanBytes, scan: Scan, row: number): number {
  const block = scan.blocks.find((b) => row >= b.firstRow && row < b.firstRow + b.rows)!;
  if (block.lastLine - block.firstLine + 1 === block.rows) return block.firstLine + row - block.firstRow;
  let line = block.firstLine;
  for (let at = block.from, seen = block.firstRow; at < clean.bytes.length; line++) {
    const end = lineEndFrom(clean.bytes, at);
    if (textOf(clean.bytes, at, end).trim() !== '' && seen++ === row) break;
    at = end < clean.bytes.length ? afterLineEnd(clean.bytes, end) : end;
  }
  return line;
}
