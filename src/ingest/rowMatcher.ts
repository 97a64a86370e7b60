import { afterLineEnd } from './bytes';
import { EXACT_MANTISSA, EXACT_POWERS, numberFromBytes } from './numbers';
import type { Template } from './template';

/**
 * The fast reader: takes one row of plain numbers straight from the bytes.
 *
 * A number of up to 15 or 16 digits whose power of ten is within ±22 is one exact integer times or over one exact
 * power, so a single rounding gives what `Number()` gives (Clinger 1990). Everything else is handed to `Number()`.
 *
 * @returns a function of (position, target, index in target) that answers the position of the next line, or −1 when the
 *   line is not a row of this shape
 */
export function rowMatcher(
  bytes: Uint8Array,
  template: Template,
  shifts: readonly number[],
): (at: number, cells: Float64Array, out: number) => number {
  const width = template.contents.length;
  /** 0 number, 1 empty, 2 text, 3 sparse */
  const kinds = Uint8Array.from(template.contents, (c) => ['number', 'empty', 'text', 'sparse'].indexOf(c));
  const shift = Int32Array.from({ length: width }, (_, i) => shifts[i] ?? 0);
  const spaced = template.delimiter === ' ';
  const delimiter = spaced ? 32 : template.delimiter.charCodeAt(0);
  const mark = template.decimal === ',' ? 44 : 46;
  const comma = mark === 44;
  const tabDelimits = delimiter === 9;

  return (start, cells, out) => {
    const end = bytes.length;
    let p = start;
    let o = out;
    for (let c = 0; c < width; c++) {
      while (p < end && (bytes[p] === 32 || (bytes[p] === 9 && !tabDelimits))) p++;
      const kind = kinds[c];
      if (kind === 0 || kind === 3) {
        let byte = p < end ? bytes[p]! : 10;
        if (kind === 3 && (byte === delimiter || byte === 10 || byte === 13)) {
          cells[o++] = NaN;
        } else {
          const from = p;
          const negative = byte === 45;
          if (negative || byte === 43) byte = ++p < end ? bytes[p]! : 10;
          let mantissa = 0;
          let slow = false;
          const digitsFrom = p;
          while (byte >= 48 && byte <= 57) {
            if (mantissa > EXACT_MANTISSA) slow = true;
            else mantissa = mantissa * 10 + (byte - 48);
            byte = ++p < end ? bytes[p]! : 10;
          }
          let digits = p - digitsFrom;
          let power = shift[c]!;
          if (byte === mark) {
            const fractionFrom = p + 1;
            byte = ++p < end ? bytes[p]! : 10;
            while (byte >= 48 && byte <= 57) {
              if (mantissa > EXACT_MANTISSA) slow = true;
              else mantissa = mantissa * 10 + (byte - 48);
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
          let value: number;
          if (slow || power > 22 || power < -22) {
            value = mantissa === 0 && !slow ? (negative ? -0 : 0) : numberFromBytes(bytes, from, p, comma, shift[c]!);
            if (!Number.isFinite(value)) return -1;
          } else {
            value = power < 0 ? mantissa / EXACT_POWERS[-power]! : mantissa * EXACT_POWERS[power]!;
            if (negative) value = -value;
          }
          cells[o++] = value;
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
          if (p >= end || bytes[p] !== delimiter) return -1;
          p++;
        }
      }
    }
    while (p < end && (bytes[p] === 32 || bytes[p] === 9 || bytes[p] === delimiter)) p++;
    if (p >= end) return end;
    return bytes[p] === 10 || bytes[p] === 13 ? afterLineEnd(bytes, p) : -1;
  };
}
