import type { CleanBytes } from './bytes';
import { splitCells } from './cells';
import { textNumberReader } from './numbers';
import { lineEndFrom, linesFrom, textOf } from './sample';
import type { Block, Scan } from './scan';

/** A row that is not whole. */
export interface Damage {
  line: number;
  /** Byte offset of the line. */
  from: number;
  text: string;
  cells: string[];
  /** Row of the scan that comes before it. */
  rowBefore: number;
  /** The file ends with this line. */
  atEnd: boolean;
  /** The row has all its cells, but the last one is cut. */
  cut: boolean;
}

const DIGITS_ONLY = /^[\s\d.,;:+\-−eE|"'/]+$/;
const DATE = /^\s*\d{1,4}([-/.])\d{1,2}\1\d{2,4}\b|^\s*\d{1,2}:\d{2}/;

/** Does this line look like a row that broke, rather than like a heading or a footer? */
export function looksBroken(text: string, scan: Scan, clean: CleanBytes, block: Block): boolean {
  const { template } = scan;
  const cells = splitCells(text, template.delimiter);
  const firstNumber = template.contents.findIndex((content) => content === 'number');
  if (firstNumber === 0) {
    if (textNumberReader(template)(cells[0] ?? '') !== null) return true;
    return DIGITS_ONLY.test(text) && /\d/.test(text) && !DATE.test(text);
  }
  const last = textOf(clean.bytes, block.lastFrom, lineEndFrom(clean.bytes, block.lastFrom));
  const [label = ''] = splitCells(last, template.delimiter);
  return cells[0] === label || (DATE.test(label) && DATE.test(cells[0] ?? '')) || DIGITS_ONLY.test(text);
}

export function damageAt(clean: CleanBytes, scan: Scan, block: Block, gap: NonNullable<Block['gap']>): Damage {
  const end = lineEndFrom(clean.bytes, gap.from);
  const text = textOf(clean.bytes, gap.from, Math.min(end, gap.from + 2000));
  const rest = textOf(clean.bytes, end, Math.min(end + 16, clean.bytes.length));
  return {
    line: gap.line,
    from: gap.from,
    text,
    cells: splitCells(text, scan.template.delimiter),
    rowBefore: block.firstRow + block.rows - 1,
    atEnd: rest.trim() === '' && end + 16 >= clean.bytes.length,
    cut: false,
  };
}

/** A line and its neighbours as they stand, three before it and two after it; null past the end of the file. */
export function linesAround(clean: CleanBytes, damage: Damage): { line: number; text: string | null }[] {
  const reach = Math.max(0, damage.from - 8192);
  const before = linesFrom(clean, reach, 0, 8192, 8192)
    .filter(({ from }) => from < damage.from)
    .slice(reach === 0 ? 0 : 1)
    .slice(-3);
  const [own, ...after] = linesFrom(clean, damage.from, damage.line, 3);
  const texts = [...before, own, after[0], after[1]].map((line) => line?.text.slice(0, 200) ?? null);
  return texts.map((text, i) => ({
    line: damage.line - before.length + i,
    text: i > before.length && !text ? null : text,
  }));
}

/** Digits after the decimal mark of the last cell of each of a block's last rows. */
function lastDecimals(clean: CleanBytes, scan: Scan, block: Block): number[] {
  const { delimiter, decimal } = scan.template;
  const reach = Math.max(block.from, block.lastFrom - 4096);
  return linesFrom(clean, reach, 0, 200, 8192)
    .slice(reach === block.from ? 0 : 1)
    .filter(({ text, from }) => text.trim() !== '' && from <= block.lastFrom)
    .map(({ text }) => splitCells(text, delimiter).findLast((cell) => cell !== '') ?? '')
    .map((cell) => cell.split(decimal)[1]?.length ?? 0);
}

/** The file ends inside the last number: fewer decimals than every row before, or rows missing, and no line end. */
export function cutNumber(clean: CleanBytes, scan: Scan, block: Block, missing: boolean): Damage | null {
  if (clean.endsWithLineEnd || block.next < clean.bytes.length || block.rows < 2) return null;
  const decimals = lastDecimals(clean, scan, block);
  const last = decimals.pop() ?? 0;
  const fewer = decimals.length >= 20 && decimals.every((count) => count === decimals[0]) && last < decimals[0]!;
  if (!fewer && !missing) return null;
  const gap = { line: block.lastLine, from: block.lastFrom, lines: 1 };
  return { ...damageAt(clean, scan, block, gap), rowBefore: block.firstRow + block.rows - 2, cut: true };
}
