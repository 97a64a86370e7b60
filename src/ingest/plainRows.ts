import { EXACT_POWERS } from './numbers';
import type { Template } from './template';

/** One row at `at` into `data[column][row]`; the position of the next line, or −1 where the row is not of the plainest kind. */
export type PlainRow = (at: number, data: readonly Float64Array[], row: number) => number;

// Held as a local: a bundler may turn an imported name into a getter, which a loop over a million rows would feel.
const POWERS = EXACT_POWERS;

/**
 * The reader for what nearly every row of a long sweep is: numbers only, at most nine digits before the mark, nine after
 * it and fifteen in all, no exponent, one separator between, `\n` or `\r\n` after. Digits are then gathered as two
 * 32-bit integers; their sum is exact, and one division rounds once, as `Number()` does (Clinger 1990). It refuses every
 * other row, which the general reader takes.
 * @param decimals per column, raised to the digits after the mark that it met
 * @returns null where the template, a frequency unit or the file allows no such row
 */
export function plainRowReader(
  bytes: Uint8Array,
  template: Template,
  shifts: readonly number[],
  decimals: Int32Array,
): PlainRow | null {
  const width = template.contents.length;
  if (template.delimiter === ' ' || template.contents.some((content) => content !== 'number')) return null;
  if (shifts.some((shift) => shift !== undefined && shift !== 0)) return null;
  const delimiter = template.delimiter.charCodeAt(0);
  const mark = template.decimal === ',' ? 44 : 46;
  // Up to the last line end no loop over digits can run past the file, so none has to look where it ends.
  const lastEnd = bytes.lastIndexOf(10);

  return (at, data, row) => {
    if (at >= lastEnd) return -1;
    let p = at;
    for (let c = 0; c < width; c++) {
      while (bytes[p] === 32) p++;
      const negative = bytes[p] === 45;
      if (negative) p++;
      let from = p;
      let whole = 0;
      let digit = bytes[p]! - 48;
      while (digit >= 0 && digit <= 9) {
        whole = (Math.imul(whole, 10) + digit) | 0;
        digit = bytes[++p]! - 48;
      }
      const before = p - from;
      let value = whole;
      let after = 0;
      if (bytes[p] === mark && mark !== delimiter) {
        from = ++p;
        let fraction = 0;
        digit = bytes[p]! - 48;
        while (digit >= 0 && digit <= 9) {
          fraction = (Math.imul(fraction, 10) + digit) | 0;
          digit = bytes[++p]! - 48;
        }
        after = p - from;
        if (after > 9) return -1;
        const power = POWERS[after]!;
        value = (whole * power + fraction) / power;
        if (after > decimals[c]!) decimals[c] = after;
      }
      if (before > 9 || before === 0 || before + after > 15) return -1;
      data[c]![row] = negative ? -value : value;
      if (c + 1 < width && bytes[p++] !== delimiter) return -1;
    }
    if (bytes[p] === 10) return p + 1;
    return bytes[p] === 13 && bytes[p + 1] === 10 ? p + 2 : -1;
  };
}
