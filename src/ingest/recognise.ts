import type { Piece } from './blocks';
import { runThrough } from './bytes';
import { delimiterName } from './cells';
import { describeColumns } from './columns';
import { correctionsOf } from './corrections';
import { factorQuestions, factorTraces, isFactorTable } from './factorShape';
import { axisRemarks, axisUnit, declaredSpan, describeAxis } from './frequency';
import { IngestError } from './ingestError';
import type { Prepared } from './prepare';
import { bareLines, previewOf } from './preview';
import { linesAround } from './damage';
import { shapeOf } from './shape';
import { questionsFor } from './questions';
import { brokenRow, commaTwice, missingIn, notOverFrequency, noTable, type Refusal } from './refusals';
import { scannedFile, type ScannedFile } from './scannedFile';
import { settingsOf } from './settings';
import { axisOf } from './series';
import { tableFor, tableSteps, type Table } from './table';
import { commaIsBoth } from './template';
import { tracesOf } from './traces';
import type { Recognition, RecognisedSettings, RecognisedTrace } from './types';
import { TO_HZ } from './units';

const MOST_SWEEPS = 2000;
/** Of fewer rows nobody can tell the column of frequencies from one of levels. */
const FEWEST_TO_KEEP = 10;

const NO_AXIS: Recognition['frequency'] = {
  column: null,
  unit: null,
  unitEvidence: null,
  proposedUnit: 'Hz',
  offset: false,
  firstHz: 0,
  lastHz: 0,
  points: 0,
  ascending: false,
  duplicates: 0,
  stepHz: 0,
  evenStep: false,
};

/** A refusal with whatever was recognised before it. */
function refused(prepared: Prepared, refusal: Refusal, table: Table | null): Recognition {
  const { clean, template, announced } = prepared;
  const style = template ?? { decimal: '.' as const, thousands: null, delimiter: announced ?? ',' };
  return {
    kind: 'refused',
    refusal,
    broken: table?.damage ? brokenOf(prepared, table) : null,
    partial: null,
    shape: table && shapeOf(table),
    encoding: clean.encoding,
    lineEnds: clean.lineEnds,
    delimiter: delimiterName(style.delimiter),
    decimalMark: style.decimal,
    thousandsMark: style.thousands,
    layout: table?.layout ?? 'pairs',
    preambleLines: table ? (table.headings.line ?? table.main.firstLine) - 1 : 0,
    headerLine: table?.headings.line ?? null,
    firstDataLine: table?.main.firstLine ?? 1,
    lastDataLine: table?.main.lastLine ?? 1,
    columns: table ? describeColumns(table, [], prepared.option) : [],
    frequency: NO_AXIS,
    traces: [],
    sweeps: [],
    settings: (table?.declared ?? settingsOf([], style)).settings,
    correctedFor: [],
    questions: [],
    remarks: table?.remarks ?? [],
    preview: table ? previewOf(prepared, table) : bareLines(prepared),
  };
}

/** What the lines before the rows say of a sweep. */
type Said = Pick<Recognition, 'traces' | 'settings' | 'correctedFor'>;

/**
 * Sweeps with a preamble each may name different detectors, units and settings: what differs is left open until one is
 * chosen. What any of them says its values hold already is named, so that nothing is added twice.
 */
function settleAcross(prepared: Prepared, table: Table, said: Said, chosen: Piece): Said {
  const { traces } = said;
  const others = table.pieces.filter(({ block }) => block !== chosen.block).slice(0, 50);
  if (others.length === 0 || table.layout !== 'pairs') return said;
  const tables = others.map((piece) => ({ piece, own: tableFor(prepared, table, piece) }));
  const each = tables.map(({ piece, own }) => tracesOf(own, piece, axisOf(table, piece), 0));
  const settled = traces.map((trace, i) => {
    const agree = (same: (other: RecognisedTrace) => boolean) =>
      each.every((list) => list[i] !== undefined && same(list[i]));
    const detector = agree((other) => other.detector === trace.detector) ? trace.detector : null;
    const unit = agree((other) => other.unit === trace.unit) ? trace.unit : null;
    return { ...trace, detector, unit, detectorAsWritten: detector === null ? null : trace.detectorAsWritten };
  });
  const settings = { ...said.settings };
  for (const { own } of tables) Object.assign(settings, differing(settings, own.declared.settings));
  const corrections = new Map(said.correctedFor.map((one) => [`${one.line} ${one.what}`, one]));
  for (const { own } of tables) {
    for (const one of correctionsOf(own.preamble, own.entries)) corrections.set(`${one.line} ${one.what}`, one);
  }
  const correctedFor = [...corrections.values()].sort((a, b) => a.line - b.line);
  return { traces: settled, settings, correctedFor };
}

