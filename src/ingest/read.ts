import { runThrough } from './bytes';
import { delimiterName } from './cells';
import { IngestError } from './ingestError';
import { moved } from './numbers';
import { scannedFile, type ScannedFile } from './scannedFile';
import { axisOf, levelsOf } from './series';
import { tableFor, tableSteps } from './table';
import { tracesOf } from './traces';
import type { Answers, ReadSweep, ReadTrace, Recognition } from './types';
import { TO_HZ } from './units';

function unanswered(found: string, expected: string, message: string): IngestError {
  return new IngestError(null, found, expected, message);
}

/** Answers that reading cannot do without. */
function settle(recognition: Recognition, answers: Answers) {
  const unit = answers.frequencyUnit ?? recognition.frequency.unit;
  if (unit === null) {
    const message = 'The unit of the frequencies is not settled. Say which before the sweep is read.';
    throw unanswered('no frequency unit', 'Hz, kHz, MHz or GHz', message);
  }
  const count = recognition.sweeps.length;
  const sweepIndex = answers.sweepIndex ?? (count === 1 ? 0 : null);
  if (sweepIndex === null) {
    throw unanswered(`${count} sweeps`, 'one of them', `The file holds ${count} sweeps. Say which one is this run.`);
  }
  if (!(sweepIndex >= 0 && sweepIndex < count)) {
    const message = `The file holds ${count} sweeps; there is no sweep ${sweepIndex + 1}.`;
    throw unanswered(`sweep ${sweepIndex + 1}`, `1 to ${count}`, message);
  }
  const centreHz = recognition.frequency.offset ? answers.centreHz : 0;
  if (centreHz === undefined) {
    const message = 'The frequencies are offsets from a centre that the file does not hold. Give the centre frequency.';
    throw unanswered('offsets', 'a centre frequency in Hz', message);
  }
  return { unit, sweepIndex, centreHz };
}

/**
 * Reads one sweep as recognised and answered: every point, in file order, nothing sorted, merged or rounded. Yields
 * about every 16,384 rows. A refused file is read up to its broken row only where the answers say `partial`.
 * @param file the bytes as they came, the text decoded from them, or what was scanned of them already
 * @throws IngestError when the file was refused, an answer it needs is missing, or it is not the file recognised
 */
export function* readSweepSteps(
  file: Uint8Array | string | ScannedFile,
  recognition: Recognition,
  answers: Answers = {},
): Generator<void, ReadSweep> {
  if (answers.partial && recognition.partial === null) {
    throw unanswered('a file that is whole', 'one that breaks off', 'The file is whole; it is not kept as partial.');
  }
  if (recognition.refusal && !answers.partial) {
    const { line, found, expected, message } = recognition.refusal;
    throw new IngestError(line, found, expected, message);
  }
  const { unit, sweepIndex, centreHz } = settle(recognition, answers);
  const scanned = scannedFile(typeof file === 'string' ? new TextEncoder().encode(file) : file);
  const prepared = yield* scanned.prepare();
  const { template } = prepared;
  const { column } = recognition.frequency;
  const shift = TO_HZ[unit];
  const same =
    template &&
    delimiterName(template.delimiter) === recognition.delimiter &&
    template.decimal === recognition.decimalMark;
  if (!same) {
    const message = 'The file is not the one that was recognised. Drop it again.';
    throw unanswered('another shape', `the shape recognised`, message);
  }
  const shifts: number[] = [];
  if (column !== null) shifts[column] = shift;
  const scan = yield* scanned.scan(shifts);
  const table = yield* tableSteps(prepared, scan, { layout: recognition.layout, axisColumn: column });
  const piece = table.pieces[sweepIndex];
  if (!piece || (table.damage !== null) !== (answers.partial === true) || table.layout !== recognition.layout) {
    const message = 'The file is not the one that was recognised. Drop it again.';
    throw unanswered('other rows', 'the rows recognised', message);
  }

  // Pairs were shifted as they were scanned; the frequencies of row layouts stand elsewhere and are shifted here.
  const frequencyHz = axisOf(table, piece, shift).slice();
  if (table.hop && shift !== 0) frequencyHz.forEach((value, i) => (frequencyHz[i] = moved(value, shift)));
  if (centreHz !== 0) frequencyHz.forEach((value, i) => (frequencyHz[i] = centreHz + value));
  yield;

  const own = sweepIndex === 0 ? null : tracesOf(tableFor(prepared, table, piece), piece, frequencyHz, 0);
  const traces: ReadTrace[] = [];
  for (const trace of recognition.traces) {
    const answer = answers.traces?.find(({ index }) => index === trace.index);
    if (answer ? !answer.use : trace.blank) continue;
    const stated = own?.find(({ column: its }) => its === trace.column) ?? trace;
    const traceUnit = answer?.unit ?? stated.unit;
    if (!traceUnit) {
      const message = `The unit of “${trace.name}” is not settled. Say which before the sweep is read.`;
      throw unanswered('no level unit', 'a level unit', message);
    }
    const name = answer?.name ?? (table.layout === 'pairs' ? trace.name : (piece.name ?? trace.name));
    const detector = answer?.detector ?? stated.detector ?? 'unknown';
    traces.push({
      index: trace.index,
      name,
      unit: traceUnit,
      detector,
      values: levelsOf(table, piece, trace.column).slice(),
    });
    yield;
  }
  if (traces.length === 0)
    throw unanswered('no trace in use', 'at least one trace', 'Choose at least one trace to read.');
  return { frequencyHz, traces };
}

/** `readSweepSteps` in one go. */
export function readSweep(file: Uint8Array | string, recognition: Recognition, answers: Answers = {}): ReadSweep {
  return runThrough(readSweepSteps(file, recognition, answers));
}
