import { addFactor, factorAt, prepareFactorTable, type PreparedTable } from './factorTable';
import type { FactorQuantity, LevelUnit, LineUnit } from './kinds';
import type { PathTerm } from './types';
import { DBM_TO_DBUV_50_OHM, isLinear, isReceiverInput, toReceiverLevel } from './units';

/** What became of a point on its way from reading to level. */
export const POINT = { known: 0, notRead: 1, noFactor: 2 } as const;

/** A signal path made ready for many points of readings in one unit. */
export interface PreparedPath {
  readingUnit: LevelUnit;
  /** Null when the readings are relative and can never be a level. */
  levelUnit: LineUnit | null;
  terms: { sign: 1 | -1; rows: PreparedTable }[];
}

/** + for what is lost between the sample and the receiver, − for what is gained. Source: E = reading + AF + loss − gain. */
export function signOf(quantity: FactorQuantity): 1 | -1 {
  return quantity === 'gain' ? -1 : 1;
}

/**
 * The unit a level has after its applied terms: dBµV with an antenna factor is dBµV/m, dBµV without stays dBµV, and a
 * reading in dBµV/m, dBµA, dBµA/m or dBpW stays what it is. Null for a relative reading.
 * Throws RangeError when a term is applied to a reading that holds its corrections already, or two antenna factors
 * are applied: that would count something twice.
 */
export function levelUnitOf(readingUnit: LevelUnit, terms: readonly PathTerm[]): LineUnit | null {
  const applied = terms.filter((term) => term.applied);
  if (readingUnit === 'dB') return null;
  if (!isReceiverInput(readingUnit)) {
    if (applied.length > 0) {
      throw new RangeError(`Readings in ${readingUnit} take no factor; ${applied[0]!.name} would be counted twice.`);
    }
    return readingUnit as LineUnit;
  }
  const antennaFactors = applied.filter((term) => term.table.quantity === 'antenna-factor');
  if (antennaFactors.length > 1) {
    throw new RangeError(
      `Two antenna factors in one path: ${antennaFactors.map((term) => term.table.name).join(', ')}.`,
    );
  }
  return antennaFactors.length === 1 ? 'dBuV/m' : 'dBuV';
}

/** Throws as `levelUnitOf` and `checkFactorTable` do. */
export function preparePath(readingUnit: LevelUnit, terms: readonly PathTerm[]): PreparedPath {
  const levelUnit = levelUnitOf(readingUnit, terms);
  const applied = levelUnit === null ? [] : terms.filter((term) => term.applied);
  return {
    readingUnit,
    levelUnit,
    terms: applied.map(({ table }) => ({ sign: signOf(table.quantity), rows: prepareFactorTable(table) })),
  };
}

/**
 * What the applied terms add to a reading at a frequency, in dB: antenna factor + losses − gains. Zero without terms;
 * null when any applied table has no value there.
 */
export function correctionAt(terms: readonly PathTerm[], frequencyHz: number): number | null {
  let sum = 0;
  for (const { applied, table } of terms) {
    if (!applied) continue;
    const factor = factorAt(table, frequencyHz);
    if (factor === null) return null;
    sum += signOf(table.quantity) * factor.valueDb;
  }
  return sum;
}

/**
 * Levels of many points: reading, to dBµV where it was read at the receiver's input, then each applied term in its
 * order. `logHz` is ln of `frequencyHz`. Writes the level, and into `state` one of POINT; a level whose state is not
 * `known` is meaningless. Readings arrive as Float32, everything after is Float64.
 */
export function levelsInto(
  path: PreparedPath,
  frequencyHz: Float64Array,
  logHz: Float64Array,
  reading: Float32Array,
  level: Float64Array,
  state: Uint8Array,
): void {
  if (isLinear(path.readingUnit) || path.readingUnit === 'dB') {
    for (let i = 0; i < reading.length; i++) {
      const converted = toReceiverLevel(reading[i]!, path.readingUnit);
      level[i] = converted ?? 0;
      state[i] = converted === null ? POINT.notRead : POINT.known;
    }
  } else {
    const addDb = path.readingUnit === 'dBm' ? DBM_TO_DBUV_50_OHM : 0;
    for (let i = 0; i < reading.length; i++) {
      const value = reading[i]!;
      level[i] = value + addDb;
      state[i] = Number.isFinite(value) ? POINT.known : POINT.notRead;
    }
  }
  for (const { sign, rows } of path.terms) {
    addFactor(rows, sign, frequencyHz, logHz, level, state, POINT.noFactor);
  }
}
