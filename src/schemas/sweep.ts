import { z } from 'zod';
import { operation } from './operation';
import { setupBrief } from './setup';
import {
  decisionRule,
  detector,
  instant,
  day,
  levelUnit,
  lineDetector,
  lineUnit,
  mainsLine,
  organisationRef,
  pageOf,
  pageQuery,
  person,
  polarisation,
  port,
  publicId,
  purpose,
  verdict,
  version,
} from './common';

/** How a file is to be read and judged: all that decides its figures. */
export const sweepChoice = z.strictObject({
  purpose,
  port,
  line: mainsLine.nullable().default(null),
  polarisation: polarisation.nullable().default(null),
  distanceM: z.number().positive().max(100).nullable().default(null),
  /** null when no path is known: then nothing is added, the uncertainty is unknown and nothing is concluded. */
  pathId: publicId.nullable(),
  limitSetId: publicId,
  valuesHold: z.enum(['receiver-input', 'field']),
  /** Path terms that the reading already holds, by term id; null: nobody has said, which a file that says it is corrected refuses. */
  alreadyCorrected: z.array(z.string().max(80)).max(20).nullable().default(null),
  frequencyUnit: z.enum(['Hz', 'kHz', 'MHz', 'GHz']),
  centreHz: z.number().nullable().default(null),
  /** Which sweep of the file; null only where it holds one. */
  sweepIndex: z.int().min(0).nullable().default(null),
  /** A truncated file is read up to its broken line on purpose; nothing read so is ever under. */
  keepPartial: z.boolean().default(false),
  traces: z
    .array(
      z.strictObject({
        index: z.int().min(0),
        name: z.string().trim().min(1).max(80),
        unit: levelUnit,
        detector,
        rbwHz: z.number().positive().nullable(),
      }),
    )
    .min(1)
    .max(6),
});
export type SweepChoice = z.infer<typeof sweepChoice>;
/** Judged by the rule of the job of that state; while no state is said, guarded by U. */
export const previewBody = z.strictObject({ ...sweepChoice.shape, stateId: publicId.nullable().default(null) });

/** What a technician says of a file when keeping it as a run. */
export const keepSweep = z.strictObject({
  ...sweepChoice.shape,
  fileId: publicId,
  stateId: publicId,
  operatingMode: z.string().trim().min(1, 'is needed').max(120),
  heightM: z.number().min(0).max(10).nullable().default(null),
  /** The height was varied while the maximum was held; heightM is then where the maximum was, if known. */
  heightSwept: z.boolean().default(false),
  azimuthDeg: z.number().min(0).max(360).nullable().default(null),
  measuredAt: instant.nullable().default(null),
  /** What was tried, such as `foil on lid`: a quick trial under its state, which never speaks for the state. */
  trial: z.string().trim().min(1).max(120).nullable().default(null),
});

export type KeepSweep = z.infer<typeof keepSweep>;

export const limitSegment = z.strictObject({
  startHz: z.number(),
  stopHz: z.number(),
  startLimit: z.number(),
  stopLimit: z.number(),
  over: z.enum(['log-frequency', 'linear-frequency']),
});
export const limitLineView = z.strictObject({
  id: publicId,
  name: z.string(),
  document: z.string(),
  source: z.string(),
  basis: z.string(),
  revision: z.int(),
  detector: lineDetector,
  bandwidthHz: z.number(),
  unit: lineUnit,
  distanceM: z.number().nullable(),
  segments: z.array(limitSegment),
});

export const dueState = z.enum(['in-date', 'due-soon', 'lapsed', 'not-calibrated']);
export const pathItemView = z.strictObject({
  role: z.string(),
  identifier: z.string(),
  description: z.string(),
  calibratedOn: day.nullable(),
  dueOn: day.nullable(),
  due: dueState,
});

export const candidateView = z.strictObject({
  rank: z.int(),
  kind: z.enum(['peak', 'floor']),
  traceIndex: z.int(),
  lineId: publicId,
  detector,
  frequencyHz: z.number(),
  fromHz: z.number(),
  toHz: z.number(),
  reading: z.number(),
  level: z.number(),
  limit: z.number(),
  marginDb: z.number(),
  uncertaintyDb: z.number(),
  verdict,
  because: z.string().nullable(),
});

export const traceView = z.strictObject({
  index: z.int(),
  name: z.string(),
  detector,
  unit: levelUnit,
  rbwHz: z.number().nullable(),
  /** The line this trace hangs from at its own zero; null when no line takes it. */
  lineId: publicId.nullable(),
});

export const gapView = z.strictObject({
  lineId: publicId,
  fromHz: z.number(),
  toHz: z.number(),
  because: z.enum(['no-trace', 'no-factor', 'no-uncertainty', 'gap', 'partial']),
});