/** Null for each setting of how a sweep was read in which another differs; its range and points are its own. */
function differing(settings: RecognisedSettings, other: RecognisedSettings): Partial<RecognisedSettings> {
  const { startHz: _start, stopHz: _stop, declaredPoints: _points, ...readWith } = settings;
  const keys = Object.keys(readWith) as (keyof typeof readWith)[];
  return Object.fromEntries(keys.filter((key) => settings[key] !== other[key]).map((key) => [key, null]));
}

/**
 * What a file is, as far as the file itself says; everything else becomes a question. Never throws on a file: one that
 * cannot be read is answered as refused. Yields often, so that a server can serve others meanwhile.
 * @param file the bytes as they came, or what was scanned of them already
 * @param fileName names the only sweep of a file; nothing is concluded from it
 * @param sweepIndex which of several sweeps to describe; without it the first is described, and what differs between
 *   them is left open
 */
export function* recogniseSteps(
  file: Uint8Array | ScannedFile,
  fileName?: string,
  sweepIndex?: number,
): Generator<void, Recognition> {
  const scanned = scannedFile(file);
  const prepared = yield* scanned.prepare();
  const { clean, template, option } = prepared;
  if (template === null) return refused(prepared, noTable(prepared), null);
  let table: Table;
  try {
    const scan = yield* scanned.scan();
    if (scan.rows < (template.alone ? 1 : 2)) return refused(prepared, noTable(prepared), null);
    table = yield* tableSteps(prepared, scan);
  } catch (error) {
    if (!(error instanceof IngestError)) throw error;
    const { line, found, expected, message } = error;
    return refused(prepared, { line, found, expected, message }, null);
  }
  if (commaIsBoth(template, prepared.sample, table.headings.line === null ? null : table.headings.count)) {
    const row = prepared.sample.find(({ from }) => from === table.main.from);
    return refused(prepared, commaTwice(table.main.firstLine, row?.text ?? ''), table);
  }
  if (table.noAxis) return refused(prepared, notOverFrequency(table), table);
  const piece = table.pieces[sweepIndex ?? 0] ?? table.pieces[0];
  if (!piece) return refused(prepared, brokenRow(table, null), table);

  const own = tableFor(prepared, table, piece);
  const axis = axisOf(own, piece);
  yield;
  const unit = axisUnit(prepared, own, axis);
  const frequency = describeAxis(own, axis, unit);
  yield;
  const shift = TO_HZ[unit.unit ?? unit.proposed];
  let traces: RecognisedTrace[];
  try {
    traces = option ? factorTraces(clean, own, option, axis, shift) : tracesOf(own, piece, axis, shift);
  } catch (error) {
    if (!(error instanceof IngestError)) throw error;
    const { line, found, expected, message } = error;
    return refused(prepared, { line, found, expected, message }, table);
  }
  let settings: RecognisedSettings = { ...own.declared.settings, ...declaredSpan(own, axis, unit) };
  let correctedFor = correctionsOf(own.preamble, own.entries);
  if (sweepIndex === undefined) {
    const said = { traces, settings, correctedFor };
    ({ traces, settings, correctedFor } = settleAcross(prepared, table, said, piece));
  }
  yield;
  if (traces.length === 0) {
    const found = 'no column of levels';
    const message = `Line ${table.main.firstLine}: ${found} beside the frequencies. Export the trace with its levels.`;
    return refused(prepared, { line: table.main.firstLine, found, expected: 'a level per frequency', message }, table);
  }

  const pieces = table.pieces.slice(0, MOST_SWEEPS);
  const sweeps = pieces.map(({ name, startedAt }, i) => ({
    name: name ?? (pieces.length === 1 ? (fileName ?? 'sweep') : `sweep ${i + 1}`),
    startedAt,
  }));
  const factor = isFactorTable(own, option);
  const filler = traces.filter(({ blank }) => blank);
  const remarks = [
    ...own.remarks,
    ...unit.remarks,
    ...axisRemarks(own, frequency),
    ...filler.map(({ name, min }) => ({ text: `“${name}” holds ${min} in every row; it is left out.`, line: null })),
    ...severalSweeps(table),
    ...(table.pieces.length > MOST_SWEEPS
      ? [{ text: `The file holds ${table.pieces.length} sweeps; the first ${MOST_SWEEPS} are offered.`, line: null }]
      : []),
  ];
  const known = { frequency, traces, sweeps, settings, correctedFor };
  const recognition: Recognition = {
    kind: factor ? 'factor-table' : 'sweep',
    refusal: null,
    broken: null,
    partial: null,
    shape: shapeOf(own),
    encoding: clean.encoding,
    lineEnds: clean.lineEnds,
    delimiter: delimiterName(template.delimiter),
    decimalMark: template.decimal,
    thousandsMark: template.thousands,
    layout: table.layout,
    preambleLines: (own.headings.line ?? table.scan.blocks[piece.block]!.firstLine) - 1,
    headerLine: own.headings.line,
    firstDataLine: table.scan.blocks[piece.block]!.firstLine + (table.time?.firstRowIsHeading ? 1 : 0),
    lastDataLine: table.scan.blocks[table.pieces.at(-1)!.block]!.lastLine,
    columns: describeColumns(own, traces, option),
    ...known,
    questions: factor ? factorQuestions(own, unit, axis, known) : questionsFor(own, unit, axis, known),
    remarks,
    preview: previewOf(prepared, own),
  };
  if (table.damage === null) return recognition;
  const partial = factor || frequency.points < FEWEST_TO_KEEP ? null : partialOf(table, frequency, settings);
  const questions = partial === null ? [] : recognition.questions;
  const refusal = brokenRow(table, unit.unit);
  return { ...recognition, kind: 'refused', refusal, broken: brokenOf(prepared, table), partial, questions };
}

