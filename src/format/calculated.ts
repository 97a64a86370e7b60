import { formatBandwidth, formatFrequency } from './frequencies';
import { formatCount, formatFigure, formatTrimmed, marginText } from './quantities';

/** How a computed quantity is written. `scaled` takes an SI prefix before its unit, `ratio` none. */
export type QuantityForm = 'level' | 'margin' | 'scaled' | 'ratio' | 'count' | 'frequency' | 'setting' | 'duration';

/** A figure of the calculator, unrounded, in the unit it is computed in. */
export interface Quantity {
  value: number;
  unit: string;
  form: QuantityForm;
}

/** Its figure and its unit apart: `{ figure: '223.6', unit: 'mV' }`. */
export interface WrittenQuantity {
  figure: string;
  unit: string;
}

/** dB with two decimals, as conversions are tabulated; all else to four significant digits, a frequency as a reading. */
export function writeQuantity({ value, unit, form }: Quantity): WrittenQuantity {
  switch (form) {
    case 'level':
      return { figure: formatFigure(value, 2), unit };
    case 'margin': {
      const { figure, word } = marginText(value);
      return { figure, unit: `${unit} ${word}` };
    }
    case 'scaled':
      return scaled(value, unit);
    case 'ratio':
      return { figure: formatSignificant(value), unit };
    case 'count':
      return { figure: formatCount(value), unit };
    case 'frequency':
      return apart(formatFrequency(value));
    case 'setting':
      return apart(formatBandwidth(value));
    case 'duration':
      return apart(formatSeconds(value));
  }
}

/** `37.37 dBµV/m`: figure and unit as one text. */
export function formatQuantity(quantity: Quantity): string {
  const { figure, unit } = writeQuantity(quantity);
  return unit === '' ? figure : `${figure} ${unit}`;
}

const DIGITS = 4;

/** Four significant digits without idle zeros: 0.04775, 3, 1.257. Below 0.0001 and above 99 999 999 as a power of ten. */
export function formatSignificant(value: number): string {
  const rounded = Number(value.toPrecision(DIGITS));
  if (rounded === 0) return '0';
  const power = Math.floor(Math.log10(Math.abs(rounded)));
  if (power < -4 || power > 7)
    return `${formatTrimmed(rounded / 10 ** power, DIGITS - 1)} × 10^${formatTrimmed(power, 0)}`;
  const text = formatFigure(rounded, Math.max(0, DIGITS - 1 - power));
  return text.includes('.') ? text.replace(/\.?0+$/, '') : text;
}

const PREFIXES: readonly [number, string][] = [
  [1e9, 'G'],
  [1e6, 'M'],
  [1e3, 'k'],
  [1, ''],
  [1e-3, 'm'],
  [1e-6, 'µ'],
  [1e-9, 'n'],
  [1e-12, 'p'],
];

/** The prefix follows the rounded figure, so nothing reads 1 000 µV. */
function scaled(value: number, unit: string): WrittenQuantity {
  const rounded = Number(value.toPrecision(DIGITS));
  // decimal fractions of a prefix are not exact in binary
  const prefix = PREFIXES.find(([size]) => Math.abs(rounded) >= size * (1 - 1e-12));
  if (!prefix) return { figure: formatSignificant(value), unit };
  return { figure: formatSignificant(rounded / prefix[0]), unit: `${prefix[1]}${unit}` };
}

/** `0.97 s`, `14.1 s`, `47 min 00 s`, `5 h 23 min`: what a bench is asked for. */
export function formatSeconds(seconds: number): string {
  if (seconds < 59.95) return `${formatTrimmed(seconds, seconds < 1 ? 3 : 1)} s`;
  const whole = Math.round(seconds);
  if (whole < 3600) return `${Math.floor(whole / 60)} min ${String(whole % 60).padStart(2, '0')} s`;
  const minutes = Math.round(seconds / 60);
  return `${Math.floor(minutes / 60)} h ${String(minutes % 60).padStart(2, '0')} min`;
}

/** At the last gap when the unit is one word, else the whole stands as the figure. */
function apart(text: string): WrittenQuantity {
  const words = text.split(' ');
  return words.length === 2 ? { figure: words[0]!, unit: words[1]! } : { figure: text, unit: '' };
}
