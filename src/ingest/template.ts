import { headingIsFrequency } from './axis';
import { isComment, splitCells } from './cells';
import { textNumberReader, type NumberStyle, type TextNumberReader } from './numbers';
import type { Line } from './sample';
import { frequencyUnitIn, levelUnitIn } from './units';

/** What a column of the rows holds: numbers, nothing, text, or numbers with holes. */
export type Content = 'number' | 'empty' | 'text' | 'sparse';

/** The shape of one data row. Trailing empty cells are not part of it. */
export interface Template extends NumberStyle {
  delimiter: string;
  contents: Content[];
  /** Cells of the widest row, trailing empty ones included. */
  fileWidth: number;
  /** The file holds one row, and its headings say what it is. */
  alone?: boolean;
}

const DELIMITERS = [';', '\t', '|', ',', ' '];
const NUMBERISH = /^[\d.,;'’\s+\-−eE]+$/;
const DATE_OR_TIME = /^\d{1,4}([-/.])\d{1,2}\1\d{1,4}(?:[ T]\d.*)?$|^\d{1,2}:\d{2}/;
const GROUPED = /\d(?:[ '’\u00a0\u2009\u202f.,])\d{3}(?!\d)/;

/** One letter per cell: N number, E empty, T text, X digits that are no number in this style. */
function signature(cells: string[], read: TextNumberReader): string {
  let kinds = '';
  for (const cell of cells) {
    if (cell === '') kinds += 'E';
    else if (read(cell) !== null) kinds += 'N';
    else kinds += NUMBERISH.test(cell) && !DATE_OR_TIME.test(cell) ? 'X' : 'T';
  }
  return kinds.replace(/E+$/, '');
}

function numbersIn(kinds: string): number {
  let count = 0;
  for (const kind of kinds) if (kind === 'N') count++;
  return count;
}

interface Found {
  delimiter: string;
  style: NumberStyle;
  kinds: string;
  rows: number;
  all: Map<string, number>;
  fileWidth: number;
}

function stylesFor(delimiter: string, text: string): NumberStyle[] {
  const styles: NumberStyle[] = [{ decimal: '.', thousands: null }];
  if (delimiter !== ',' || /"[+-]?\d+,\d/.test(text)) styles.push({ decimal: ',', thousands: null });
  if (!GROUPED.test(text)) return styles;
  for (const { decimal } of [...styles]) {
    for (const thousands of [' ', "'", decimal === ',' ? '.' : ',']) {
      if (thousands !== delimiter) styles.push({ decimal, thousands });
    }
  }
  return styles;
}

/** Better is: more rows; then rows of numbers only; then the plainer reading, in the order the candidates are tried. */
function better(a: Found, b: Found | null): boolean {
  if (b === null || a.rows !== b.rows) return b === null || a.rows > b.rows;
  return !a.kinds.includes('T') && b.kinds.includes('T');
}

/**
 * File columns that the headings name beyond those the rows fill: finals beside a sweep stand in a few rows only, which
 * the sample may have missed.
 */
function headedBeyond(sample: readonly Line[], { delimiter, style, kinds }: Found): number[] {
  if (delimiter === ' ') return [];
  const read = textNumberReader(style);
  const written = sample.filter(({ text }) => text.trim() !== '');
  const first = written.findIndex(({ text }) => signature(splitCells(text, delimiter), read) === kinds);
  for (const { text } of written.slice(Math.max(0, first - 2), Math.max(0, first)).reverse()) {
    const cells = splitCells(text.replace(/^\s*["']?\s*(?:[#!%;]|\/\/)+\s*/, ''), delimiter);
    const named = (i: number) => (cells[i] ?? '') !== '' && read(cells[i]!) === null;
    if (![...kinds].every((kind, i) => kind === 'E' || named(i))) continue;
    return cells.flatMap((_, i) => ((kinds[i] ?? 'E') === 'E' && named(i) ? [i] : []));
  }
  return [];
}

/** A column that is often empty is sparse, and so is one that only its heading fills; a single short row is not. */
function contentsOf({ kinds, all, rows }: Found, headed: readonly number[]): Content[] {
  const width = kinds.length;
  const merged = [...all].filter(
    ([other, count]) =>
      other !== kinds &&
      count >= 3 &&
      count >= rows / 10 &&
      numbersIn(other) >= 2 &&
      [...kinds.padEnd(other.length, 'E')].every((kind, i) => {
        const its = other[i] ?? 'E';
        return its === kind || (its !== 'T' && kind !== 'T' && its !== 'X');
      }),
  );
  const widest = Math.max(width, ...merged.map(([other]) => other.length), ...headed.map((i) => i + 1));
  return Array.from({ length: widest }, (_, i) => {
    const kind = kinds[i] ?? 'E';
    const other = headed.includes(i) || merged.some(([its]) => (its[i] ?? 'E') !== kind);
    if (kind === 'T') return 'text';
    if (other) return 'sparse';
    return kind === 'N' ? 'number' : 'empty';
  });
}

/**
 * Delimiter, decimal mark and row shape that explain most lines of the sample.
 * @param announced the delimiter that a `sep=` line names
 * @returns null when no two lines hold two numbers in the same way, and the last is no row with headings of its own
 */
export function findTemplate(sample: readonly Line[], announced: string | null): Template | null {
  const lines = sample.filter(({ text }) => text.trim() !== '' && /\d/.test(text) && !isComment(text));
  const text = lines.map((line) => line.text).join('\n');
  let best: Found | null = null;
  for (const delimiter of announced === null ? DELIMITERS : [announced]) {
    if (delimiter === ' ' ? !/[ \t]/.test(text) : !text.includes(delimiter)) continue;
    const cells = lines.map((line) => splitCells(line.text, delimiter));
    const many = cells.filter((row) => row.length > 1);
    if (many.length < 2) continue;
    for (const style of stylesFor(delimiter, text)) {
      const read = textNumberReader(style);
      const all = new Map<string, number>();
      for (const row of many) {
        const kinds = signature(row, read);
        if (!kinds.includes('X')) all.set(kinds, (all.get(kinds) ?? 0) + 1);
      }
      let found: Found | null = null;
      for (const [kinds, rows] of all) {
        if (numbersIn(kinds) < 2 || rows < 2) continue;
        const next = { delimiter, style, kinds, rows, all, fileWidth: 0 };
        const wider = found !== null && rows * numbersIn(kinds) > found.rows * numbersIn(found.kinds);
        if (found === null || wider) found = next;
      }
      if (found === null || !better(found, best)) continue;
      const width = found.kinds.length;
      found.fileWidth = Math.max(...many.filter((row) => signature(row, read).length === width).map((r) => r.length));
      best = found;
    }
  }
  if (best === null) return loneRow(sample, announced);
  const contents = contentsOf(best, headedBeyond(sample, best));
  return {
    delimiter: best.delimiter,
    decimal: best.style.decimal,
    thousands: best.style.thousands,
    contents,
    fileWidth: Math.max(best.fileWidth, contents.length),
  };
}

/**
 * One row says nothing of its own shape. As the last line, under one of as many cells that name a frequency and a level
 * with their units, it is a list of one final.
 */
function loneRow(sample: readonly Line[], announced: string | null): Template | null {
  const [heading, row] = sample.filter(({ text }) => text.trim() !== '').slice(-2);
  if (!heading || !row) return null;
  for (const delimiter of announced === null ? DELIMITERS.filter((one) => one !== ' ') : [announced]) {
    const names = splitCells(heading.text, delimiter);
    const cells = splitCells(row.text, delimiter);
    const isAxis = (name: string) => headingIsFrequency(name) && frequencyUnitIn(name) !== null;
    const isLevel = (name: string) => (levelUnitIn(name)?.unit ?? null) !== null;
    if (cells.length < 2 || cells.length !== names.length || !names.some(isAxis) || !names.some(isLevel)) continue;
    for (const style of stylesFor(delimiter, row.text)) {
      const kinds = signature(cells, textNumberReader(style));
      if (kinds.includes('X') || numbersIn(kinds) < 2) continue;
      const contents = [...kinds].map((kind): Content => (kind === 'N' ? 'number' : kind === 'T' ? 'text' : 'empty'));
      return { delimiter, ...style, contents, fileWidth: cells.length, alone: true };
    }
  }
  return null;
}

/**
 * `30,5,33,4`: with a comma as decimal mark and as separator a row reads as twice its numbers. Leading zeros in every
 * second cell (`33,05`) or headings half as many as cells give it away.
 */
export function commaIsBoth(template: Template, sample: readonly Line[], headings: number | null): boolean {
  const width = template.contents.length;
  if (template.delimiter !== ',' || width % 2 !== 0 || template.contents.some((content) => content !== 'number')) {
    return false;
  }
  let zeros = false;
  for (const { text } of sample) {
    const cells = splitCells(text, ',');
    if (cells.length < width || !cells.slice(0, width).every((cell) => /^[+-]?\d+$/.test(cell))) {
      if (/\d\.\d/.test(text) && cells.length === width) return false;
      continue;
    }
    for (let i = 1; i < width; i += 2) {
      if (/^[+-]/.test(cells[i]!)) return false;
      if (/^0\d/.test(cells[i]!)) zeros = true;
    }
  }
  return zeros || headings === width / 2;
}
