import { z } from 'zod';
import { detector, levelUnit, mainsLine, polarisation, port, publicId, purpose } from './common';
import { operation } from './operation';

/* What was recognised in a file, as src/ingest answers it; the upload sheet shows all of it. */

const frequencyUnit = z.enum(['Hz', 'kHz', 'MHz', 'GHz']);
const line = z.int().nullable();
const text = z.string().nullable();
const number = z.number().nullable();

export const recognitionView = z.strictObject({
  kind: z.enum(['sweep', 'factor-table', 'refused']),
  refusal: z.strictObject({ line, found: z.string(), expected: z.string(), message: z.string() }).nullable(),
  broken: z
    .strictObject({
      lines: z.array(z.strictObject({ line: z.int(), text })),
      missing: z.string(),
      after: z.int(),
    })
    .nullable(),
  partial: z
    .strictObject({
      line: z.int(),
      points: z.int(),
      readToHz: z.number(),
      declaredStopHz: number,
      declaredPoints: number,
    })
    .nullable(),
  shape: text,
  encoding: z.string(),
  lineEnds: z.string(),
  delimiter: z.string(),
  decimalMark: z.enum(['.', ',']),
  thousandsMark: text,
  layout: z.enum(['pairs', 'hop-rows', 'time-rows']),
  preambleLines: z.int(),
  headerLine: line,
  firstDataLine: z.int(),
  lastDataLine: z.int(),
  columns: z.array(
    z.strictObject({
      index: z.int(),
      heading: text,
      role: z.enum(['frequency', 'level', 'blank', 'time', 'phase', 'other']),
      evidence: z.string(),
    }),
  ),
  frequency: z.strictObject({
    column: z.int().nullable(),
    unit: frequencyUnit.nullable(),
    unitEvidence: text,
    proposedUnit: frequencyUnit,
    offset: z.boolean(),
    firstHz: z.number(),
    lastHz: z.number(),
    points: z.int(),
    ascending: z.boolean(),
    duplicates: z.int(),
    stepHz: z.number(),
    evenStep: z.boolean(),
  }),
  traces: z.array(
    z.strictObject({
      index: z.int(),
      column: z.int(),
      name: z.string(),
      unit: levelUnit.nullable(),
      unitEvidence: text,
      detector: detector.nullable(),
      detectorAsWritten: text,
      mode: text,
      blank: z.boolean(),
      linear: z.boolean(),
      first: z.number(),
      last: z.number(),
      min: z.number(),
      minAtHz: z.number(),
      max: z.number(),
      maxAtHz: z.number(),
    }),
  ),
  sweeps: z.array(z.strictObject({ name: z.string(), startedAt: text })),
  settings: z.strictObject({
    rbwHz: number,
    rbwShape: z.enum(['6 dB', '3 dB']).nullable(),
    vbwHz: number,
    vbwEnabled: z.boolean().nullable(),
    sweepTimeS: number,
    dwellTimeS: number,
    attenuationDb: number,
    referenceLevel: number,
    preamplifier: z.enum(['on', 'off']).nullable(),
    startHz: number,
    stopHz: number,
    declaredPoints: number,
  }),
  correctedFor: z.array(z.strictObject({ what: z.string(), evidence: z.string(), line: z.int() })),
  questions: z.array(
    z.strictObject({
      key: z.enum([
        'frequencyUnit',
        'levelUnit',
        'centreHz',
        'detector',
        'rbwHz',
        'alreadyCorrected',
        'sweepIndex',
        'lossOrGain',
      ]),
      text: z.string(),
      proposal: text,
      traceIndex: z.int().nullable(),
    }),
  ),
  remarks: z.array(z.strictObject({ text: z.string(), line })),
  preview: z.array(
    z.strictObject({
      line: z.int(),
      text: z.string(),
      role: z.enum(['preamble', 'heading', 'row']),
      cells: z.array(z.string()).nullable(),
    }),
  ),
});
export type RecognitionView = z.infer<typeof recognitionView>;

/** How the last file of this shape was read; proposals only, each to be shown as such. */
const shapeProposal = z.strictObject({
  run: z.strictObject({ id: publicId, number: z.string() }),
  port,
  /** A path or limit set of the lab that may be withdrawn by now. */
  pathId: publicId.nullable(),
  limitSetId: publicId,
  distanceM: number,
  heightSwept: z.boolean(),
  valuesHold: z.enum(['receiver-input', 'field']),
  alreadyCorrected: z.array(z.string()),
  frequencyUnit,
  traces: z.array(z.strictObject({ index: z.int(), unit: levelUnit, detector, rbwHz: number })),
});

export const sweepFileView = z.strictObject({
  id: publicId,
  name: z.string(),
  bytes: z.int(),
  sha256: z.string(),
  recognition: recognitionView,
  /** Runs that were already kept from the same bytes. */
  repeats: z.array(z.strictObject({ sweepId: publicId, number: z.string() })),
  /** What the file's name suggests; proposals only. */
  proposals: z.strictObject({
    polarisation: polarisation.nullable(),
    line: mainsLine.nullable(),
    heightM: number,
    state: text,
    purpose: purpose.nullable(),
  }),
  /** Null where no file of this shape was kept, or the run it was kept as was voided. */
  asBefore: shapeProposal.nullable(),
});
export type SweepFileView = z.infer<typeof sweepFileView>;

export const createSweepFile = operation({
  id: 'createSweepFile',
  method: 'POST',
  path: '/api/sweep-files',
  summary: 'Upload a sweep file (at most 100 MB); answers what was recognised in it. It is held for a day',
  permission: 'sweep-file.create',
  status: 201,
  reply: sweepFileView,
  idempotent: true,
  upload: true,
});
const fileParams = z.strictObject({ id: publicId });
export const readSweepFile = operation({
  id: 'readSweepFile',
  method: 'GET',
  path: '/api/sweep-files/{id}',
  summary: 'What was recognised in an uploaded file; `sweep` describes one of several by its own preamble',
  permission: 'sweep-file.read',
  status: 200,
  params: fileParams,
  query: z.strictObject({ sweep: z.coerce.number().int().min(0).optional() }),
  reply: sweepFileView,
});