/** Blocks of rows under one another are sweeps of their own, also where one goes on from where the other ends. */
function severalSweeps(table: Table): Recognition['remarks'] {
  const { pieces, layout, scan, axisColumn } = table;
  if (layout !== 'pairs' || pieces.length < 2) return [];
  const along = scan.data[scan.columns.indexOf(axisColumn!)]!;
  const last = ({ firstRow, rows }: (typeof pieces)[number]) => along[firstRow + rows - 1]!;
  const onward = pieces.every((piece, i) => i === 0 || along[piece.firstRow]! >= last(pieces[i - 1]!));
  const how = onward ? ', each from where the one before ends' : ' under one another';
  const text = `The file holds ${pieces.length} sweeps${how}. Each is kept as a run of its own.`;
  const second = scan.blocks[pieces[1]!.block]!;
  return [{ text, line: second.firstRow === pieces[1]!.firstRow ? second.firstLine : null }];
}

function brokenOf({ clean }: Prepared, table: Table): Recognition['broken'] {
  return { lines: linesAround(clean, table.damage!), ...missingIn(table) };
}

/** What can be kept of a file that breaks off. */
function partialOf(
  table: Table,
  frequency: Recognition['frequency'],
  { stopHz, declaredPoints }: RecognisedSettings,
): Recognition['partial'] {
  const { points, lastHz } = frequency;
  return { line: table.damage!.line, points, readToHz: lastHz, declaredStopHz: stopHz, declaredPoints };
}

/** `recogniseSteps` in one go. */
export function recognise(raw: Uint8Array, fileName?: string, sweepIndex?: number): Recognition {
  return runThrough(recogniseSteps(raw, fileName, sweepIndex));
}
