import type { CleanBytes } from './bytes';
import { isComment } from './cells';
import { cutNumber, damageAt, looksBroken, type Damage } from './damage';
import { lineEndFrom, textOf } from './sample';
import type { Block, Scan } from './scan';

/** Rows that belong to one sweep, in file order. */
export interface Piece {
  name: string | null;
  startedAt: string | null;
  firstRow: number;
  rows: number;
  /** Index of the block it starts in, whose preamble speaks for it. */
  block: number;
}

export interface Resolved {
  pieces: Piece[];
  damage: Damage | null;
  remarks: { text: string; line: number | null }[];
}

function mainBlock(blocks: readonly Block[]): number {
  let main = 0;
  for (const [i, block] of blocks.entries()) if (block.rows > blocks[main]!.rows) main = i;
  return main;
}

export function mainBlockOf(scan: Scan): Block {
  return scan.blocks[mainBlock(scan.blocks)]!;
}

/**
 * Which blocks are sweeps, which belong together, and whether a row between or after them is broken.
 * @param axis column of `cells` that rises through a sweep; null for layouts whose rows are whole sweeps
 * @param declaredPoints the count the file states, to tell a cut last row
 */
export function resolveBlocks(
  clean: CleanBytes,
  scan: Scan,
  axis: number | null,
  declaredPoints: number | null,
): Resolved {
  const { blocks } = scan;
  const main = mainBlock(blocks);
  const most = blocks[main]!.rows;
  const remarks: Resolved['remarks'] = [];
  const along = scan.data[axis ?? 0]!;
  const at = (row: number) => along[row]!;
  const lastRow = (block: Block) => block.firstRow + block.rows - 1;
  const sense = Math.sign(at(lastRow(blocks[main]!)) - at(blocks[main]!.firstRow)) || 1;
  const step = Math.abs(at(lastRow(blocks[main]!)) - at(blocks[main]!.firstRow)) / Math.max(1, most - 1);
  const steady = (block: Block) => {
    let back = 0;
    for (let row = block.firstRow + 1; row <= lastRow(block); row++) if ((at(row) - at(row - 1)) * sense < 0) back++;
    return back <= 0.1 * block.rows;
  };
  const isPeer = (i: number) =>
    i === main || (axis !== null && blocks[i]!.rows >= Math.max(3, most * 0.05) && steady(blocks[i]!));

  const pieces: Piece[] = [];
  let joinsOn = false;
  for (const [i, block] of blocks.entries()) {
    const next = blocks[i + 1];
    const { gap } = block;
    const gapText = gap
      ? textOf(clean.bytes, gap.from, Math.min(lineEndFrom(clean.bytes, gap.from), gap.from + 4000))
      : '';
    const ahead = next && axis !== null ? (at(next.firstRow) - at(lastRow(block))) * sense : NaN;
    const touches = isPeer(i) || i + 1 === main;
    const continues = ahead >= 0 && ahead <= 5 * step && touches;
    const broken = gap !== null && looksBroken(gapText, scan, clean, block);
    const wordless = gap?.lines === 1 && !/[a-z]{2}/i.test(gapText);
    if (isPeer(i) || joinsOn) {
      const last = pieces.at(-1);
      if (joinsOn && last) last.rows += block.rows;
      else pieces.push({ name: null, startedAt: null, firstRow: block.firstRow, rows: block.rows, block: i });
    } else if (continues && (broken || wordless)) {
      pieces.push({ name: null, startedAt: null, firstRow: block.firstRow, rows: block.rows, block: i });
    } else if (block.rows > 1) {
      remarks.push({
        text: `Lines ${block.firstLine} to ${block.lastLine} hold ${block.rows} rows that are not part of a sweep; they were not read.`,
        line: block.firstLine,
      });
    }
    // `####` is an overflow in the place of a row, not a remark, when a frequency is missing there.
    const isRemark = isComment(gapText) && !(wordless && ahead > 1.5 * step);
    if (gap && touches && !isRemark) {
      if (broken && (continues || isPeer(i))) return { pieces, damage: damageAt(clean, scan, block, gap), remarks };
      if (continues && wordless) return { pieces, damage: damageAt(clean, scan, block, gap), remarks };
    }
    joinsOn = (isPeer(i) || joinsOn) && continues && gap !== null && isRemark;
  }
  const last = blocks.at(-1)!;
  const inLast = pieces.at(-1);
  if (inLast && lastRow(last) === inLast.firstRow + inLast.rows - 1) {
    const missing = declaredPoints !== null && axis !== null && inLast.rows < declaredPoints && pieces.length === 1;
    const cut = cutNumber(clean, scan, last, missing);
    if (cut) return { pieces, damage: cut, remarks };
    if (last.gap) {
      const { line, lines } = last.gap;
      const text = `${lines === 1 ? 'One line' : `${lines} lines`} after the last row, from line ${line}, hold no row and were not read.`;
      remarks.push({ text, line });
    }
  }
  return { pieces, damage: null, remarks };
}

/** Splits pieces where the axis returns to where it began: several sweeps under one another. */
export function splitAtRestarts(pieces: readonly Piece[], axis: Float64Array): Piece[] {
  return pieces.flatMap((piece) => {
    const starts = [piece.firstRow];
    const origin = axis[piece.firstRow];
    const distinct = axis[piece.firstRow + 1] !== origin;
    for (let row = piece.firstRow + 2; distinct && row < piece.firstRow + piece.rows; row++) {
      if (axis[row] === origin && axis[row - 1] !== origin) starts.push(row);
    }
    return starts.map((firstRow, i) => ({
      ...piece,
      firstRow,
      rows: (starts[i + 1] ?? piece.firstRow + piece.rows) - firstRow,
    }));
  });
}

/** Splits pieces where their first text cell changes from one stretch of rows to the next: named tables in one file. */
export function splitAtLabels(pieces: readonly Piece[], labelAt: (row: number) => string): Piece[] | null {
  const split: Piece[] = [];
  for (const piece of pieces) {
    let from = piece.firstRow;
    for (let row = from; row < piece.firstRow + piece.rows; row++) {
      if (row > from && labelAt(row) !== labelAt(row - 1)) {
        split.push({ ...piece, name: labelAt(from), firstRow: from, rows: row - from });
        from = row;
        if (split.length > 200) return null;
      }
    }
    split.push({ ...piece, name: labelAt(from), firstRow: from, rows: piece.firstRow + piece.rows - from });
  }
  return split.every((piece) => piece.rows >= 2) ? split : null;
}
