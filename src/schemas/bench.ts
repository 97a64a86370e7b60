import { z } from 'zod';
import { day, pageOf, pageQuery, polarisation, port, publicId } from './common';
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
  lines: z.array(limitLineView),
});
export type LimitSetView = z.infer<typeof limitSetView>;
export const listLimitSets = operation({
  id: 'listLimitSets',
  method: 'GET',
  path: '/api/limit-sets',
  summary: 'Limit sets with their lines, sources and revisions',
  permission: 'limit-set.list',
  status: 200,
  query: pageQuery,
  reply: pageOf(limitSetView),
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
export const listEquipment = operation({
  id: 'listEquipment',
  method: 'GET',
  path: '/api/equipment',
  summary: 'Equipment with its last calibration and factor tables',
  permission: 'equipment.list',
  status: 200,
  query: pageQuery,
  reply: pageOf(equipmentView),
});
