import type { FactorQuantity } from '@/emc/kinds';
import { runThrough } from './bytes';
import { factorUnit } from './factorShape';
import { IngestError } from './ingestError';
import { signOf, type Sign } from './lossOrGain';
import { networkTraces } from './network';
import { moved } from './numbers';
import { prepareSteps } from './prepare';
import { scanSteps } from './scan';
import { axisOf, levelsOf } from './series';
import { tableSteps } from './table';
import type { Recognition } from './types';
import { TO_HZ, type FrequencyUnit } from './units';

/** A person's answers for a table of corrections. */
export interface FactorChoice {
  frequencyUnit?: FrequencyUnit;
  /** For a table that does not say; `antenna-factor` where the equipment is an antenna. */
  quantity?: FactorQuantity;
  lossOrGain?: 'loss' | 'gain';
}

export interface ReadFactorTable {
  /** Heading or table name as written. */
  name: string;
  quantity: FactorQuantity;
  /** Ascending, in hertz. */
  frequencyHz: number[];
  /** Positive figures are what `quantity` says: a loss written as −1.9 dB reads 1.9. */
  valueDb: number[];
  unit: 'dB' | 'dB/m';
  unitStated: boolean;
}

/** What was chosen, else what the table says; a loss given all in negative figures is turned over. */
function settle(
  name: string,
  said: Sign,
  values: ArrayLike<number>,
  choice: FactorChoice,
): Sign & { quantity: FactorQuantity } {
  const quantity = choice.quantity ?? choice.lossOrGain ?? said.quantity;
  if (!quantity) {
    const message = `“${name}” does not say whether its figures are lost or gained. Say which before it is read.`;
    throw new IngestError(null, 'no word on loss or gain', 'loss or gain', message);
  }
  if (quantity === said.quantity) return { quantity, negate: said.negate };
  const allBelow = Array.from(values).every((value) => value <= 0) && Array.from(values).some((value) => value < 0);
  return { quantity, negate: quantity === 'loss' && allBelow };
}

/** Rows of a table of corrections rise; falling ones are turned round, anything else is refused. */
function rising(name: string, frequencyHz: number[], valueDb: number[]): [number[], number[]] {
  const falls = frequencyHz.length > 1 && frequencyHz[0]! > frequencyHz.at(-1)!;
  const [f, v] = falls ? [frequencyHz.toReversed(), valueDb.toReversed()] : [frequencyHz, valueDb];
  const bad = f.findIndex((value, i) => i > 0 && value <= f[i - 1]!);
  if (bad < 0) return [f, v];
  const message = `“${name}”: ${f[bad]} Hz follows ${f[bad - 1]} Hz. The frequencies of one table must rise; split the file.`;
  throw new IngestError(null, `${f[bad]} Hz after ${f[bad - 1]} Hz`, 'rising frequencies', message);
}

/**
 * Every table of corrections in a file: one per column of decibels, one per named stack, S21 of a two-port file.
 * @throws IngestError when the file was refused or an answer that it needs is missing
 */
export function readFactorTable(
  raw: Uint8Array,
  recognition: Recognition,
  choice: FactorChoice = {},
): ReadFactorTable[] {
  if (recognition.refusal) {
    const { line, found, expected, message } = recognition.refusal;
    throw new IngestError(line, found, expected, message);
  }
  const unit = choice.frequencyUnit ?? recognition.frequency.unit;
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
    const trace = networkTraces(clean, table, option).find(({ name }) => name === 'S21')!;
    const [frequencyHz, values] = rising('S21', inHz(axisOf(table, table.pieces[0]!)), [...trace.valueDb]);
    const { quantity, negate } = settle('S21', signOf('S21', 'dB', values), values, choice);
    const valueDb = negate ? values.map((value) => 0 - value) : values;
    return [{ name: 'S21', quantity, frequencyHz, valueDb, unit: 'dB', unitStated: true }];
  }
  return table.pieces.flatMap((piece) =>
    table.levelColumns.map((column) => {
      const heading = table.headings.cells[column] ?? `column ${column + 1}`;
      const several = table.levelColumns.length > 1;
      const name = piece.name === null ? heading : several ? `${piece.name}, ${heading}` : piece.name;
      const { unit: unitDb, stated } = factorUnit(table, column);
      const [frequencyHz, values] = rising(name, inHz(axisOf(table, piece)), [...levelsOf(table, piece, column)]);
      const all = table.pieces.flatMap((one) => [...levelsOf(table, one, column)]);
      const { quantity, negate } = settle(name, signOf(heading, unitDb, all), values, choice);
      const valueDb = negate ? values.map((value) => 0 - value) : values;
      return { name, quantity, frequencyHz, valueDb, unit: unitDb, unitStated: stated };
    }),
  );
}
