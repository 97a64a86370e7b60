import type { LineUnit } from '@/emc/kinds';
import { LINE_UNITS } from '@/emc/kinds';
import { decode } from './bytes';
import { delimiterName, isComment, splitCells } from './cells';
import { IngestError } from './ingestError';
import { textNumberReader, type NumberStyle } from './numbers';
import { statedIn, type Stated } from './stated';
import { frequencyUnitIn, levelUnitIn, proposeFrequencyUnit, type FrequencyUnit } from './units';

/** One row of a limit table as written: the frequencies and limits in it, and the rule it names. */
export interface LimitRow {
  line: number;
  /** Start and stop, or the one frequency of a break point. */
  frequencies: string[];
  /** At the start and at the stop; one where it is flat, or for a break point. */
  limits: number[];
  /** A last cell of words, such as `log frequency`. */
  rule: string | null;
}

/** What was read off a limit table, before anybody has confirmed it. */
export interface LimitTable {
  encoding: string;
  delimiter: string;
  decimalMark: '.' | ',';
  /** Segments have a start and a stop; break points have one frequency, and the line runs from one to the next. */
  shape: 'segments' | 'break-points';
  headings: { line: number; cells: string[] } | null;
  rows: LimitRow[];
  frequencyUnit: FrequencyUnit | null;
  frequencyEvidence: string | null;
  proposedFrequencyUnit: FrequencyUnit;
  unit: LineUnit | null;
  unitEvidence: string | null;
  stated: Stated;
  lines: { line: number; text: string }[];
}

const STYLES: { delimiter: string; decimal: '.' | ',' }[] = [
  ...['\t', ';', '|'].flatMap((delimiter) => (['.', ','] as const).map((decimal) => ({ delimiter, decimal }))),
  { delimiter: ',', decimal: '.' },
  { delimiter: ',', decimal: ',' },
  { delimiter: ' ', decimal: '.' },
  { delimiter: ' ', decimal: ',' },
];
const MOST_ROWS = 2000;

type Line = { line: number; text: string };
type Cells = { line: number; numbers: string[]; rule: string | null };

/** The numbers of a row and its last word; null where the line is no row of 2 to 4 numbers. */
function cellsOf({ line, text }: Line, delimiter: string, style: NumberStyle): Cells | null {
  const cells = splitCells(text, delimiter);
  while (cells.at(-1) === '') cells.pop();
  const last = cells.at(-1) ?? '';
  const rule = /^[a-z][a-z -]*$/i.test(last) ? last : null;
  const numbers = rule === null ? cells : cells.slice(0, -1);
  const read = textNumberReader(style);
  return numbers.length >= 2 && numbers.length <= 4 && numbers.every((cell) => read(cell) !== null)
    ? { line, numbers, rule }
    : null;
}

/** A column by its heading: a frequency, a limit, or neither said. */
function kindOf(heading: string): 'frequency' | 'limit' | null {
  if (/limit|level|value|d\s?b/i.test(heading) && frequencyUnitIn(heading) === null) return 'limit';
  if (frequencyUnitIn(heading) !== null || /freq|start|stop|\bfrom\b|\bto\b|\bvon\b|\bbis\b/i.test(heading))
    return 'frequency';
  return null;
}

function order(width: number, headings: string[] | null): { frequencies: number[]; limits: number[] } {
  const split = width === 2 ? 1 : 2;
  const standard = {
    frequencies: Array.from({ length: split }, (_, i) => i),
    limits: Array.from({ length: width - split }, (_, i) => split + i),
  };
  if (!headings) return standard;
  const kinds = headings.slice(0, width).map(kindOf);
  const named = { frequencies: [] as number[], limits: [] as number[] };
  kinds.forEach((kind, i) => kind && named[kind === 'frequency' ? 'frequencies' : 'limits'].push(i));
  const whole = named.frequencies.length + named.limits.length === width;
  return whole && named.frequencies.length === split ? named : standard;
}

function refuse(line: number | null, found: string, expected: string, message: string): never {
  throw new IngestError(line, found, expected, message);
}

