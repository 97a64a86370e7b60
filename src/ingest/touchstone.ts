import type { FactorColumn } from './factorTable';
import { IngestError } from './ingestError';
import { signOf } from './lossOrGain';
import { shifted } from './numbers';
import type { Question } from './types';
import { TO_HZ, type FrequencyUnit } from './units';

/** A network-parameter file that cannot be had, with the 1-based column of the word that is wrong. */
export class TouchstoneError extends IngestError {
  readonly column: number | null;

  constructor(at: { line: number; column: number } | null, found: string, expected: string, next: string) {
    const where = at ? `Line ${at.line}, column ${at.column}: ` : '';
    super(at?.line ?? null, found, expected, `${where}${found}. ${next}`);
    this.column = at?.column ?? null;
  }
}

/** One parameter over frequency. */
export interface NetworkParameter {
  /** 20·log10 of the magnitude, negative through anything that loses; null where the magnitude is 0. */
  magnitudeDb: (number | null)[];
  /** Angle in degrees, over −180 up to 180 where it was computed, else as written. */
  phaseDeg: number[];
}

export interface NetworkFile {
  ports: 1 | 2;
  /** What both ports are stated to be terminated in. */
  referenceOhm: number;
  /** Rising, in hertz. */
  frequencyHz: number[];
  s11: NetworkParameter;
  /** Null for one port, which has no transmission. */
  s21: NetworkParameter | null;
}

interface Word {
  text: string;
  line: number;
  column: number;
}
interface Options {
  unit: FrequencyUnit;
  format: 'DB' | 'MA' | 'RI';
  referenceOhm: number;
}

const UNITS: Record<string, FrequencyUnit> = { HZ: 'Hz', KHZ: 'kHz', MHZ: 'MHz', GHZ: 'GHz' };
const NUMBER = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d{1,3})?$/;
const AGAIN = 'Export the file again.';

/** Ports by the ending of a file's name, `.s1p` or `.s2p`; null for any other. */
export function portsByName(name: string): 1 | 2 | null {
  const ports = /\.s([12])p$/i.exec(name)?.[1];
  return ports === undefined ? null : ports === '1' ? 1 : 2;
}

/**
 * Reads a one-port or two-port file: comments from `!` on, one option line before the data with the defaults GHz S MA
 * R 50 and words in any order and case (a later one is ignored), rows of 3 or 9 numbers that may be wrapped over lines
 * (S11, S21, S12, S22), and noise parameters after the data of a two-port, which are left out: they begin where the
 * frequency no longer rises and come five to a line. Source: Touchstone file format specification, revision 1.1.
 * @throws TouchstoneError with line and column when anything is otherwise
 */
export function readTouchstone(text: string, ports: 1 | 2): NetworkFile {
  const { options, words } = wordsOf(text);
  const width = ports === 1 ? 3 : 9;
  const data = ports === 2 ? withoutNoise(words, width) : words;
  const rows: number[][] = [];
  const frequencyHz: number[] = [];
  for (let from = 0; from < data.length; from += width) {
    const row = data.slice(from, from + width);
    if (row.length < width) {
      const found = `the last row breaks off after ${row.length} of ${width} numbers`;
      throw new TouchstoneError(row.at(-1)!, found, `${width} numbers in a row`, AGAIN);
    }
    const [hz, ...values] = [frequencyOf(row[0]!, options.unit), ...row.slice(1).map(numberOf)];
    if (frequencyHz.length > 0 && hz! <= frequencyHz.at(-1)!) {
      const found = `${row[0]!.text} does not rise above the frequency before it`;
      throw new TouchstoneError(row[0]!, found, 'rising frequencies', `A row holds ${width} numbers. ${AGAIN}`);
    }
    frequencyHz.push(hz!);
    rows.push(values);
  }
  if (rows.length === 0) throw new TouchstoneError(null, 'no rows of numbers', `rows of ${width} numbers`, AGAIN);
  const parameter = (at: number, name: string): NetworkParameter => {
    const pairs = rows.map((row, i) => polar(row[at]!, row[at + 1]!, options.format, data[i * width + at + 1]!, name));
    return { magnitudeDb: pairs.map(([db]) => db), phaseDeg: pairs.map(([, phase]) => phase) };
  };
  const s21 = ports === 2 ? parameter(2, 'S21') : null;
  return { ports, referenceOhm: options.referenceOhm, frequencyHz, s11: parameter(0, 'S11'), s21 };
}

/**
 * S21 as a table of corrections, to be settled as every other (`settleFactor`). Figures all at or below zero are a
 * loss; whether positive ones are what a part gains or a loss written without its sign is asked.
 * @throws TouchstoneError for a one-port, which has no S21, and where S21 is zero, which has no decibels
 */
export function touchstoneColumn(file: NetworkFile): FactorColumn {
  if (!file.s21) throw new TouchstoneError(null, 'a one-port file', 'a two-port file', 'Only S21 is a loss or a gain.');
  const writtenDb = file.s21.magnitudeDb.map((db, i) => {
    if (db !== null) return db;
    const found = `S21 is zero at ${file.frequencyHz[i]} Hz`;
    throw new TouchstoneError(null, found, 'a magnitude above zero', 'It has no decibels. Measure the part again.');
  });
  const said = writtenDb.some((db) => db > 0) ? { quantity: null, negate: false } : signOf('S21', 'dB', writtenDb);
  return { name: 'S21', frequencyHz: file.frequencyHz, writtenDb, said, unit: 'dB', unitStated: true, turned: false };
}

