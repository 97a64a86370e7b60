/** How numbers are written in a file. */
export interface NumberStyle {
  decimal: '.' | ',';
  /** `.`, `,`, `'` or ` ` (any of the plain, no-break, thin and narrow no-break spaces); null when digits are not grouped. */
  thousands: string | null;
}

const GAP_CLASS: Record<string, string> = {
  ' ': '[ \\u00a0\\u2009\\u202f]',
  "'": "['\\u2019]",
  '.': '\\.',
  ',': ',',
};

export interface TextNumberReader {
  /** The written number as Float64, `shift` powers of ten up; null when the text is no finite number in this style. */
  (text: string, shift?: number): number | null;
}

/** Reads written numbers one by one, for headings, preambles and irregular rows. Agrees with `Number()` on plain text. */
export function textNumberReader(style: NumberStyle): TextNumberReader {
  const mark = style.decimal === '.' ? '\\.' : ',';
  const gap = style.thousands === null ? null : GAP_CLASS[style.thousands]!;
  // Whoever groups digits writes no zero before them: `00 150` and `075000` are pieces of other numbers.
  const whole = gap === null ? '\\d+' : `[1-9]\\d{0,2}(?:${gap}\\d{3})+|0|[1-9]\\d*`;
  const shape = new RegExp(`^[+-]?(?:(?:${whole})(?:${mark}\\d*)?|${mark}\\d+)(?:[eE][+-]?\\d{1,9})?$`);
  const gaps = gap === null ? null : new RegExp(gap, 'g');
  return (text, shift = 0) => {
    let written = text.trim();
    if (written.charCodeAt(0) === 0x2212) written = `-${written.slice(1)}`;
    if (!shape.test(written)) return null;
    if (gaps) written = written.replace(gaps, '');
    if (style.decimal === ',') written = written.replace(',', '.');
    const value = shift === 0 ? Number(written) : shifted(written, shift);
    return Number.isFinite(value) ? value : null;
  };
}

/** The correctly rounded value of a plain written number times a power of ten: `30.075` and 6 give 30075000 exactly. */
export function shifted(written: string, shift: number): number {
  const at = written.search(/[eE]/);
  if (at < 0) return Number(`${written}e${shift}`);
  return Number(`${written.slice(0, at)}e${Number(written.slice(at + 1)) + shift}`);
}

/** A value moved by a power of ten by way of its shortest decimal, so that no binary remainder shows. */
export function moved(value: number, shift: number): number {
  return shift === 0 ? value : shifted(String(value), shift);
}

/** Powers of ten that Float64 holds exactly (Clinger, "How to read floating point numbers accurately", 1990). */
export const EXACT_POWERS = Float64Array.from({ length: 23 }, (_, n) => Number(`1e${n}`));

/** Above this a further decimal digit could leave the integers that Float64 holds exactly. */
export const EXACT_MANTISSA = 900_719_925_474_098;

/** The slow side of the byte reader: hands the written characters to `Number()`. */
export function numberFromBytes(bytes: Uint8Array, from: number, to: number, comma: boolean, shift: number): number {
  let written = '';
  for (let i = from; i < to; i++) {
    const byte = bytes[i]!;
    written += comma && byte === 44 ? '.' : String.fromCharCode(byte);
  }
  return shift === 0 ? Number(written) : shifted(written, shift);
}
