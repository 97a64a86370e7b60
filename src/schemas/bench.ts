import { z } from 'zod';
import { day, instant, pageOf, pageQuery, polarisation, port, publicId, version } from './common';
import { operation } from './operation';
import { dueState, limitLineView, pathItemView } from './sweep';

/* Signal paths, limit sets and equipment, as far as a run refers to them. */

export const pathView = z.strictObject({
  id: publicId,
  code: z.string(),
  name: z.string(),
  port,
  position: z.string(),
  revision: z.int(),
  lowHz: z.number().nullable(),
  highHz: z.number().nullable(),
  /** What its tables were measured for; null where none of them names a distance. */
  distanceM: z.number().nullable(),
  items: z.array(pathItemView),
  /** Terms a run through this path adds; an upload may say that a reading already holds some of them. */
  terms: z.array(
    z.strictObject({ id: z.string(), name: z.string(), identifier: z.string(), sign: z.enum(['+', '−']) }),
  ),
});
export type PathView = z.infer<typeof pathView>;
export const listPaths = operation({
  id: 'listPaths',
  method: 'GET',
  path: '/api/signal-paths',
  summary: 'Signal paths with their current revision',
  permission: 'path.list',
  status: 200,
  query: pageQuery,
  reply: pageOf(pathView),
});

export const limitSetView = z.strictObject({
  id: publicId,
  name: z.string(),
  port,
  distanceM: z.number().nullable(),
  revision: z.int(),
  /** Taken out of the choice for new runs, usually by its next revision; runs judged with it keep it. */
  withdrawnAt: instant.nullable(),
  lines: z.array(limitLineView),
});
export type LimitSetView = z.infer<typeof limitSetView>;
export const listLimitSets = operation({
  id: 'listLimitSets',
  method: 'GET',
  path: '/api/limit-sets',
  summary: 'Limit sets in use with their lines, sources and revisions; for a client, those of its own runs',
  permission: 'limit-set.list',
  status: 200,
  query: z.strictObject({ ...pageQuery.shape, withdrawn: z.enum(['without', 'with']).default('without') }),
  reply: pageOf(limitSetView),
});
const idParams = z.strictObject({ id: publicId });
export const readLimitSet = operation({
  id: 'readLimitSet',
  method: 'GET',
  path: '/api/limit-sets/{id}',
  summary: 'One revision of a limit set, withdrawn or not; for a client, of its own runs',
  permission: 'limit-set.list',
  status: 200,
  params: idParams,
  reply: limitSetView,
});
export const createLimitSet = operation({
  id: 'createLimitSet',
  method: 'POST',
  path: '/api/limit-sets',
  summary: 'Make a limit set of chosen lines, or the next revision of one; the older is withdrawn from the choice',
  permission: 'limit.enter',
  status: 201,
  body: z.strictObject({
    name: z.string().trim().min(1, 'is needed').max(160),
    port,
    distanceM: z.number().positive().max(1000).nullable(),
    /** Newest revisions of the lines, in the order they are shown. */
    lineIds: z.array(publicId).min(1, 'names at least one limit line').max(40),
    /** The set this is the next revision of; null for a new name. */
    revises: publicId.nullable().default(null),
    reason: z.string().trim().min(1, 'is needed').max(300),
  }),
  reply: limitSetView,
  idempotent: true,
});

export const equipmentView = z.strictObject({
  id: publicId,
  identifier: z.string(),
  role: z.string(),
  description: z.string(),
  state: z.enum(['in-use', 'quarantined', 'retired']),
  certificate: z.string().nullable(),
  laboratory: z.string().nullable(),
  calibratedOn: day.nullable(),
  dueOn: day.nullable(),
  due: dueState,
  tables: z.array(
    z.strictObject({
      id: publicId,
      name: z.string(),
      revision: z.int(),
      quantity: z.string(),
      polarisation: polarisation.nullable(),
      rows: z.int(),
      source: z.string(),
    }),
  ),
});
export type EquipmentView = z.infer<typeof equipmentView>;
export const equipmentRecord = z.strictObject({
  ...equipmentView.shape,
  version,
  /** Newest first. */
  calibrations: z.array(
    z.strictObject({
      id: publicId,
      certificate: z.string(),
      laboratory: z.string(),
      calibratedOn: day,
      dueOn: day.nullable(),
      enteredAt: instant,
    }),
  ),
  /** Signal paths it is part of now. */
  paths: z.array(z.strictObject({ id: publicId, code: z.string(), name: z.string(), revision: z.int() })),
});
export type EquipmentRecord = z.infer<typeof equipmentRecord>;
export const readEquipment = operation({
  id: 'readEquipment',
  method: 'GET',
  path: '/api/equipment/{id}',
  summary: 'An item of equipment with its calibrations, factor tables and paths',
  permission: 'equipment.list',
  status: 200,
  params: idParams,
  reply: equipmentRecord,
});
export const listEquipment = operation({
  id: 'listEquipment',
  method: 'GET',
  path: '/api/equipment',
  summary: 'Equipment with its last calibration and factor tables; by words of the trade',
  permission: 'equipment.list',
  status: 200,
  query: z.strictObject({ ...pageQuery.shape, find: z.string().trim().max(120).optional() }),
  reply: pageOf(equipmentView),
});
