import { levelUnitAfter, signOf } from './factorQuantity';
import { addFactor, prepareFactorTable, type PreparedTable } from './factorTable';
import type { LevelUnit, LineUnit } from './kinds';
import { stretchAt, stretchBelow, stretchesOf, sumAt, type PathStretch } from './pathStretches';
import type { PathTerm } from './types';
import { DBM_TO_DBUV_50_OHM, isLinear, isReceiverInput, toReceiverLevel } from './units';

/** What became of a point on its way from reading to level. */
export const POINT = { known: 0, notRead: 1, noFactor: 2 } as const;

/** A signal path made ready for many points of readings in one unit. */
export interface PreparedPath {
  readingUnit: LevelUnit;
  /** Null when the readings are relative and can never be a level. */
  levelUnit: LineUnit | null;
  /** As `stretchesOf`, with each stretch's terms made ready. */
  stretches: (PathStretch & { ready: PreparedTerm[] })[];
}
interface PreparedTerm {
  sign: 1 | -1;
  rows: PreparedTable;
}

/**
 * The unit a level has after its applied terms. A reading at the receiver's input becomes what its transducer says:
 * dBµV/m by an antenna factor, dBµV by a voltage division factor or without any, dBµA by a transfer impedance, dBµA/m by
 * a magnetic antenna factor, dBpW by a clamp factor. A reading in dBµV/m, dBµA, dBµA/m or dBpW stays what it is. Null
 * for a relative reading.
 * Throws RangeError when a term is applied to a reading that holds its corrections already, or two transducers are
 * applied at one frequency: that would count something twice. Also when the transducers of a path split by frequency
 * end in different units, and as `stretchesOf` does.
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
  const units = new Set<LineUnit>();
  for (const stretch of stretchesOf(applied)) {
    const transducers = (stretch.terms ?? []).filter(({ table }) => levelUnitAfter(table.quantity) !== null);
    if (transducers.length > 1) throw new RangeError(twice(transducers));
    const [transducer] = transducers;
    if (stretch.terms) units.add((transducer && levelUnitAfter(transducer.table.quantity)) ?? 'dBuV');
  }
  const [unit, ...others] = units;
  if (unit === undefined) throw new RangeError('The ranges of this path leave no frequency with all of its items.');
  if (others.length > 0) {
    throw new RangeError(`One path ends in ${[unit, ...others].join(' and in ')}; each unit needs a path of its own.`);
  }
  return unit;
}

function twice(transducers: readonly PathTerm[]): string {
  const names = transducers.map((term) => term.table.name).join(', ');
  const same = transducers.every((term) => term.table.quantity === 'antenna-factor');
  return same
    ? `Two antenna factors in one path: ${names}.`
    : `Two transducers at one frequency of one path: ${names}.`;
}

/** Throws as `levelUnitOf` and `checkFactorTable` do. */
export function preparePath(readingUnit: LevelUnit, terms: readonly PathTerm[]): PreparedPath {
  const levelUnit = levelUnitOf(readingUnit, terms);
  const stretches = stretchesOf(levelUnit === null ? [] : terms);
  const ready = new Map<PathTerm, PreparedTerm>();
  for (const term of stretches.flatMap((stretch) => stretch.terms ?? [])) {
    const { table } = term;
    if (!ready.has(term)) ready.set(term, { sign: signOf(table.quantity), rows: prepareFactorTable(table) });
  }
  return {
    readingUnit,
    levelUnit,
    stretches: stretches.map((one) => ({ ...one, ready: (one.terms ?? []).map((term) => ready.get(term)!) })),
  };
}

/**
 * What the applied terms add to a reading at a frequency, in dB: antenna factor + losses − gains, and so on by
 * `signOf`. Zero without terms; null where the path has no factor or any applied table has no value.
 */
export function correctionAt(terms: readonly PathTerm[], frequencyHz: number): number | null {
  const { terms: governing } = stretchAt(stretchesOf(terms), frequencyHz);
  return governing && sumAt(governing, frequencyHz);
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
  const { stretches } = path;
  if (stretches.length === 1) addStretch(stretches[0]!, frequencyHz, logHz, level, state);
  else addStretches(stretches, frequencyHz, logHz, level, state);
}

function addStretch(
  { terms, ready }: PreparedPath['stretches'][number],
  frequencyHz: Float64Array,
  logHz: Float64Array,
  level: Float64Array,
  state: Uint8Array,
): void {
  if (terms === null) state.fill(POINT.noFactor);
  for (const { sign, rows } of ready) addFactor(rows, sign, frequencyHz, logHz, level, state, POINT.noFactor);
}

/** Runs of neighbouring points within one stretch go through together; a point on an edge goes by what governs there. */
function addStretches(
  stretches: PreparedPath['stretches'],
  frequencyHz: Float64Array,
  logHz: Float64Array,
  level: Float64Array,
  state: Uint8Array,
): void {
  for (let first = 0; first < frequencyHz.length;) {
    const hz = frequencyHz[first]!;
    const within = stretches[stretchBelow(stretches, hz)]!;
    let end = first + 1;
    if (hz !== within.toHz) {
      while (end < frequencyHz.length && frequencyHz[end]! > within.fromHz && frequencyHz[end]! < within.toHz) end++;
    }
    const stretch = end > first + 1 ? within : stretches.find((one) => one === stretchAt(stretches, hz))!;
    const of = <T extends Float64Array | Uint8Array>(points: T) => points.subarray(first, end) as T;
    addStretch(stretch, of(frequencyHz), of(logHz), of(level), of(state));
    first = end;
  }
}
