import { IngestError } from './ingestError';
import type { FrequencyUnit } from './units';

/** A network-parameter file that cannot be had, with the 1-based column of the word that is wrong. */
export class TouchstoneError extends IngestError {
  readonly column: number | null;

  constructor(at: { line: number; column: number } | null, found: string, expected: string, next: string) {
    const where = at ? `Line ${at.line}, column ${at.column}: ` : '';
    super(at?.line ?? null, found, expected, `${where}${found}. ${next}`);
    this.column = at?.column ?? null;
  }
}

/** A word of the file and where it stands, both from 1. */
export interface Word {
  text: string;
  line: number;
  column: number;
}
export interface Options {
  unit: FrequencyUnit;
  format: 'DB' | 'MA' | 'RI';
  referenceOhm: number;
}

const UNITS: Record<string, FrequencyUnit> = { HZ: 'Hz', KHZ: 'kHz', MHZ: 'MHz', GHZ: 'GHz' };
const NUMBER = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d{1,3})?$/;
/** What to do about a file that is broken. */
export const AGAIN = 'Export the file again.';

/**
 * The option line and every word of the data, without comments.
 * @throws TouchstoneError without an option line before the data, and on one that says something else
 */
export function wordsOf(text: string): { options: Options; words: Word[] } {
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

/** @throws TouchstoneError when the word is no plain finite number */
export function numberOf(word: Word): number {
  const value = NUMBER.test(word.text) ? Number(word.text) : NaN;
  if (Number.isFinite(value)) return value;
  throw new TouchstoneError(word, `“${word.text}” is no number`, 'a number with a decimal point', AGAIN);
}
