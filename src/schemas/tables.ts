import { z } from 'zod';
import { FACTOR_QUANTITIES, FACTOR_UNITS } from '@/emc/kinds';
import { day, instant, lineDetector, lineUnit, pageOf, pageQuery, person, polarisation, publicId } from './common';
import { operation } from './operation';
import { limitSegment } from './sweep';

/* Factor tables and limit lines: every revision, what a file would enter, and entering it. Nothing is overwritten. */

const frequencyUnit = z.enum(['Hz', 'kHz', 'MHz', 'GHz']);
export const factorQuantity = z.enum(FACTOR_QUANTITIES);
export type FactorQuantity = z.infer<typeof factorQuantity>;
const idParams = z.strictObject({ id: publicId });
const text = (most: number) => z.string().trim().min(1, 'is needed').max(most);
const findWords = z.string().trim().max(120).optional();
const reason = text(300);

/** As a new revision differs from the one before it: new minus old, in dB, where both have a value. */
export const differenceView = z.strictObject({
  largestDb: z.number(),
  atHz: z.number(),
  stretches: z.array(z.array(z.strictObject({ hz: z.number(), db: z.number() }))),
});
export type DifferenceView = z.infer<typeof differenceView>;

const calibrationRef = z.strictObject({
  id: publicId,
  certificate: z.string(),
  laboratory: z.string(),
  calibratedOn: day,
  dueOn: day.nullable(),
});
const runRef = z.strictObject({ id: publicId, number: z.string(), measuredAt: instant });

/** Runs whose standing evaluation used an older revision although they were measured under the newer calibration. */
export const outdatedRuns = z.strictObject({
  sinceDay: day,
  count: z.int(),
  /** By the revision they used. */
  revisions: z.array(z.strictObject({ name: z.string(), revision: z.int(), count: z.int() })),
  /** The newest 50. */
  runs: z.array(z.strictObject({ ...runRef.shape, name: z.string(), revision: z.int() })),
});
export type OutdatedRuns = z.infer<typeof outdatedRuns>;

export const factorTableSummary = z.strictObject({
  id: publicId,
  name: z.string(),
  revision: z.int(),
  /** The highest revision of its name. */
  newest: z.boolean(),
  equipment: z.strictObject({ id: publicId, identifier: z.string(), description: z.string() }),
  quantity: factorQuantity,
  polarisation: polarisation.nullable(),
  distanceM: z.number().nullable(),
  rows: z.int(),
  firstHz: z.number(),
  lastHz: z.number(),
  source: z.string(),
  reason: z.string().nullable(),
  calibration: calibrationRef.nullable(),
  file: z.strictObject({ name: z.string(), sha256: z.string() }).nullable(),
  enteredAt: instant,
  enteredBy: person.nullable(),
});
export type FactorTableSummary = z.infer<typeof factorTableSummary>;

export const factorTableView = z.strictObject({
  ...factorTableSummary.shape,
  frequencyHz: z.array(z.number()),
  valueDb: z.array(z.number()),
  /** Revisions of signal paths that name it; `current` is the path's newest. */
  paths: z.array(
    z.strictObject({ id: publicId, code: z.string(), name: z.string(), revision: z.int(), current: z.boolean() }),
  ),
  /** Runs whose standing evaluation added it; the newest ten. */
  runs: z.strictObject({ count: z.int(), latest: z.array(runRef) }),
  /** For the newest revision: runs since its calibration that used an older one. */
  outdated: outdatedRuns.nullable(),
  before: z.strictObject({ id: publicId, revision: z.int(), difference: differenceView.nullable() }).nullable(),
});
export type FactorTableView = z.infer<typeof factorTableView>;

