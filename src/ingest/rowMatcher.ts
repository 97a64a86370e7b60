import { afterLineEnd } from './bytes';
import { EXACT_MANTISSA, EXACT_POWERS, numberFromBytes } from './numbers';
import { plainRowReader } from './plainRows';
import type { Template } from './template';
import { wideDecimal } from './wideDecimal';

/** Where a stretch of rows ended: position of the line that is no row (or of the next row), rows taken, last row's place. */
export interface Stretch {
  next: number;
  rows: number;
  lastFrom: number;
}

export interface RowMatcher {
  /** One row at `at` into `data[column][row]`; the position of the next line, or −1 when the line is no row. */
  one(at: number, data: readonly Float64Array[], row: number): number;
  /** Rows that follow one another, at most `most`. Keeps their byte offsets where `rowFrom` is given. */
  many(at: number, data: readonly Float64Array[], row: number, most: number, rowFrom: Uint32Array | null): Stretch;
  /** Per column of `data`: digits after the mark at most, above 15 where numbers were written in any other way. */
  decimals: Int32Array;
}

/** In place of a count of decimals: the numbers of this column are not all up to 15 digits around a mark. */
export const NO_PLAIN_DECIMALS = 99;

/**
 * The fast reader: takes rows of plain numbers straight from the bytes.
 *
 * A number of up to 15 or 16 digits whose power of ten is within ±22 is one exact integer times or over one exact
 * power, so a single rounding gives what `Number()` gives (Clinger 1990). Up to 22 digits go through `wideDecimal`,
 * which proves its rounding. Everything else is handed to `Number()`.
 */
export function rowMatcher(bytes: Uint8Array, template: Template, shifts: readonly number[]): RowMatcher {
  const width = template.contents.length;
  /** 0 number, 1 empty, 2 text, 3 sparse */
  const kinds = Uint8Array.from(template.contents, (c) => ['number', 'empty', 'text', 'sparse'].indexOf(c));
  const shift = Int32Array.from({ length: width }, (_, i) => shifts[i] ?? 0);
  /** From this column on a row may end early: nothing but sparse columns follows. */
  const mayEndAt = kinds.findLastIndex((kind) => kind !== 3 && kind !== 1) + 1;
  const spaced = template.delimiter === ' ';
  const delimiter = spaced ? 32 : template.delimiter.charCodeAt(0);
  const mark = template.decimal === ',' ? 44 : 46;
  const comma = mark === 44;
  const tabDelimits = delimiter === 9;
  const end = bytes.length;
  const decimals = new Int32Array(template.contents.length);
  const plainRow = plainRowReader(bytes, template, shifts, decimals);

  const one = (start: number, data: readonly Float64Array[], row: number): number => {
    let p = start;
    let o = 0;
    for (let c = 0; c < width; c++) {
      while (p < end && (bytes[p] === 32 || (bytes[p] === 9 && !tabDelimits))) p++;
      const kind = kinds[c];
      if (kind === 0 || kind === 3) {
        let byte = p < end ? bytes[p]! : 10;
        if (kind === 3 && (byte === delimiter || byte === 10 || byte === 13)) {
          data[o++]![row] = NaN;
        } else {
          const from = p;
          const negative = byte === 45;
          if (negative || byte === 43) byte = ++p < end ? bytes[p]! : 10;
          let mantissa = 0;
          let back = 0;
          let backDigits = 0;
          const digitsFrom = p;
          while (byte >= 48 && byte <= 57) {
            if (mantissa > EXACT_MANTISSA) {
              if (++backDigits <= 7) back = back * 10 + (byte - 48);
            } else mantissa = mantissa * 10 + (byte - 48);
            byte = ++p < end ? bytes[p]! : 10;
          }
          let digits = p - digitsFrom;
          let power = shift[c]!;
          if (byte === mark) {
            const fractionFrom = p + 1;
            byte = ++p < end ? bytes[p]! : 10;
            while (byte >= 48 && byte <= 57) {
              if (mantissa > EXACT_MANTISSA) {
                if (++backDigits <= 7) back = back * 10 + (byte - 48);
              } else mantissa = mantissa * 10 + (byte - 48);
              byte = ++p < end ? bytes[p]! : 10;
            }
            digits += p - fractionFrom;
            power -= p - fractionFrom;
          }
          if (digits === 0) return -1;
          if (byte === 101 || byte === 69) {
            byte = ++p < end ? bytes[p]! : 10;
            const down = byte === 45;
            if (down || byte === 43) byte = ++p < end ? bytes[p]! : 10;
            const exponentFrom = p;
            let exponent = 0;
            while (byte >= 48 && byte <= 57) {
              if (exponent < 100_000) exponent = exponent * 10 + (byte - 48);
              byte = ++p < end ? bytes[p]! : 10;
            }
            if (p === exponentFrom) return -1;
            power += down ? -exponent : exponent;
          }
          let value = NaN;
          if (backDigits === 0) {
            if (power >= -22 && power <= 22) {
              value = power < 0 ? mantissa / EXACT_POWERS[-power]! : mantissa * EXACT_POWERS[power]!;
            } else if (mantissa === 0) value = 0;
          } else if (backDigits <= 7 && power < 0 && power >= -22) {
            value = wideDecimal(mantissa, back, backDigits, -power);
          }
          if (digits > 15 || p - digitsFrom > digits + 1) decimals[o] = NO_PLAIN_DECIMALS;
          else if (shift[c]! - power > decimals[o]!) decimals[o] = shift[c]! - power;
          if (value === value) data[o++]![row] = negative ? -value : value;
          else {
            value = numberFromBytes(bytes, from, p, comma, shift[c]!);
            if (!Number.isFinite(value)) return -1;
            data[o++]![row] = value;
          }
        }
      } else if (kind === 2) {
        const from = p;
        while (p < end) {
          const byte = bytes[p]!;
          if (byte === 34) return -1;
          if (byte === delimiter || byte === 10 || byte === 13 || (spaced && byte === 9)) break;
          p++;
        }
        if (p === from) return -1;
      }
      if (c + 1 < width) {
        if (spaced) {
          if (p >= end || (bytes[p] !== 32 && bytes[p] !== 9)) return -1;
        } else {
          while (p < end && (bytes[p] === 32 || (bytes[p] === 9 && !tabDelimits))) p++;
          if (p >= end || bytes[p] !== delimiter) {
            if (c + 1 < mayEndAt || (p < end && bytes[p] !== 10 && bytes[p] !== 13)) return -1;
            for (let rest = c + 1; rest < width; rest++) if (kinds[rest] === 3) data[o++]![row] = NaN;
            break;
          }
          p++;
        }
      }
    }
    while (p < end && (bytes[p] === 32 || bytes[p] === 9 || bytes[p] === delimiter)) p++;
    if (p >= end) return end;
    return bytes[p] === 10 || bytes[p] === 13 ? afterLineEnd(bytes, p) : -1;
  };

  const many: RowMatcher['many'] = (start, data, row, most, rowFrom) => {
    let at = start;
    let rows = 0;
    let lastFrom = start;
    while (rows < most && at < end) {
      let next = plainRow === null ? -1 : plainRow(at, data, row + rows);
      if (next < 0) next = one(at, data, row + rows);
      if (next < 0) break;
      if (rowFrom) rowFrom[row + rows] = at;
      lastFrom = at;
      at = next;
      rows++;
    }
    return { next: at, rows, lastFrom };
  };
  return { one, many, decimals };
}
