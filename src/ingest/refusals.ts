import { moved } from './numbers';
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