export const listFactorTables = operation({
  id: 'listFactorTables',
  method: 'GET',
  path: '/api/factor-tables',
  summary: 'Revisions of factor tables, newest first; by item of equipment, or by words of the trade',
  permission: 'equipment.list',
  status: 200,
  query: z.strictObject({ ...pageQuery.shape, equipmentId: publicId.optional(), find: findWords }),
  reply: pageOf(factorTableSummary),
});
export const readFactorTable = operation({
  id: 'readFactorTable',
  method: 'GET',
  path: '/api/factor-tables/{id}',
  summary: 'One revision of a factor table: its rows, what uses it and how it differs from the one before',
  permission: 'equipment.list',
  status: 200,
  params: idParams,
  reply: factorTableView,
});
export const downloadFactorTable = operation({
  id: 'downloadFactorTable',
  method: 'GET',
  path: '/api/factor-tables/{id}/csv',
  summary: 'One revision of a factor table as CSV; uploaded again it is the same, bit for bit',
  permission: 'equipment.list',
  status: 200,
  params: idParams,
  download: true,
});

/** Which table of the file, as what it is entered. `quantity` null: as the table says, and asked when it does not. */
const chosenTable = z.strictObject({
  index: z.int().min(0).max(500),
  name: text(120),
  quantity: factorQuantity.nullable(),
  polarisation: polarisation.nullable().default(null),
  distanceM: z.number().positive().max(100).nullable().default(null),
});
const factorChoice = z.strictObject({
  fileId: publicId,
  equipmentId: publicId,
  frequencyUnit: frequencyUnit.nullable().default(null),
  tables: z.array(chosenTable).max(10),
});
export type FactorTableChoice = z.infer<typeof factorChoice>;

/** Something about the new rows that is worth a look but refuses nothing; figures in hertz and dB. */
export const factorRemark = z.strictObject({
  kind: z.enum([
    'jump',
    'no-factor-above',
    'no-factor-below',
    'turned',
    'negated',
    'unit-not-stated',
    'not-said-to-be-factors',
    'mixed-signs',
    'distance-differs',
    'gap-between-rows',
  ]),
  fromHz: z.number().nullable().default(null),
  toHz: z.number().nullable().default(null),
  db: z.number().nullable().default(null),
});
export type FactorRemark = z.infer<typeof factorRemark>;

const tableInFile = z.strictObject({
  index: z.int(),
  /** Heading or stack name as written. */
  heading: z.string(),
  /** As the table says; null: what its figures are has to be asked. */
  quantity: factorQuantity.nullable(),
  unit: z.enum(FACTOR_UNITS),
  rows: z.int(),
  firstHz: z.number(),
  lastHz: z.number(),
  lowestDb: z.number(),
  highestDb: z.number(),
  /** From lines of the file before the rows, and from its headings. */
  proposed: z.strictObject({
    name: z.string().nullable(),
    polarisation: polarisation.nullable(),
    distanceM: z.number().nullable(),
  }),
});
const previewedTable = z.strictObject({
  index: z.int(),
  name: z.string(),
  quantity: factorQuantity.nullable(),
  frequencyHz: z.array(z.number()),
  valueDb: z.array(z.number()),
  remarks: z.array(factorRemark),
  /** The newest revision of that name, which this one would follow. */
  before: z
    .strictObject({
      id: publicId,
      revision: z.int(),
      enteredAt: instant,
      frequencyHz: z.array(z.number()),
      valueDb: z.array(z.number()),
      difference: differenceView.nullable(),
    })
    .nullable(),
});
export const factorTablePreview = z.strictObject({
  refusal: z
    .strictObject({ line: z.int().nullable(), found: z.string(), expected: z.string(), message: z.string() })
    .nullable(),
  frequencyUnit: frequencyUnit.nullable(),
  frequencyEvidence: z.string().nullable(),
  proposedFrequencyUnit: frequencyUnit,
  tablesInFile: z.array(tableInFile),
  tables: z.array(previewedTable),
  questions: z.array(
    z.strictObject({
      /** `quantity` asks more than loss or gain. */
      key: z.enum(['frequencyUnit', 'lossOrGain', 'quantity']),
      tableIndex: z.int().nullable(),
      text: z.string(),
    }),
  ),
  source: z.string().nullable(),
  /** Paths that use the newest revision now and would get their next revision with these. */
  paths: z.array(z.strictObject({ id: publicId, code: z.string(), name: z.string(), revision: z.int() })),
});
export type FactorTablePreview = z.infer<typeof factorTablePreview>;

