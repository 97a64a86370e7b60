import type { FactorColumn } from './factorTable';
import { signOf } from './lossOrGain';
import type { NetworkFile } from './touchstone';
import { TouchstoneError } from './touchstoneWords';
import type { Question } from './types';

/**
 * S21 as a table of corrections, to be settled as every other (`settleFactor`). Figures all at or below zero are a
 * loss; whether positive ones are what a part gains or a loss written without its sign is asked.
 * @throws TouchstoneError for a one-port, which has no S21, and where S21 is zero, which has no decibels
 */
export function touchstoneColumn(file: NetworkFile): FactorColumn {
  if (!file.s21) throw new TouchstoneError(null, 'a one-port file', 'a two-port file', 'Only S21 is a loss or a gain.');
  const writtenDb = file.s21.magnitudeDb.map((db, i) => {
    if (db !== null) return db;
    const found = `S21 is zero at ${file.frequencyHz[i]} Hz`;
    throw new TouchstoneError(null, found, 'a magnitude above zero', 'It has no decibels. Measure the part again.');
  });
  const said = writtenDb.some((db) => db > 0) ? { quantity: null, negate: false } : signOf('S21', 'dB', writtenDb);
  return { name: 'S21', frequencyHz: file.frequencyHz, writtenDb, said, unit: 'dB', unitStated: true, turned: false };
}

/** What has to be asked before the table is used: nothing for a loss, else loss or gain, with what is likelier. */
export function touchstoneQuestions(column: FactorColumn): Question[] {
  if (column.said.quantity !== null) return [];
  const { writtenDb } = column;
  const mixed = writtenDb.some((db) => db > 0) && writtenDb.some((db) => db < 0);
  const text = `“S21” is ${mixed ? 'partly above' : 'above'} 0 dB, as through an amplifier, or as a loss written without its sign. Which is it?`;
  return [{ key: 'lossOrGain', text, proposal: 'gain', traceIndex: 1 }];
}
