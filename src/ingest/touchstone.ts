import { shifted } from './numbers';
import { AGAIN, numberOf, TouchstoneError, wordsOf, type Options, type Word } from './touchstoneWords';
import { TO_HZ, type FrequencyUnit } from './units';

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