export const evaluationView = z.strictObject({
  id: publicId,
  engine: z.string(),
  at: instant,
  verdict,
  counts: z.record(verdict, z.int()),
  worst: candidateView.nullable(),
  gaps: z.array(gapView),
  /** Expanded uncertainty of this run as steps over frequency. */
  uncertainty: z.array(z.strictObject({ startHz: z.number(), stopHz: z.number(), expandedDb: z.number() })),
  decisionRule,
});

/** Kept up to a broken line of its file, on purpose. */
export const partialView = z.strictObject({ line: z.int(), message: z.string(), readToHz: z.number() });

export const sweepView = z.strictObject({
  id: publicId,
  version,
  number: z.string(),
  purpose,
  port,
  line: mainsLine.nullable(),
  polarisation: polarisation.nullable(),
  heightM: z.number().nullable(),
  heightSwept: z.boolean(),
  azimuthDeg: z.number().nullable(),
  distanceM: z.number().nullable(),
  operatingMode: z.string(),
  trial: z.string().nullable(),
  partial: partialView.nullable(),
  voided: z.strictObject({ at: instant, by: person, reason: z.string() }).nullable(),
  keptAt: instant,
  measuredAt: instant.nullable(),
  by: person,
  organisation: organisationRef,
  job: z.strictObject({ id: publicId, number: z.string(), title: z.string() }),
  sample: z.strictObject({ id: publicId, product: z.string(), code: z.string(), serial: z.string() }),
  state: z.strictObject({ id: publicId, label: z.string(), description: z.string() }),
  path: z
    .strictObject({ id: publicId, code: z.string(), name: z.string(), revision: z.int(), items: z.array(pathItemView) })
    .nullable(),
  limitSet: z.strictObject({ id: publicId, name: z.string(), lines: z.array(limitLineView) }),
  file: z.strictObject({ id: publicId, name: z.string(), bytes: z.int(), sha256: z.string() }),
  valuesHold: z.enum(['receiver-input', 'field']),
  points: z.int(),
  firstHz: z.number(),
  lastHz: z.number(),
  stepHz: z.number().nullable(),
  remarks: z.array(z.string()),
  traces: z.array(traceView),
  evaluation: evaluationView,
  /** How it was set up, in brief; it changes no verdict. */
  setup: setupBrief,
  /** The port's verdict over every run of this sample state, and what is missing for it. */
  portVerdict: z.strictObject({
    verdict,
    missing: z.array(
      z.strictObject({
        what: z.enum(['position', 'partial', 'height', 'no-line', 'comparison', 'range']),
        position: z.union([polarisation, mainsLine]).nullable(),
        lineName: z.string().nullable(),
        fromHz: z.number().nullable(),
        toHz: z.number().nullable(),
        because: gapView.shape.because.nullable(),
        heightM: z.number().nullable(),
      }),
    ),
    runs: z.array(z.strictObject({ id: publicId, number: z.string(), setup: setupBrief })),
  }),
});
export type SweepView = z.infer<typeof sweepView>;
export type CandidateView = z.infer<typeof candidateView>;
export type LimitLineView = z.infer<typeof limitLineView>;

export const windowQuery = z.strictObject({
  fromHz: z.coerce.number().positive(),
  toHz: z.coerce.number().positive(),
  columns: z.coerce.number().int().min(16).max(4096).default(1024),
});
/** Extremes per log-frequency column; a column without a point is left out. Margins are null where there is no limit. */
export const windowView = z.strictObject({
  fromHz: z.number(),
  toHz: z.number(),
  columns: z.int(),
  traces: z.array(
    z.strictObject({
      index: z.int(),
      frequencyHz: z.array(z.number()),
      levelMin: z.array(z.number().nullable()),
      levelMax: z.array(z.number().nullable()),
      marginMin: z.array(z.number().nullable()),
      marginMax: z.array(z.number().nullable()),
    }),
  ),
});
export type WindowView = z.infer<typeof windowView>;

/** A file judged as it would be kept, without keeping it. */
export const previewView = z.strictObject({
  window: windowView,
  traces: z.array(traceView),
  lines: z.array(limitLineView),
  uncertainty: evaluationView.shape.uncertainty,
  decisionRule,
  verdict,
  counts: evaluationView.shape.counts,
  worst: candidateView.nullable(),
  gaps: z.array(gapView),
});
export type PreviewView = z.infer<typeof previewView>;

