import { moved, textNumberReader } from './numbers';
import { isMarkup, type Prepared } from './prepare';
import type { Table } from './table';
import type { Recognition } from './types';
import { TO_HZ, type FrequencyUnit } from './units';

export type Refusal = NonNullable<Recognition['refusal']>;

function inMegahertz(raw: number, unit: FrequencyUnit | null): string {
  return unit === null ? String(raw) : `${moved(raw, TO_HZ[unit] - 6)} MHz`;
}

function columns(count: number): string {
  return count === 1 ? '1 column' : `${count} columns`;
}

/** A file that holds no rows of numbers at all. */
export function noTable({ clean, sample }: Prepared): Refusal {
  const expected = 'rows of a frequency and a level';
  if (clean.bytes.length === 0) {
    return { line: null, found: 'an empty file', expected, message: 'The file is empty. Export the trace again.' };
  }
  if (clean.controlShare > 0.1) {
    const message = 'This is no text file. Export the trace as text: one row per frequency.';
    return { line: null, found: 'binary data', expected, message };
  }
  if (isMarkup(sample)) {
    const message =
      'This is JSON or markup and holds no rows of a trace. Export the trace as CSV: one row per frequency.';
    return { line: 1, found: 'JSON or markup', expected, message };
  }
  const single = sample.filter(({ text }) => /^\s*[+-]?\d+(?:[.,]\d+)?(?:[eE][+-]?\d+)?\s*$/.test(text));
  const [first] = single;
  if (first && single.length >= 2) {
    const message = `Line ${first.line} holds one number, and so do those after it: levels without frequencies. Export the trace with its frequencies.`;
    return { line: first.line, found: 'one number per line', expected, message };
  }
  const message =
    'No two lines hold a frequency and a level in the same way. Export the trace as a table: one row per frequency.';
  return { line: null, found: 'no table of numbers', expected, message };
}

/** `30,5,33,4`: nobody can tell where one number ends. */
export function commaTwice(line: number, text: string): Refusal {
  return {
    line,
    found: text.slice(0, 80),
    expected: 'a decimal mark that is not the separator',
    message: `Line ${line}: the comma is both decimal mark and separator. Export with a semicolon or a tab between columns, or with decimal points.`,
  };
}

export function notOverFrequency({ noAxis }: Table): Refusal {
  const { found, line } = noAxis!;
  return {
    line,
    found,
    expected: 'a column of frequencies',
    message: `Line ${line}: ${found}. A sweep needs levels over frequency. Export the trace over frequency.`,
  };
}

/** What a broken row lacks, in words, and after how many characters of it that belongs. */
export function missingIn(table: Table): { missing: string; after: number } {
  const damage = table.damage!;
  const { delimiter, contents } = table.scan.template;
  const width = contents.length;
  const text = damage.text.trimEnd().slice(0, 200);
  const name = (column: number) =>
    table.headings.cells[column]?.replace(/\s*[([][^)\]]*[)\]]\s*$/, '').slice(0, 40) || `column ${column + 1}`;
  const endOf = (column: number) => {
    if (delimiter === ' ' || text.includes('"')) return text.length;
    return Math.min(
      text.length,
      text
        .split(delimiter)
        .slice(0, column + 1)
        .join(delimiter).length,
    );
  };
  if (damage.cut) return { missing: 'the rest of this number is missing', after: text.length };
  const filled = damage.cells.filter((cell) => cell !== '').length;
  if (filled > width) return { missing: `${columns(width)} expected`, after: text.length };
  const empty = contents.flatMap((content, i) => (content !== 'sparse' && (damage.cells[i] ?? '') === '' ? [i] : []));
  const needed = empty.filter((i) => contents[i] !== 'empty');
  const [first] = needed;
  if (first !== undefined) {
    const missing = needed.length === 1 ? `${name(first)} is missing` : `${columns(needed.length)} are missing`;
    return { missing, after: endOf(first) };
  }
  const read = textNumberReader(table.scan.template);
  const wrong = contents.findIndex((content, i) => content === 'number' && read(damage.cells[i] ?? '') === null);
  return { missing: 'a number belongs here', after: wrong < 0 ? text.length : endOf(wrong) };
}

/** A row that is not whole: where, what is there, what belongs there, how far the file was read. */
export function brokenRow(table: Table, unit: FrequencyUnit | null): Refusal {
  const damage = table.damage!;
  const { scan, axisColumn, hop, pieces } = table;
  const width = scan.template.contents.length;
  const filled = damage.cells.filter((cell) => cell !== '').length;
  const axis = hop ? hop.low : axisColumn === null ? null : scan.columns.indexOf(axisColumn);
  const read = damage.rowBefore - (pieces[0]?.firstRow ?? 0) + 1;
  const upTo = axis === null || read < 1 ? '' : ` up to ${inMegahertz(scan.data[axis]![damage.rowBefore]!, unit)}`;
  const declared = table.declared.settings.declaredPoints;
  const points = table.layout === 'pairs' ? 'points' : 'rows';
  const count = `${read} ${points} were read before it${upTo}${declared === null ? '' : `; ${declared} are declared`}.`;
  const ends = damage.atEnd ? ' The file ends there.' : '';
  const expected =
    declared === null
      ? `${columns(width)}, as in the lines before`
      : `${columns(width)} and ${declared} points; ${read} read`;
  const next = ' Export the file again.';
  if (damage.cut) {
    const message = `Line ${damage.line} breaks off inside “${damage.text.slice(-40)}”.${ends} ${count}${next}`;
    return { line: damage.line, found: damage.text.slice(0, 80), expected, message };
  }
  if (filled !== width) {
    const message = `Line ${damage.line} has ${columns(filled)}; the lines before it have ${width}.${ends} ${count}${next}`;
    return { line: damage.line, found: columns(filled), expected, message };
  }
  const message = `Line ${damage.line} is not a row of numbers: “${damage.text.slice(0, 80)}”.${ends} ${count}${next}`;
  return { line: damage.line, found: damage.text.slice(0, 80), expected, message };
}
