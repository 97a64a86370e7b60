import { createHash } from 'node:crypto';
import { entriesOf } from './preamble';
import type { Table } from './table';

/** Serial numbers, dates and counts differ from file to file; the words around them do not. */
function withoutFigures(text: string): string {
  return text.toLowerCase().replace(/\d+/g, '#').replace(/\s+/g, ' ').trim();
}

/**
 * A signature of what identifies the layout of a file: delimiter, marks, headings with their units, number of columns
 * and the keys of its preamble. No value has a part in it, so that files of one export have the same one.
 */
export function shapeOf(table: Table): string {
  const { layout, headings, preamble, scan } = table;
  const { delimiter, decimal, thousands, contents, fileWidth } = scan.template;
  const keys = preamble.flatMap((line) => {
    const first = entriesOf([line], delimiter).find(({ values }) => values.length > 0);
    return first && first.key !== '' ? [withoutFigures(first.key)] : [];
  });
  const said = {
    layout,
    delimiter,
    decimal,
    thousands,
    // Rows of hops and of moments are as wide as the sweep has points.
    width: layout === 'pairs' ? fileWidth : null,
    text: layout === 'pairs' ? contents.map((content) => (content === 'text' ? 'text' : 'figures')) : null,
    headings: headings.cells.map((cell) => cell && cell.toLowerCase().trim()).filter((cell) => cell !== null),
    keys: [...new Set(keys)].sort(),
  };
  return createHash('sha256').update(JSON.stringify(said)).digest('hex');
}
