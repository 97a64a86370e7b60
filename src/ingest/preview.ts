import { splitCells } from './cells';
import type { Prepared } from './prepare';
import { lineEndFrom, linesFrom, textOf } from './sample';
import type { Table } from './table';
import type { Recognition } from './types';

const LONGEST = 200;

type PreviewLine = Recognition['preview'][number];

/** Up to 12 lines as they stand: the first ones, the heading, the first rows and the last row, or the rows before a broken one. */
export function previewOf({ clean }: Prepared, table: Table): PreviewLine[] {
  const { delimiter } = table.scan.template;
  const { main, headings, damage } = table;
  const rowLine = (line: number, text: string): PreviewLine => {
    const cut = text.slice(0, LONGEST);
    return { line, text: cut, role: 'row', cells: splitCells(cut, delimiter) };
  };
  const preview: PreviewLine[] = table.preamble
    .filter(({ text }) => text.trim() !== '')
    .slice(0, headings.line === null ? 5 : 4)
    .map(({ line, text }) => ({ line, text: text.slice(0, LONGEST), role: 'preamble', cells: null }));
  const from =
    headings.line === null ? null : linesFrom(clean, 0, 1, main.firstLine).find(({ line }) => line === headings.line);
  if (from) {
    const text = from.text.slice(0, LONGEST);
    preview.push({ line: from.line, text, role: 'heading', cells: splitCells(text, delimiter) });
  }
  const rows = linesFrom(clean, main.from, main.firstLine, Math.min(main.rows, 5), main.next - main.from);
  preview.push(...rows.map(({ line, text }) => rowLine(line, text)));
  if (main.lastLine > main.firstLine + rows.length - 1) {
    preview.push(rowLine(main.lastLine, textOf(clean.bytes, main.lastFrom, lineEndFrom(clean.bytes, main.lastFrom))));
  }
  if (damage && damage.line > preview.at(-1)!.line) preview.push(rowLine(damage.line, damage.text));
  return preview.slice(0, 12);
}

/** The first lines of a file that holds no table. */
export function bareLines({ clean, sample }: Prepared): PreviewLine[] {
  if (clean.controlShare > 0.1) return [];
  return sample
    .filter(({ text }) => text.trim() !== '')
    .slice(0, 8)
    .map(({ line, text }) => ({ line, text: text.slice(0, LONGEST), role: 'preamble', cells: null }));
}
