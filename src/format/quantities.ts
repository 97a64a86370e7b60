import type { LevelUnit, LineUnit } from '@/emc/kinds';

/**
 * The only rounding a reader sees. Nothing here is computed with again: numbers go in unrounded, text comes out.
 * A figure that is not finite is a fault of the caller and throws; an absent one is null there and written `ABSENT`.
 */

/** U+2212: as wide as a figure, unlike the hyphen. */
export const MINUS = '\u2212';
/** U+202F: a thin gap that does not break the line (ISO 80000-1). It shows best in the mono, so counts go into a Figure. */
export const THIN_GAP = '\u202f';
/** What stands in a cell where there is no figure. */
export const ABSENT = '\u2013';

const UNIT_LABELS: Record<LevelUnit | LineUnit, string> = {
  dBuV: 'dBµV',
  dBm: 'dBm',
  'dBuV/m': 'dBµV/m',
  dBuA: 'dBµA',
  'dBuA/m': 'dBµA/m',
  dBpW: 'dBpW',
  V: 'V',
  mV: 'mV',
  uV: 'µV',
  W: 'W',
  mW: 'mW',
  dB: 'dB',
};

/** The trade's form of a unit: `dBuV/m` is written dBµV/m. */
export function unitLabel(unit: LevelUnit | LineUnit): string {
  return UNIT_LABELS[unit];
}

/** Digits before the point in groups of three, from four digits on: 12 934 and 7 709. */
function grouped(digits: string): string {
  const [whole = '', fraction] = digits.split('.');
  const gaps = whole.replace(/\B(?=(\d{3})+$)/g, THIN_GAP);
  return fraction === undefined ? gaps : `${gaps}.${fraction}`;
}

/** Half away from zero on the binary value, as toFixed does; what rounds to nothing carries no sign. */
function fixed(value: number, decimals: number): { negative: boolean; digits: string } {
  if (!Number.isFinite(value)) throw new RangeError(`${value} is no figure to show`);
  const digits = Math.abs(value).toFixed(decimals);
  if (digits.includes('e')) throw new RangeError(`${value} is too large to show`);
  return { negative: value < 0 && Number(digits) !== 0, digits };
}

/** Any figure with a fixed number of decimals, U+2212 and thin gaps: -1234.56 at one decimal is −1 234.6. */
export function formatFigure(value: number, decimals: number): string {
  const { negative, digits } = fixed(value, decimals);
  return (negative ? MINUS : '') + grouped(digits);
}

/** At most `decimals`, without trailing zeros: a setting (RBW 120 kHz), not a reading; no thin gap. */
export function formatTrimmed(value: number, decimals: number): string {
  const { negative, digits } = fixed(value, decimals);
  return (negative ? MINUS : '') + (digits.includes('.') ? digits.replace(/\.?0+$/, '') : digits);
}

/** A decibel figure without its unit, one decimal: 6.2, −31.1. */
export function formatDb(valueDb: number): string {
  return formatFigure(valueDb, 1);
}

/** A level with its unit: 37.4 dBµV/m. Linear units keep three decimals. */
export function formatLevel(value: number, unit: LevelUnit | LineUnit): string {
  const decimals = unit.startsWith('dB') ? 1 : 3;
  return `${formatFigure(value, decimals)} ${unitLabel(unit)}`;
}

export interface MarginText {
  figure: string;
  word: 'under' | 'over' | 'on the limit';
}

/** marginDb = limit − level, so positive is under. The word follows the rounded figure: −0.04 is on the limit. */
export function marginText(marginDb: number): MarginText {
  const { negative, digits } = fixed(marginDb, 1);
  if (Number(digits) === 0) return { figure: digits, word: 'on the limit' };
  return { figure: grouped(digits), word: negative ? 'over' : 'under' };
}

/** `2.6 under`, `6.2 over`, `0.0 on the limit`: never a bare sign, since both sign customs are alive in the trade. */
export function formatMargin(marginDb: number): string {
  const { figure, word } = marginText(marginDb);
  return `${figure} ${word}`;
}

/** The same with its unit for running text: `2.6 dB under`. */
export function formatMarginDb(marginDb: number): string {
  const { figure, word } = marginText(marginDb);
  return `${figure} dB ${word}`;
}

/** The 95 % interval of a margin from its expanded uncertainty: `7.5 under to 2.3 over`. */
export function formatMarginInterval(marginDb: number, expandedDb: number): string {
  return `${formatMargin(marginDb + expandedDb)} to ${formatMargin(marginDb - expandedDb)}`;
}

/** `±4.9 dB`, expanded uncertainty. */
export function formatUncertainty(expandedDb: number): string {
  return `±${fixed(expandedDb, 1).digits} dB`;
}

/** `421 kB`, `1.4 MB`: decimal prefixes, as a file manager on the receiver shows them. */
export function formatBytes(bytes: number): string {
  if (bytes < 1000) return `${formatFigure(bytes, 0)} B`;
  if (bytes < 999_500) return `${formatFigure(bytes / 1e3, 0)} kB`;
  if (bytes < 999_950_000) return `${formatFigure(bytes / 1e6, 1)} MB`;
  return `${formatFigure(bytes / 1e9, 1)} GB`;
}

/** A whole number with thin gaps: 12 934. */
export function formatCount(count: number): string {
  return formatFigure(count, 0);
}

/** Metres of height with two decimals, as a mast is set: `2.10`. */
export function formatHeight(heightM: number): string {
  return formatFigure(heightM, 2);
}

/** `3 m`, `0.8 m`: a distance is a name of a set-up, so it carries no idle zeros. */
export function formatDistance(distanceM: number): string {
  return `${formatTrimmed(distanceM, 2)} m`;
}

/** Whole degrees in three digits: `048`. 359.6 is written 000, since the table turns through. */
export function formatAzimuth(azimuthDeg: number): string {
  const turned = ((Math.round(azimuthDeg) % 360) + 360) % 360;
  return fixed(turned, 0).digits.padStart(3, '0');
}
