import type { FactorQuantity, FactorUnit } from '@/emc/kinds';
import { runThrough } from './bytes';
import { factorUnit } from './factorShape';
import { IngestError } from './ingestError';
import { factorOnlyUnitIn } from './factorUnits';
import { signOf, signQuestion, turnsOver, type Sign } from './lossOrGain';
import { networkTraces } from './network';
import { moved } from './numbers';
import { prepareSteps } from './prepare';
import { lineOfRow, scanSteps } from './scan';
import { axisOf, levelsOf } from './series';
import { tableSteps } from './table';
import type { Recognition } from './types';
import { levelUnitIn, TO_HZ, type FrequencyUnit } from './units';

/** A person's answers for a table of corrections. */
export interface FactorChoice {
  frequencyUnit?: FrequencyUnit;
  /** For a table that does not say; `antenna-factor` where the equipment is an antenna. */
  quantity?: FactorQuantity;
  lossOrGain?: 'loss' | 'gain';
}

/** One table of a file as it is written there, before it is settled what its figures are. */
export interface FactorColumn {
  /** Heading or table name as written. */
  name: string;
  /** Ascending, in hertz. */
  frequencyHz: number[];
  /** As written: a loss may still stand there as a negative difference. */
  writtenDb: number[];
  said: Sign;
  unit: FactorUnit;
  unitStated: boolean;
  /** The frequencies fall in the file and were turned round. */
  turned: boolean;
}

export interface ReadFactorTable {
  name: string;
  quantity: FactorQuantity;
  /** Ascending, in hertz. */
  frequencyHz: number[];
  /** Positive figures are what `quantity` says: a loss written as −1.9 dB reads 1.9. */
  valueDb: number[];
  unit: FactorUnit;
  unitStated: boolean;
}

/**
 * What was chosen, else what the table says; a loss or a voltage division given all in negative figures is turned over,
 * and so is a transfer admittance. Null: nobody says.
 */
export function settleFactor(
  { said, writtenDb }: Pick<FactorColumn, 'said' | 'writtenDb'>,
  choice: FactorChoice = {},
): { quantity: FactorQuantity; negated: boolean; valueDb: number[] } | null {
  const quantity = choice.quantity ?? choice.lossOrGain ?? said.quantity;
  if (!quantity) return null;
  const allBelow = writtenDb.every((value) => value <= 0) && writtenDb.some((value) => value < 0);
  const negated = quantity === said.quantity ? said.negate : turnsOver(quantity) && allBelow;
  // From zero, so that 0 turned over is no negative zero.
  return { quantity, negated, valueDb: negated ? writtenDb.map((value) => 0 - value) : [...writtenDb] };
}

/** Rows of a table of corrections rise; falling ones are turned round, anything else is refused with its line. */
function rising(name: string, frequencyHz: number[], writtenDb: number[], lineOf: (row: number) => number) {
  const turned = frequencyHz.length > 1 && frequencyHz[0]! > frequencyHz.at(-1)!;
  const sense = turned ? -1 : 1;
  const bad = frequencyHz.findIndex((hz, i) => (i > 0 && (hz - frequencyHz[i - 1]!) * sense <= 0) || hz <= 0);
  if (bad >= 0) {
    const line = lineOf(bad);
    const [hz, before] = [frequencyHz[bad]!, frequencyHz[bad - 1]];
    if (hz <= 0) {
      const message = `Line ${line}: ${hz} Hz in “${name}” is no frequency. Take the row out.`;
      throw new IngestError(line, `${hz} Hz`, 'a frequency above 0 Hz', message);
    }
    if (hz === before) {
      const message = `Line ${line}: ${hz} Hz stands twice in “${name}”. A frequency has one factor; take one of the rows out.`;
      throw new IngestError(line, `${hz} Hz twice`, 'each frequency once', message);
    }
    const message = `Line ${line}: ${hz} Hz follows ${before} Hz in “${name}”. The frequencies of one table must rise; split the file.`;
    throw new IngestError(line, `${hz} Hz after ${before} Hz`, 'rising frequencies', message);
  }
  return turned
    ? { turned, frequencyHz: frequencyHz.toReversed(), writtenDb: writtenDb.toReversed() }
    : { turned, frequencyHz, writtenDb };
}

function refuseLinear(heading: string, line: number | null): void {
  if (factorOnlyUnitIn(heading) !== 'ohm') return;
  const message = `“${heading}” is in ohm. A transfer impedance is entered in dBΩ, which is 20 log10 of the figures in ohm.`;
  throw new IngestError(line, 'a transfer impedance in ohm', 'a transfer impedance in dBΩ', message);
}

