import type { CleanBytes } from './bytes';
import { statsOf } from './columnStats';
import type { AxisUnit } from './frequency';
import { factorOnlyUnitIn, factorUnitIn, type WrittenFactorUnit } from './factorUnits';
import { signOf, signQuestion } from './lossOrGain';
import { networkTraces } from './network';
import { moved } from './numbers';
import type { OptionLine } from './prepare';
import { levelsOf } from './series';
import type { Table } from './table';
import type { Question, Recognition, RecognisedTrace } from './types';
import { levelUnitIn } from './units';

const FACTOR_WORD =
  /factor|\baf\b|loss|atten|gain|correction|transducer|\bdiff\b|insertion|voltage division|transfer ?imp|\bz ?t\b/i;
const LEVEL_WORD = /level|ampl|trace|magnitude|spectrum|pegel|peak|average|\bqp\b|\bdata\b/i;

/** Unit of a column of factors: what the heading says, else what the preamble says of all. */
export function factorUnit(table: Table, column: number): { unit: WrittenFactorUnit; stated: boolean } {
  const heading = factorUnitIn(table.headings.cells[column] ?? '');
  if (heading) return { unit: heading, stated: true };
  for (const { values, key } of [...table.entries].reverse()) {
    const unit = /unit/.test(key) ? factorUnitIn(values[0] ?? '', true) : null;
    if (unit) return { unit, stated: true };
  }
  return { unit: 'dB', stated: false };
}

/** A table of corrections: decibels without a receiver's settings, or a network-parameter file. */
export function isFactorTable(table: Table, option: OptionLine | null): boolean {
  if (option) return true;
  if (table.layout !== 'pairs') return false;
  const { settings } = table.declared;
  const set = [settings.rbwHz, settings.vbwHz, settings.sweepTimeS, settings.attenuationDb, settings.referenceLevel];
  if (set.some((value) => value !== null)) return false;
  const headings = table.levelColumns.map((column) => table.headings.cells[column] ?? '');
  return headings.every((heading, i) => {
    if (factorOnlyUnitIn(heading)) return true;
    const unit = levelUnitIn(heading);
    if (LEVEL_WORD.test(heading) && !FACTOR_WORD.test(heading)) return false;
    if (unit !== null) return unit.unit === 'dB' || unit.unit === 'dB/m';
    return FACTOR_WORD.test(heading) || factorUnit(table, table.levelColumns[i]!).stated;
  });
}

/** The parameters of a network file as traces in dB. */
export function factorTraces(
  clean: CleanBytes,
  table: Table,
  option: OptionLine,
  axis: Float64Array,
  shift: number,
): RecognisedTrace[] {
  return networkTraces(clean, table, option).map(({ name, column, valueDb }, index) => {
    const stats = statsOf(valueDb);
    return {
      index,
      column,
      name,
      unit: 'dB',
      unitEvidence: `line ${option.line}: ${option.text}`,
      detector: null,
      detectorAsWritten: null,
      mode: null,
      blank: false,
      linear: false,
      first: stats.first,
      last: stats.last,
      min: stats.min,
      minAtHz: moved(axis[stats.minRow]!, shift),
      max: stats.max,
      maxAtHz: moved(axis[stats.maxRow]!, shift),
    };
  });
}

/** What a table of corrections leaves open: unit of frequency, which table, loss or gain. */
export function factorQuestions(
  table: Table,
  axis: AxisUnit,
  raw: Float64Array,
  { traces, sweeps }: Pick<Recognition, 'traces' | 'sweeps'>,
): Question[] {
  const questions: Question[] = [];
  if (sweeps.length > 1) {
    const names = sweeps.map(({ name }) => name).join(', ');
    const text = `The file holds ${sweeps.length} tables (${names}). Which one is it? They are never merged.`;
    questions.push({ key: 'sweepIndex', text, proposal: '0', traceIndex: null });
  }
  if (axis.unit === null) {
    const text = `No line settles the unit of the frequencies, ${raw[0]} to ${raw[raw.length - 1]}. Which is it?`;
    questions.push({ key: 'frequencyUnit', text, proposal: axis.proposed, traceIndex: null });
  }
  for (const { index, name, column } of traces) {
    if (/^S(?:11|21|12|22)$/.test(name)) continue;
    const heading = table.headings.cells[column] ?? name;
    const values = table.pieces.flatMap((piece) => [...levelsOf(table, piece, column)]);
    const said = signOf(heading, factorUnit(table, column).unit, values);
    if (said.quantity !== null) continue;
    const text = signQuestion(name, said);
    questions.push({ key: 'lossOrGain', text, proposal: said.among?.[0] ?? 'loss', traceIndex: index });
  }
  return questions;
}