export const previewFactorTable = operation({
  id: 'previewFactorTable',
  method: 'POST',
  path: '/api/factor-tables/preview',
  summary: 'What a held file would enter as factor tables, beside the revisions before; nothing is stored',
  permission: 'table.preview',
  status: 200,
  body: factorChoice,
  reply: factorTablePreview,
});

const newCalibration = z.strictObject({
  certificate: text(80),
  laboratory: text(120),
  calibratedOn: day,
  dueOn: day.nullable(),
});
export const enterFactorTableBody = z.strictObject({
  ...factorChoice.shape,
  tables: z
    .array(
      z.strictObject({
        ...chosenTable.shape,
        /** The revision the preview was compared with; null where the name is new. Another one since then refuses. */
        revises: publicId.nullable(),
      }),
    )
    .min(1)
    .max(10),
  /** One that is entered already, or a new one. */
  calibration: z.union([z.strictObject({ id: publicId }), newCalibration]),
  source: text(300),
  reason,
});
export const enteredFactorTables = z.strictObject({
  tables: z.array(factorTableSummary),
  /** Paths that got their next revision, so that runs measured from now on use the new tables. */
  paths: z.array(z.strictObject({ id: publicId, code: z.string(), name: z.string(), revision: z.int() })),
  outdated: outdatedRuns.nullable(),
});
export type EnteredFactorTables = z.infer<typeof enteredFactorTables>;
export const enterFactorTables = operation({
  id: 'enterFactorTables',
  method: 'POST',
  path: '/api/factor-tables',
  summary: 'Enter tables of a held file as next revisions with their calibration; paths that use them follow',
  permission: 'equipment.enter',
  status: 201,
  body: enterFactorTableBody,
  reply: enteredFactorTables,
  idempotent: true,
});

export const limitLineSummary = z.strictObject({
  id: publicId,
  key: z.string(),
  revision: z.int(),
  newest: z.boolean(),
  name: z.string(),
  document: z.string(),
  class: z.string(),
  port: z.string(),
  detector: lineDetector,
  bandwidthHz: z.number(),
  unit: lineUnit,
  distanceM: z.number().nullable(),
  segments: z.array(limitSegment),
  source: z.string(),
  basis: z.string(),
  reason: z.string().nullable(),
  file: z.strictObject({ name: z.string(), sha256: z.string() }).nullable(),
  enteredAt: instant,
  enteredBy: person.nullable(),
});
export type LimitLineSummary = z.infer<typeof limitLineSummary>;
const setRef = z.strictObject({
  id: publicId,
  name: z.string(),
  revision: z.int(),
  withdrawnAt: instant.nullable(),
});
export const limitLineRecord = z.strictObject({
  ...limitLineSummary.shape,
  /** Limit sets that name this revision, newest first. */
  sets: z.array(setRef),
  /** Runs judged with it; the newest ten. */
  runs: z.strictObject({ count: z.int(), latest: z.array(runRef) }),
  /** Every revision of the same key, newest first. */
  revisions: z.array(limitLineSummary),
  before: z.strictObject({ id: publicId, revision: z.int(), difference: differenceView.nullable() }).nullable(),
});
export type LimitLineRecord = z.infer<typeof limitLineRecord>;

export const listLimitLines = operation({
  id: 'listLimitLines',
  method: 'GET',
  path: '/api/limit-lines',
  summary: 'Limit lines by their newest revision, newest first; by words of the trade',
  permission: 'limit-line.list',
  status: 200,
  query: z.strictObject({ ...pageQuery.shape, find: findWords }),
  reply: pageOf(limitLineSummary),
});
export const readLimitLine = operation({
  id: 'readLimitLine',
  method: 'GET',
  path: '/api/limit-lines/{id}',
  summary: 'One revision of a limit line, what names it and how it differs from the one before',
  permission: 'limit-line.list',
  status: 200,
  params: idParams,
  reply: limitLineRecord,
});
export const downloadLimitLine = operation({
  id: 'downloadLimitLine',
  method: 'GET',
  path: '/api/limit-lines/{id}/csv',
  summary: 'One revision of a limit line as CSV; uploaded again it is the same, bit for bit',
  permission: 'limit-line.list',
  status: 200,
  params: idParams,
  download: true,
});