/** Headings that name something else than a factor in dB or dB/m. */
function refuseOther(heading: string, line: number | null): void {
  if (factorOnlyUnitIn(heading)) return;
  const unit = levelUnitIn(heading);
  if (unit === null || unit.unit === 'dB' || unit.unit === 'dB/m') return;
  const message = `“${heading}” is in ${unit.written}, which is a level or another quantity and no correction. Upload a table in dB, dB/m, dBΩ, dB(S/m) or dB(pW/µV).`;
  throw new IngestError(line, unit.written, 'dB or dB/m', message);
}

/** @throws IngestError when the file was refused or lies otherwise than a table of corrections does */
function refuseRecognised({ refusal, layout, firstDataLine, columns, headerLine }: Recognition): void {
  for (const { heading } of columns) if (heading !== null) refuseLinear(heading, headerLine);
  if (refusal) throw new IngestError(refusal.line, refusal.found, refusal.expected, refusal.message);
  if (layout === 'pairs') return;
  const message = `Line ${firstDataLine}: a row holds a whole sweep. A table of corrections has a row per frequency.`;
  throw new IngestError(firstDataLine, 'a sweep per row', 'a row per frequency', message);
}

/**
 * Every table of corrections in a file as written: one per column of decibels, one per named stack, S21 of a two-port
 * file.
 * @throws IngestError when the file was refused, its frequency unit is not settled or its rows are no table
 */
export function factorColumns(
  raw: Uint8Array,
  recognition: Recognition,
  frequencyUnit?: FrequencyUnit,
): FactorColumn[] {
  refuseRecognised(recognition);
  const unit = frequencyUnit ?? recognition.frequency.unit;
  if (unit === null) {
    const message = 'The unit of the frequencies is not settled. Say which before the table is read.';
    throw new IngestError(null, 'no frequency unit', 'Hz, kHz, MHz or GHz', message);
  }
  const prepared = runThrough(prepareSteps(raw));
  const { template, clean, option } = prepared;
  if (template === null)
    throw new IngestError(null, 'no table of numbers', 'a table', 'The file is not the one that was recognised.');
  const scan = runThrough(scanSteps(clean, template));
  const settled = { layout: recognition.layout, axisColumn: recognition.frequency.column };
  const table = runThrough(tableSteps(prepared, scan, settled));
  const inHz = (axis: Float64Array) => Array.from(axis, (value) => moved(value, TO_HZ[unit]));

  if (option) {
    const piece = table.pieces[0]!;
    const trace = networkTraces(clean, table, option).find(({ name }) => name === 'S21')!;
    const line = (row: number) => lineOfRow(clean, scan, piece.firstRow + row);
    const rows = rising('S21', inHz(axisOf(table, piece)), [...trace.valueDb], line);
    return [{ name: 'S21', ...rows, said: signOf('S21', 'dB', rows.writtenDb), unit: 'dB', unitStated: true }];
  }
  return table.pieces.flatMap((piece) =>
    table.levelColumns.map((column) => {
      const heading = table.headings.cells[column] ?? `column ${column + 1}`;
      refuseOther(heading, table.headings.line);
      const several = table.levelColumns.length > 1;
      const name = piece.name === null ? heading : several ? `${piece.name}, ${heading}` : piece.name;
      const { unit: unitDb, stated } = factorUnit(table, column);
      const line = (row: number) => lineOfRow(clean, scan, piece.firstRow + row);
      const rows = rising(name, inHz(axisOf(table, piece)), [...levelsOf(table, piece, column)], line);
      const all = table.pieces.flatMap((one) => [...levelsOf(table, one, column)]);
      const unitHeld = unitDb === 'dBS' || unitDb === 'ohm' ? 'dBΩ' : unitDb;
      return { name, ...rows, said: signOf(heading, unitDb, all), unit: unitHeld, unitStated: stated };
    }),
  );
}

/**
 * The tables of `factorColumns`, settled.
 * @throws IngestError as it does, and when an answer on loss or gain is missing
 */
export function readFactorTable(
  raw: Uint8Array,
  recognition: Recognition,
  choice: FactorChoice = {},
): ReadFactorTable[] {
  return factorColumns(raw, recognition, choice.frequencyUnit).map((column) => {
    const { name, frequencyHz, unit, unitStated } = column;
    const settled = settleFactor(column, choice);
    if (!settled) {
      const message = signQuestion(name, column.said).replace('Which is it?', 'Say which before it is read.');
      throw new IngestError(null, 'no word on what the figures are', 'what the figures are', message);
    }
    const { quantity, valueDb } = settled;
    return { name, quantity, frequencyHz, valueDb, unit, unitStated };
  });
}
