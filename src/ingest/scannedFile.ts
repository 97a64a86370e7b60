import { EXACT_POWERS } from './numbers';
import { prepareSteps, type Prepared } from './prepare';
import { scanSteps, type Scan } from './scan';

/** Whole numbers up to here have 15 digits, which Float64 tells apart whatever power of ten they are divided by. */
const FIFTEEN_DIGITS = 1e15;

/**
 * A file with what was found in its bytes. Recognising it, reading it and reading it again go over the bytes once as
 * long as they are given the same one; what they make of it is the same as from the bytes alone. Nobody changes what
 * it hands out.
 */
export class ScannedFile {
  private prepared: Prepared | null = null;
  private asWritten: Scan | null = null;

  constructor(readonly raw: Uint8Array) {}

  *prepare(): Generator<void, Prepared> {
    this.prepared ??= yield* prepareSteps(this.raw);
    return this.prepared;
  }

  /** @param shifts powers of ten per file column, for a frequency unit. Throws as `scanSteps` does. */
  *scan(shifts: number[] = []): Generator<void, Scan> {
    const { clean, template } = yield* this.prepare();
    if (template === null) throw new Error('The file holds no rows to scan');
    this.asWritten ??= yield* scanSteps(clean, template);
    return shiftedScan(this.asWritten, shifts) ?? (yield* scanSteps(clean, template, shifts));
  }
}

export function scannedFile(file: Uint8Array | ScannedFile): ScannedFile {
  return file instanceof ScannedFile ? file : new ScannedFile(file);
}

/**
 * The scan that would have been made with `shifts`, from the one made without; null where it cannot be proven to be.
 * A column of numbers with at most 15 digits around a mark is a column of whole numbers over one power of ten; when
 * dividing gives the value back, the whole number is the written one, and shifting it rounds once, as reading it does.
 */
function shiftedScan(scan: Scan, shifts: readonly number[]): Scan | null {
  const data = [...scan.data];
  for (const [i, column] of scan.columns.entries()) {
    const shift = shifts[column] ?? 0;
    if (shift === 0) continue;
    const moved = shiftedColumn(scan.data[i]!, scan.rows, scan.decimals[i]!, shift);
    if (moved === null) return null;
    data[i] = moved;
  }
  return { ...scan, data };
}

function shiftedColumn(values: Float64Array, rows: number, decimals: number, shift: number): Float64Array | null {
  const up = shift - decimals;
  if (decimals > 15 || Math.abs(up) > 22) return null;
  const over = EXACT_POWERS[decimals]!;
  const power = EXACT_POWERS[Math.abs(up)]!;
  const moved = new Float64Array(values.length);
  for (let row = 0; row < rows; row++) {
    const value = values[row]!;
    const whole = Math.round(value * over);
    if (!(Math.abs(whole) < FIFTEEN_DIGITS) || whole / over !== value) return null;
    moved[row] = up < 0 ? whole / power : whole * power;
  }
  return moved;
}