export const limitBetween = z.enum(['log-frequency', 'linear-frequency', 'hold']);
const limitChoice = z.strictObject({
  fileId: publicId,
  /** Which line this is the next revision of; null for a new line. */
  revises: publicId.nullable().default(null),
  frequencyUnit: frequencyUnit.nullable().default(null),
  unit: lineUnit.nullable().default(null),
  /** How it runs between two different limits, where the file does not say. */
  between: limitBetween.nullable().default(null),
});
export type LimitLineChoice = z.infer<typeof limitChoice>;

export const limitLinePreview = z.strictObject({
  refusal: factorTablePreview.shape.refusal,
  shape: z.enum(['segments', 'break-points']).nullable(),
  encoding: z.string().nullable(),
  delimiter: z.string().nullable(),
  decimalMark: z.enum(['.', ',']).nullable(),
  frequencyUnit: frequencyUnit.nullable(),
  frequencyEvidence: z.string().nullable(),
  proposedFrequencyUnit: frequencyUnit.nullable(),
  unit: lineUnit.nullable(),
  unitEvidence: z.string().nullable(),
  rows: z.int(),
  /** What lines of the file before the rows say; proposals. */
  stated: z.strictObject({
    key: z.string().nullable(),
    name: z.string().nullable(),
    document: z.string().nullable(),
    class: z.string().nullable(),
    port: z.string().nullable(),
    detector: lineDetector.nullable(),
    bandwidthHz: z.number().nullable(),
    distanceM: z.number().nullable(),
    source: z.string().nullable(),
    basis: z.string().nullable(),
  }),
  questions: z.array(z.enum(['frequencyUnit', 'unit', 'between'])),
  lines: z.array(z.strictObject({ line: z.int(), text: z.string() })),
  /** Null until every question is answered. */
  segments: z.array(limitSegment).nullable(),
  holes: z.array(z.strictObject({ fromHz: z.number(), toHz: z.number(), kind: z.enum(['hole', 'overlap']) })),
  before: z
    .strictObject({
      ...limitLineSummary.shape,
      difference: differenceView.nullable(),
    })
    .nullable(),
  /** Sets in use that name an older revision and may follow. */
  sets: z.array(setRef),
});
export type LimitLinePreview = z.infer<typeof limitLinePreview>;
export const previewLimitLine = operation({
  id: 'previewLimitLine',
  method: 'POST',
  path: '/api/limit-lines/preview',
  summary: 'What a held file would enter as a limit line, beside the revision before; nothing is stored',
  permission: 'table.preview',
  status: 200,
  body: limitChoice,
  reply: limitLinePreview,
});

export const enterLimitLineBody = z.strictObject({
  ...limitChoice.shape,
  unit: lineUnit,
  name: text(200),
  document: text(160),
  class: text(120),
  port: text(120),
  detector: lineDetector,
  bandwidthHz: z.number().positive().max(1e9),
  distanceM: z.number().positive().max(1000).nullable(),
  source: text(300),
  basis: text(80),
  reason,
  /** Sets that get their next revision with this line; the old ones are withdrawn from the choice and stay readable. */
  setIds: z.array(publicId).max(200).default([]),
});
export const enteredLimitLine = z.strictObject({
  line: limitLineSummary,
  sets: z.array(setRef),
  /** Sets that still name an older revision, because they were not chosen. */
  left: z.array(setRef),
  /** Runs judged with an older revision; they keep it. */
  runs: z.int(),
});
export type EnteredLimitLine = z.infer<typeof enteredLimitLine>;
export const enterLimitLine = operation({
  id: 'enterLimitLine',
  method: 'POST',
  path: '/api/limit-lines',
  summary: 'Enter a held file as a new limit line or the next revision of one; chosen sets follow',
  permission: 'limit.enter',
  status: 201,
  body: enterLimitLineBody,
  reply: enteredLimitLine,
  idempotent: true,
});