/** What has to be asked before the table is used: nothing for a loss, else loss or gain, with what is likelier. */
export function touchstoneQuestions(column: FactorColumn): Question[] {
  if (column.said.quantity !== null) return [];
  const { writtenDb } = column;
  const mixed = writtenDb.some((db) => db > 0) && writtenDb.some((db) => db < 0);
  const text = `“S21” is ${mixed ? 'partly above' : 'above'} 0 dB, as through an amplifier, or as a loss written without its sign. Which is it?`;
  return [{ key: 'lossOrGain', text, proposal: 'gain', traceIndex: 1 }];
}

function wordsOf(text: string): { options: Options; words: Word[] } {
  let options: Options | null = null;
  const words: Word[] = [];
  text
    .replace(/^\ufeff/, '')
    .split(/\r\n|\r|\n/)
    .forEach((written, i) => {
      const onLine = [...written.replace(/!.*$/, '').matchAll(/\S+/g)].map((match): Word => ({
        text: match[0],
        line: i + 1,
        column: match.index + 1,
      }));
      const [first] = onLine;
      if (!first) return;
      if (first.text.startsWith('#')) options ??= optionsOf(onLine);
      else if (first.text.startsWith('[')) {
        throw new TouchstoneError(first, `${first.text} is of version 2`, 'a version 1 file', 'Export as version 1.');
      } else if (!options) {
        throw new TouchstoneError(first, 'numbers without an option line', 'a line such as # GHz S MA R 50', AGAIN);
      } else words.push(...onLine);
    });
  if (!options) throw new TouchstoneError(null, 'no option line', 'a line such as # GHz S MA R 50', AGAIN);
  return { options, words };
}

/** `#` alone is GHz S MA R 50; each word replaces its own default. */
function optionsOf([mark, ...rest]: Word[]): Options {
  const options: Options = { unit: 'GHz', format: 'MA', referenceOhm: 50 };
  const glued = mark!.text.length > 1 ? [{ ...mark!, text: mark!.text.slice(1), column: mark!.column + 1 }] : [];
  const words = [...glued, ...rest];
  for (let i = 0; i < words.length; i++) {
    const word = words[i]!;
    const upper = word.text.toUpperCase();
    if (UNITS[upper]) options.unit = UNITS[upper];
    else if (upper === 'DB' || upper === 'MA' || upper === 'RI') options.format = upper;
    else if (upper === 'R') {
      const ohm = words[++i];
      const value = ohm ? numberOf(ohm) : 0;
      if (!(value > 0)) {
        throw new TouchstoneError(ohm ?? word, 'R without a resistance above zero', 'R and a number of ohms', AGAIN);
      }
      options.referenceOhm = value;
    } else if (/^[YZGH]$/.test(upper)) {
      throw new TouchstoneError(word, `${upper} parameters`, 'S parameters', 'Export S parameters.');
    } else if (upper !== 'S') {
      throw new TouchstoneError(word, `“${word.text}” is no option`, 'unit, S, DB, MA or RI, R and ohms', AGAIN);
    }
  }
  return options;
}

/** Noise parameters follow a two-port's data, five to a line, from where the frequency no longer rises. */
function withoutNoise(words: Word[], width: number): Word[] {
  for (let from = width; from < words.length; from += width) {
    if (numberOf(words[from]!) > numberOf(words[from - width]!)) continue;
    const noise = words.slice(from);
    const perLine = new Map<number, number>();
    for (const { line } of noise) perLine.set(line, (perLine.get(line) ?? 0) + 1);
    if ([...perLine.values()].every((count) => count === 5)) {
      noise.forEach(numberOf);
      return words.slice(0, from);
    }
  }
  return words;
}

function numberOf(word: Word): number {
  const value = NUMBER.test(word.text) ? Number(word.text) : NaN;
  if (Number.isFinite(value)) return value;
  throw new TouchstoneError(word, `“${word.text}” is no number`, 'a number with a decimal point', AGAIN);
}

function frequencyOf(word: Word, unit: FrequencyUnit): number {
  if (numberOf(word) >= 0) return shifted(word.text, TO_HZ[unit]);
  throw new TouchstoneError(word, `${word.text} is no frequency`, 'a frequency of 0 or more', AGAIN);
}

function polar(a: number, b: number, format: Options['format'], at: Word, name: string): [number | null, number] {
  if (format === 'DB') return [a, b];
  if (format === 'MA') {
    if (a < 0) throw new TouchstoneError(at, `${name} of ${at.text}`, 'a magnitude of 0 or more', AGAIN);
    return [a === 0 ? null : 20 * Math.log10(a), b];
  }
  const magnitude = Math.hypot(a, b);
  return [magnitude === 0 ? null : 20 * Math.log10(magnitude), (Math.atan2(b, a) * 180) / Math.PI];
}
