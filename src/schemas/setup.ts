import { z } from 'zod';
import { instant, pageOf, pageQuery, person, publicId, version } from './common';
import { operation } from './operation';

/* How a run was set up, and the photographs of it. null: nobody has said. */

const said = (max: number) =>
  z
    .string()
    .trim()
    .max(max, `takes at most ${max} characters`)
    .transform((text) => (text === '' ? null : text))
    .nullable()
    .default(null);
const figure = (from: number, to: number, unit: string) =>
  z.number().min(from, `is at least ${from} ${unit}`).max(to, `is at most ${to} ${unit}`).nullable().default(null);

export const eutStayed = z.enum(['yes', 'no', 'not-watched']);
export const supplyKind = z.enum(['ac', 'dc']);

const facts = {
  operatingMode: said(300),
  supplyKind: supplyKind.nullable().default(null),
  supplyV: figure(0, 100_000, 'V'),
  supplyFrequencyHz: figure(1, 1000, 'Hz'),
  supplySource: said(120),
  cableLayout: said(1000),
  ancillary: said(1000),
  temperatureC: figure(-90, 100, '°C'),
  humidityPct: figure(0, 100, '%'),
  deviations: said(1000),
  /** Did the EUT stay in its mode while it was measured? */
  eutStayed: eutStayed.nullable().default(null),
  whatHappened: said(500),
};

export const setupBody = z
  .strictObject({
    ...facts,
    /** The revision this corrects, as it was read; null for the first record of a run. */
    corrects: z.int().min(1).nullable().default(null),
    /** Why it is corrected; a first record has none. */
    reason: said(300),
  })
  .superRefine((body, context) => {
    const wrong = (field: string, message: string) => context.addIssue({ code: 'custom', path: [field], message });
    if (body.supplyKind === 'dc' && body.supplyFrequencyHz !== null) wrong('supplyFrequencyHz', 'belongs to AC');
    if (body.eutStayed === 'no' && body.whatHappened === null) wrong('whatHappened', 'is needed: what did it do?');
    if (body.eutStayed !== 'no' && body.whatHappened !== null)
      wrong('whatHappened', 'belongs to an EUT that did not stay in its mode');
    if (body.corrects !== null && body.reason === null) wrong('reason', 'is needed for a correction');
    if (body.corrects === null && body.reason !== null) wrong('reason', 'belongs to a correction');
  });
export type SetupBody = z.output<typeof setupBody>;

export const setupRecordView = z.strictObject({
  revision: z.int(),
  operatingMode: z.string().nullable(),
  supplyKind: supplyKind.nullable(),
  supplyV: z.number().nullable(),
  supplyFrequencyHz: z.number().nullable(),
  supplySource: z.string().nullable(),
  cableLayout: z.string().nullable(),
  ancillary: z.string().nullable(),
  temperatureC: z.number().nullable(),
  humidityPct: z.number().nullable(),
  deviations: z.string().nullable(),
  eutStayed: eutStayed.nullable(),
  whatHappened: z.string().nullable(),
  reason: z.string().nullable(),
  by: person,
  at: instant,
});
export type SetupRecordView = z.infer<typeof setupRecordView>;

/** What can be left unsaid of a set-up, in the order of the form. */
export const setupPart = z.enum([
  'mode',
  'supply',
  'cables',
  'ancillary',
  'temperature',
  'humidity',
  'deviations',
  'stayed',
  'photograph',
]);
export type SetupPart = z.infer<typeof setupPart>;

/** A run's set-up in brief: whether the EUT stayed in its mode, and what nobody has said. */
export const setupBrief = z.strictObject({
  revision: z.int().nullable(),
  eutStayed: eutStayed.nullable(),
  whatHappened: z.string().nullable(),
  unsaid: z.array(setupPart),
});
export type SetupBrief = z.infer<typeof setupBrief>;

export const setupView = z.strictObject({
  runId: publicId,
  brief: setupBrief,
  record: setupRecordView.nullable(),
  /** The newest record of another run of the same sample, to begin from: of the same port when there is one. */
  last: z
    .strictObject({ run: z.strictObject({ id: publicId, number: z.string() }), record: setupRecordView })
    .nullable(),
});
export type SetupView = z.infer<typeof setupView>;