export const workingQuery = z.strictObject({
  frequencyHz: z.coerce.number().positive(),
  trace: z.coerce.number().int().min(0),
  line: publicId.optional(),
});
export const workingView = z.strictObject({
  traceIndex: z.int(),
  lineId: publicId.nullable(),
  frequencyHz: z.number(),
  terms: z.array(
    z.strictObject({
      sign: z.enum(['', '+', '−']),
      figure: z.number(),
      unit: z.string(),
      name: z.string(),
      /** Where it comes from: file, or table and revision. */
      source: z.string(),
      /** The calibration a factor was taken from. */
      calibration: z.strictObject({ on: day, certificate: z.string() }).nullable(),
      warning: z.string().nullable(),
      applied: z.boolean(),
      notAppliedBecause: z.string().nullable(),
      table: z
        .strictObject({
          name: z.string(),
          lowerHz: z.number(),
          lowerDb: z.number(),
          upperHz: z.number(),
          upperDb: z.number(),
        })
        .nullable(),
    }),
  ),
  level: z.number().nullable(),
  levelUnit: lineUnit.nullable(),
  limit: z.number().nullable(),
  limitSource: z.string().nullable(),
  marginDb: z.number().nullable(),
  uncertaintyDb: z.number().nullable(),
  decisionRule,
  /** What the rule adds to the level before it is compared; null where it says nothing here. */
  addedDb: z.number().nullable(),
  verdict,
  because: z.string().nullable(),
});
export type WorkingView = z.infer<typeof workingView>;

export const sweepListItem = z.strictObject({
  id: publicId,
  number: z.string(),
  jobNumber: z.string(),
  product: z.string(),
  state: z.string(),
  sample: z.strictObject({ id: publicId, code: z.string() }),
  port,
  purpose,
  line: mainsLine.nullable(),
  polarisation: polarisation.nullable(),
  keptAt: instant,
  by: z.string(),
  organisation: organisationRef,
  verdict,
  trial: z.string().nullable(),
  partial: z.boolean(),
  voided: z.boolean(),
  /** What the EUT did when it did not stay in its mode; null when it stayed, or nobody has said. */
  strayed: z.string().nullable(),
  worst: z.strictObject({ frequencyHz: z.number(), marginDb: z.number() }).nullable(),
  points: z.int(),
});

/* Operations. */

const sweepParams = z.strictObject({ id: publicId });
export const keepSweepOperation = operation({
  id: 'keepSweep',
  method: 'POST',
  path: '/api/sweeps',
  summary: 'Keep an uploaded file as a run of a sample state and evaluate it',
  permission: 'sweep.keep',
  status: 201,
  body: keepSweep,
  reply: sweepView,
  idempotent: true,
});
export const previewSweepFile = operation({
  id: 'previewSweepFile',
  method: 'POST',
  path: '/api/sweep-files/{id}/preview',
  summary: 'The uploaded file judged as it would be kept; nothing is stored',
  permission: 'sweep-file.read',
  status: 200,
  params: sweepParams,
  body: previewBody,
  reply: previewView,
  repeatable: true,
});
export const listSweeps = operation({
  id: 'listSweeps',
  method: 'GET',
  path: '/api/sweeps',
  summary: 'Runs, newest first',
  permission: 'sweep.list',
  status: 200,
  query: z.strictObject({ ...pageQuery.shape, sampleId: publicId.optional(), stateId: publicId.optional() }),
  reply: pageOf(sweepListItem),
});
export const readSweep = operation({
  id: 'readSweep',
  method: 'GET',
  path: '/api/sweeps/{id}',
  summary: 'One run with its evaluation',
  permission: 'sweep.read',
  status: 200,
  params: sweepParams,
  reply: sweepView,
});
export const readWindow = operation({
  id: 'readWindow',
  method: 'GET',
  path: '/api/sweeps/{id}/window',
  summary: 'Extremes of level and margin per log-frequency column of a range',
  permission: 'sweep.read',
  status: 200,
  params: sweepParams,
  query: windowQuery,
  reply: windowView,
});
export const listCandidates = operation({
  id: 'listCandidates',
  method: 'GET',
  path: '/api/sweeps/{id}/candidates',
  summary: 'Candidates of a run, worst first; of its current evaluation unless an earlier one is named',
  permission: 'sweep.read',
  status: 200,
  params: sweepParams,
  query: z.strictObject({ ...pageQuery.shape, evaluation: publicId.optional() }),
  reply: z.strictObject({ total: z.int(), items: z.array(candidateView), next: z.string().nullable() }),
});
export const readWorking = operation({
  id: 'readWorking',
  method: 'GET',
  path: '/api/sweeps/{id}/working',
  summary: 'How the level and margin at the nearest measured point came about',
  permission: 'sweep.read',
  status: 200,
  params: sweepParams,
  query: workingQuery,
  reply: workingView,
});
export const downloadSweepFile = operation({
  id: 'downloadSweepFile',
  method: 'GET',
  path: '/api/sweeps/{id}/file',
  summary: 'The original file, byte for byte',
  permission: 'sweep.read',
  status: 200,
  params: sweepParams,
  download: true,
});