/** The unit of the limits by heading or by a stated unit; another unit than a limit's is refused. */
function limitUnit(headings: LimitTable['headings'], stated: Stated) {
  const places = [
    ...(headings?.cells ?? []).map((text) => ({ text, line: headings!.line, alone: false })),
    ...(stated.unit ? [{ text: stated.unit.value, line: stated.unit.line, alone: true }] : []),
  ];
  for (const { text, line, alone } of places) {
    if (/(?:^|[^b])\(?\s*[µμu]\s?v\b/i.test(text) && !/d\s?b/i.test(text)) {
      const message = `Line ${line}: “${text}” gives the limits in microvolts. Give them in decibels: 100 µV/m is 40 dBµV/m.`;
      refuse(line, text, 'limits in dB', message);
    }
    const written = levelUnitIn(text, alone);
    if (!written || written.unit === 'dB') continue;
    const unit = LINE_UNITS.find((one) => one === written.unit);
    if (unit) return { unit, evidence: `line ${line}: ${text}` };
    const expected = 'dBµV/m, dBµV, dBµA, dBµA/m or dBpW';
    refuse(line, written.written, expected, `Line ${line}: “${text}” is no unit of a limit. Give them in ${expected}.`);
  }
  return { unit: null, evidence: null };
}

/**
 * What a table of limits says: segments (start, stop, limit at start, limit at stop; flat where the last is left out)
 * or break points (frequency, limit). Columns may stand in another order where their headings say so.
 * @throws IngestError with the line, what was found and what was expected
 */
export function recogniseLimitTable(raw: Uint8Array): LimitTable {
  const { text, encoding } = decode(raw);
  const lines = text.split('\n').map((one, i) => ({ line: i + 1, text: one }));
  const announced = /^\s*"?sep=(.)"?\s*$/i.exec(lines[0]?.text ?? '')?.[1] ?? null;
  const tried = STYLES.filter(({ delimiter }) => announced === null || delimiter === announced).map((style) => {
    const rows = lines.flatMap((one) => cellsOf(one, style.delimiter, { ...style, thousands: null }) ?? []);
    return { style, rows };
  });
  const best = tried.reduce((most, one) => (one.rows.length > most.rows.length ? one : most));
  const first = best.rows[0];
  if (!first) {
    const message =
      'No line holds a row of a limit line. A row is start, stop, limit at start, limit at stop; or frequency, limit.';
    refuse(null, 'no row of numbers', 'rows of frequencies and limits', message);
  }
  const { delimiter, decimal } = best.style;
  if (best.rows.length > MOST_ROWS) {
    const message = `The file holds ${best.rows.length} rows; a limit line has at most ${MOST_ROWS}.`;
    refuse(null, `${best.rows.length} rows`, 'a limit line', message);
  }
  const width = Math.max(...best.rows.map(({ numbers }) => numbers.length));
  const before = lines.filter(({ line, text: one }) => line < first.line && one.trim() !== '');
  const nearest = before.at(-1);
  const bare = nearest?.text.replace(/^\s*(?:[#!%]|\/\/)+\s*/, '');
  const written = bare === undefined ? [] : splitCells(bare, delimiter);
  while (written.at(-1) === '') written.pop();
  const isHeading =
    nearest !== undefined &&
    written.length >= 2 &&
    written.some((cell) => kindOf(cell) !== null) &&
    Object.keys(statedIn([nearest])).length === 0;
  const headings = isHeading ? { line: nearest.line, cells: written } : null;
  const known = new Map(best.rows.map((row) => [row.line, row]));
  for (const { line, text: one } of lines) {
    if (line < first.line || known.has(line) || one.trim() === '' || isComment(one)) continue;
    const expected = `${width} numbers, as in line ${first.line}`;
    const message = `Line ${line} is no row of the table: “${one.trim().slice(0, 80)}”. ${expected} are expected there.`;
    refuse(line, one.trim().slice(0, 80), expected, message);
  }
  const odd = best.rows.find(({ numbers }) => (width === 2 ? numbers.length !== 2 : numbers.length < 3));
  if (odd) {
    const found = `${odd.numbers.length} numbers`;
    refuse(
      odd.line,
      found,
      `${width} numbers`,
      `Line ${odd.line} holds ${found}; others hold ${width}. Give each row a start, a stop and its limits.`,
    );
  }
  if (
    delimiter === ',' &&
    headings &&
    headings.cells.filter((cell) => !/^(?:straight|shape|rule|between)/i.test(cell)).length < width
  ) {
    const message = `Line ${first.line}: the comma is both decimal mark and separator. Put semicolons between columns, or write decimal points.`;
    refuse(first.line, known.get(first.line)!.numbers.join(','), 'a decimal mark that is not the separator', message);
  }
  const stated = statedIn(before.filter(({ line }) => line !== headings?.line));
  const { frequencies, limits } = order(width, headings?.cells ?? null);
  const read = textNumberReader({ decimal, thousands: null });
  const plain = (cell: string) => (decimal === ',' ? cell.replace(',', '.') : cell).replace('\u2212', '-');
  const rows = best.rows.map(({ line, numbers, rule }) => ({
    line,
    rule,
    frequencies: frequencies.map((i) => plain(numbers[i]!)),
    limits: limits.flatMap((i) => (numbers[i] === undefined ? [] : [read(numbers[i])!])),
  }));
  const unitCell = headings?.cells.find((cell) => frequencyUnitIn(cell) !== null);
  const all = rows.flatMap((row) => row.frequencies.map(Number));
  const { unit, evidence } = limitUnit(headings, stated);
  return {
    encoding,
    delimiter: delimiterName(delimiter),
    decimalMark: decimal,
    shape: width === 2 ? 'break-points' : 'segments',
    headings,
    rows,
    frequencyUnit: unitCell === undefined ? null : frequencyUnitIn(unitCell),
    frequencyEvidence: unitCell === undefined ? null : `line ${headings!.line}: ${unitCell}`,
    proposedFrequencyUnit: proposeFrequencyUnit(Math.min(...all), Math.max(...all)),
    unit,
    unitEvidence: evidence,
    stated,
    lines: lines.filter(({ text: one }) => one !== '').slice(0, 40),
  };
}