export const photoView = z.strictObject({
  id: publicId,
  version,
  runId: publicId,
  caption: z.string(),
  width: z.int(),
  height: z.int(),
  bytes: z.int(),
  /** Of the picture as it is kept, turned upright and without what the camera wrote into it. */
  sha256: z.string(),
  small: z.strictObject({ width: z.int(), height: z.int() }),
  /** The file as it was sent, which is not kept. */
  sent: z.strictObject({ bytes: z.int(), sha256: z.string() }),
  by: person,
  at: instant,
  withdrawn: z.strictObject({ at: instant, by: person, reason: z.string() }).nullable(),
});
export type PhotoView = z.infer<typeof photoView>;

const idParams = z.strictObject({ id: publicId });
const caption = z.string().trim().max(200, 'takes at most 200 characters');

export const readSetup = operation({
  id: 'readSetup',
  method: 'GET',
  path: '/api/sweeps/{id}/setup',
  summary: 'How a run was set up, and what nobody has said of it',
  permission: 'setup.read',
  status: 200,
  params: idParams,
  reply: setupView,
});
export const writeSetup = operation({
  id: 'writeSetup',
  method: 'POST',
  path: '/api/sweeps/{id}/setup',
  summary: 'Record how a run was set up; a correction is the next revision and says why',
  permission: 'setup.write',
  status: 201,
  params: idParams,
  body: setupBody,
  reply: setupView,
  idempotent: true,
});
export const listSetupRevisions = operation({
  id: 'listSetupRevisions',
  method: 'GET',
  path: '/api/sweeps/{id}/setup/revisions',
  summary: 'Every record of a run’s set-up, newest first',
  permission: 'setup.read',
  status: 200,
  params: idParams,
  query: pageQuery,
  reply: pageOf(setupRecordView),
});
export const addPhotoBody = z.strictObject({ caption: caption.default('') });
export const addPhoto = operation({
  id: 'addPhoto',
  method: 'POST',
  path: '/api/sweeps/{id}/photos',
  summary: 'Add a photograph of the set-up (JPEG, PNG or WebP, at most 25 MB); its metadata is removed',
  permission: 'setup.write',
  status: 201,
  params: idParams,
  body: addPhotoBody,
  reply: photoView,
  idempotent: true,
  upload: true,
});
export const listPhotos = operation({
  id: 'listPhotos',
  method: 'GET',
  path: '/api/sweeps/{id}/photos',
  summary: 'Photographs of a run’s set-up, newest first; withdrawn ones are shown to the lab only',
  permission: 'setup.read',
  status: 200,
  params: idParams,
  query: pageQuery,
  reply: pageOf(photoView),
});
export const readPhoto = operation({
  id: 'readPhoto',
  method: 'GET',
  path: '/api/photos/{id}',
  summary: 'What is known of one photograph',
  permission: 'setup.read',
  status: 200,
  params: idParams,
  reply: photoView,
});
export const changePhoto = operation({
  id: 'changePhoto',
  method: 'PATCH',
  path: '/api/photos/{id}',
  summary: 'Correct the caption of a photograph',
  permission: 'setup.write',
  status: 200,
  params: idParams,
  body: z.strictObject({ caption }),
  reply: photoView,
  ifMatch: true,
});
export const withdrawPhoto = operation({
  id: 'withdrawPhoto',
  method: 'POST',
  path: '/api/photos/{id}/withdraw',
  summary: 'Withdraw a photograph with a reason; it stays, for the lab only',
  permission: 'setup.write',
  status: 200,
  params: idParams,
  body: z.strictObject({ reason: z.string().trim().min(1, 'is needed').max(300, 'takes at most 300 characters') }),
  reply: photoView,
  ifMatch: true,
});
export const photoSize = z.enum(['whole', 'small']);
export const downloadPhoto = operation({
  id: 'downloadPhoto',
  method: 'GET',
  path: '/api/photos/{id}/image',
  summary: 'The picture: whole (at most 2400 px) or small (at most 480 px), as JPEG',
  permission: 'setup.read',
  status: 200,
  params: idParams,
  query: z.strictObject({ size: photoSize.default('whole') }),
  download: true,
});
