import type { FactorTable } from './types';

/** A factor at one frequency and the two rows it lies between; both rows are the same one where a row was hit. */
export interface FactorAt {
  valueDb: number;
  lowerHz: number;
  lowerDb: number;
  upperHz: number;
  upperDb: number;
}

/** Throws RangeError unless the rows can be interpolated: not empty, equally many, finite, frequency > 0 and rising. */
export function checkFactorTable(table: FactorTable): void {
  const { frequencyHz, valueDb, name } = table;
  if (frequencyHz.length === 0) throw new RangeError(`${name} holds no rows.`);
  if (frequencyHz.length !== valueDb.length) {
    throw new RangeError(`${name} holds ${frequencyHz.length} frequencies and ${valueDb.length} values.`);
  }
  for (let row = 0; row < frequencyHz.length; row++) {
    const hz = frequencyHz[row]!;
    if (!Number.isFinite(hz) || hz <= 0) throw new RangeError(`${name}, row ${row + 1}: ${hz} Hz is no frequency.`);
    if (!Number.isFinite(valueDb[row])) throw new RangeError(`${name}, row ${row + 1}: ${valueDb[row]} is no value.`);
    if (row > 0 && hz <= frequencyHz[row - 1]!) {
      throw new RangeError(`${name}, row ${row + 1}: ${hz} Hz does not rise above ${frequencyHz[row - 1]} Hz.`);
    }
  }
}

/**
 * The table's value at a frequency, linear in dB over log f between its rows (common practice with calibration
 * tables); null outside the table, which is never extrapolated.
 */
export function factorAt(table: FactorTable, frequencyHz: number): FactorAt | null {
  const rows = prepareFactorTable(table);
  const row = rowBelow(rows.frequencyHz, frequencyHz);
  if (row < 0) return null;
  const lowerHz = rows.frequencyHz[row]!;
  const upper = frequencyHz === lowerHz ? row : row + 1;
  return {
    valueDb: valueInRow(rows, row, Math.log(frequencyHz)),
    lowerHz,
    lowerDb: rows.valueDb[row]!,
    upperHz: rows.frequencyHz[upper]!,
    upperDb: rows.valueDb[upper]!,
  };
}

/** A table made ready for many points: natural logarithms of its frequencies and the slope that starts at each row. */
export interface PreparedTable {
  frequencyHz: Float64Array;
  logHz: Float64Array;
  valueDb: Float64Array;
  slope: Float64Array;
}

/** Throws as `checkFactorTable` does. */
export function prepareFactorTable(table: FactorTable): PreparedTable {
  checkFactorTable(table);
  const frequencyHz = Float64Array.from(table.frequencyHz);
  const logHz = frequencyHz.map((hz) => Math.log(hz));
  const valueDb = Float64Array.from(table.valueDb);
  const slope = valueDb.map((db, row) =>
    row + 1 < valueDb.length ? (valueDb[row + 1]! - db) / (logHz[row + 1]! - logHz[row]!) : 0,
  );
  return { frequencyHz, logHz, valueDb, slope };
}

/**
 * Adds `sign` times the table's value to each level, in place. `logHz` holds the natural logarithm of `frequencyHz`.
 * Points outside the table keep their level and get `outside` written into `state`. The row is carried from point to
 * point, so a rising axis costs one pass; a jump in either direction is looked up.
 */
export function addFactor(
  rows: PreparedTable,
  sign: 1 | -1,
  frequencyHz: Float64Array,
  logHz: Float64Array,
  levelDb: Float64Array,
  state: Uint8Array,
  outside: number,
): void {
  const hz = rows.frequencyHz;
  const last = hz.length - 1;
  let row = 0;
  for (let i = 0; i < frequencyHz.length; i++) {
    const f = frequencyHz[i]!;
    if (!(f >= hz[0]! && f <= hz[last]!)) {
      state[i] = outside;
      continue;
    }
    if (f < hz[row]! || (row < last && f >= hz[row + 1]!)) {
      row++;
      if (row > last || f < hz[row]! || (row < last && f >= hz[row + 1]!)) row = rowBelow(hz, f);
    }
    levelDb[i] = levelDb[i]! + sign * valueInRow(rows, row, logHz[i]!);
  }
}

function valueInRow(rows: PreparedTable, row: number, logHz: number): number {
  return rows.valueDb[row]! + rows.slope[row]! * (logHz - rows.logHz[row]!);
}

/** The last row at or below a frequency; -1 outside the table. */
function rowBelow(hz: Float64Array, frequencyHz: number): number {
  if (!(frequencyHz >= hz[0]! && frequencyHz <= hz[hz.length - 1]!)) return -1;
  let low = 0;
  let high = hz.length - 1;
  while (low < high) {
    const middle = (low + high + 1) >> 1;
    if (hz[middle]! <= frequencyHz) low = middle;
    else high = middle - 1;
  }
  return low;
}
