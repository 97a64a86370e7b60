import { splitCells } from './cells';
import { detectorInHeading } from './detectors';
import { headingIsFrequency, headingIsTime } from './axis';
import { textNumberReader } from './numbers';
import { wordsOnly } from './preamble';
import type { Line } from './sample';
import { KEYS } from './settings';
import type { Template } from './template';
import { frequencyUnitIn, levelUnitIn } from './units';

export interface Headings {
  /** 1-based line of the names; the units may follow on a line of their own. */
  line: number | null;
  /** By file column, over the width of the rows. */
  cells: (string | null)[];
  /** Cells of the heading line as they stand, before they are laid over the rows. */
  count: number;
}

function isUnit(cell: string): boolean {
  const bare = cell.replace(/^[([]|[)\]]$/g, '').trim();
  return /^[kmg]?hz$/i.test(bare) || (/^d?b?\S{0,10}$/i.test(bare) && levelUnitIn(bare, true) !== null) || bare === '-';
}

function speaksOfColumns(cell: string): boolean {
  return (
    headingIsFrequency(cell) ||
    headingIsTime(cell) ||
    (levelUnitIn(cell)?.unit ?? null) !== null ||
    detectorInHeading(cell) !== null ||
    /level|ampl|trace|magnitude|pegel|value|factor|gain|loss|spectrum|niveau|\bdb\b/i.test(cell)
  );
}

/** Headings on the lines straight before the rows; null cells where there are none. */
export function headingsOf(before: readonly Line[], template: Template): Headings {
  const width = template.fileWidth;
  const none: Headings = { line: null, cells: Array<string | null>(width).fill(null), count: 0 };
  const read = textNumberReader(template);
  const cellsOf = ({ text }: Line) => {
    const bare = text.replace(/^\s*(["']?)\s*(?:[#!%;]|\/\/)+\s*/, '$1');
    const cells = splitCells(bare, template.delimiter);
    // Headings apart by runs of blanks may hold single blanks themselves: `Freq (MHz)   Level (dBuV)`.
    const padded = template.delimiter === ' ' ? bare.trim().split(/\t+| {2,}/) : cells;
    return padded.length === template.contents.length ? padded : cells;
  };
  const written = before.filter(({ text }) => text.trim() !== '');
  const nearest = written.at(-1);
  if (!nearest || template.contents.length < 2) return none;
  let cells = cellsOf(nearest);
  let line = nearest.line;
  const above = written.at(-2);
  if (above && cells.filter((cell) => cell !== '').length >= 2 && cells.every((cell) => cell === '' || isUnit(cell))) {
    const names = cellsOf(above);
    if (names.length >= cells.length - 1 && names.length >= 2 && names.every((cell) => read(cell) === null)) {
      cells = names.map((name, i) => (cells[i] ? `${name} [${cells[i]!.replace(/^[([]|[)\]]$/g, '')}]` : name));
      line = above.line;
    }
  }
  const filled = cells.filter((cell) => cell !== '');
  if (filled.length < 2 || cells.length > width + 1) return none;
  if (filled.some((cell) => read(cell) !== null)) return none;
  const isSetting = Object.entries(KEYS).some(([, key]) => key.test(wordsOnly(filled[0]!)));
  if (isSetting && !filled.some((cell) => headingIsFrequency(cell) && frequencyUnitIn(cell) === null)) {
    if (!headingIsFrequency(filled[0]!)) return none;
  }
  const plain = written.length === 1 || /^\s*["']?\s*[#!%]/.test(nearest.text);
  if (!plain && !filled.some(speaksOfColumns)) return none;
  return { line, cells: Array.from({ length: width }, (_, i) => cells[i] || null), count: filled.length };
}
