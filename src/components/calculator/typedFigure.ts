/** What a person typed, read or refused with the reason. */
export type Typed = { value: number } | { problem: string };

/** What a figure may be. */
export type Range = 'level' | 'not-negative' | 'above-zero' | 'vswr' | 'reflection' | 'count';

const FIGURE = /^[+-]?(?:\d+(?:[.,]\d*)?|[.,]\d+)(?:e[+-]?\d{1,3})?$/i;

/**
 * A figure with a decimal comma or point, thin gaps and either minus: `3,5`, `−41.2`, `12 934`, `1e-3`. A figure with
 * two decimal marks is refused, because nobody can tell which of them groups digits.
 */
export function readFigure(text: string, range: Range): Typed {
  const digits = text.replace(/[\u2212\u2013]/g, '-').replace(/[\s\u202f\u00a0]/g, '');
  if ((digits.match(/[.,]/g) ?? []).length > 1) {
    return { problem: `${text.trim()} has more than one decimal mark. Leave out what groups the digits.` };
  }
  if (!FIGURE.test(digits)) return { problem: `${text.trim()} is no figure. Type digits, such as 3,5 or 3.5.` };
  const value = Number(digits.replace(',', '.'));
  const problem = outside(value, range, text.trim());
  return problem === null ? { value } : { problem };
}

const MOST = 1e12;
const LEAST = 1e-12;
/** dB beyond this are a slip of the hand: 10⁵⁰ in power. */
const MOST_DB = 500;

/** Why a figure is outside its range, or null. Also used for frequencies, which are read with their unit. */
export function outside(value: number, range: Range, text: string): string | null {
  if (range === 'level') {
    return Math.abs(value) <= MOST_DB ? null : `${text} is beyond ${MOST_DB} dB either way.`;
  }
  if (value < 0) return `${text} is below zero. Type it without the sign.`;
  if (range === 'not-negative') return value <= MOST_DB ? null : `${text} is beyond ${MOST_DB}.`;
  if (range === 'reflection') {
    return value < 1 ? null : `${text} reflects everything or more. A reflection coefficient lies from 0 to below 1.`;
  }
  if (range === 'vswr') return value >= 1 && value <= MOST ? null : `${text} is no VSWR. It is at least 1.`;
  if (range === 'count') {
    return Number.isInteger(value) && value >= 1 && value <= 1e6 ? null : `${text} is no count. Type 1, 2 or more.`;
  }
  if (value === 0) return `${text} is not above zero.`;
  return value <= MOST && value >= LEAST ? null : `${text} is not within 10^−12 to 10^12.`;
}
