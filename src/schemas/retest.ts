import { z } from 'zod';
import {
  day,
  instant,
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
  verdict,
  version,
} from './common';
import { operation } from './operation';

export const RETEST_STATUSES = ['waiting', 'scheduled', 'measured', 'cleared', 'withdrawn'] as const;
export const RETEST_REASONS = ['over', 'needs-final', 'repeat-prescan'] as const;
export const retestStatus = z.enum(RETEST_STATUSES);
export const retestReason = z.enum(RETEST_REASONS);
const position = z.union([polarisation, mainsLine]).nullable();
const runRef = z.strictObject({ id: publicId, number: z.string() });
const text = (max: number) => z.string().trim().min(1, 'is needed').max(max, `takes at most ${max} characters`);

/** One emission that asks for another look, or a prescan to be repeated: then it has no line and no figures. */
export const retestItem = z.strictObject({
  id: publicId,
  version,
  number: z.string(),
  kind: z.enum(['peak', 'floor', 'repeat-prescan']),
  reason: retestReason,
  status: retestStatus,
  /** Why it stands there: `needs a final in R-26-031`, or what a person wrote. */
  statusReason: z.string(),
  organisation: organisationRef,
  product: z.strictObject({ id: publicId, code: z.string(), name: z.string() }),
  job: z.strictObject({ id: publicId, number: z.string() }),
  sample: z.strictObject({ id: publicId, code: z.string(), serial: z.string() }),
  state: z.strictObject({ id: publicId, label: z.string() }),
  port,
  /** Of the worst reading, or where the prescan is to be repeated; null where the port has only one. */
  position,
  /** The positions that are still to be measured. */
  waitsAt: z.array(position),
  line: z
    .strictObject({
      id: publicId,
      key: z.string(),
      name: z.string(),
      detector: lineDetector,
      bandwidthHz: z.number(),
      unit: lineUnit,
    })
    .nullable(),
  frequencyHz: z.number().nullable(),
  /** The stretch of a noise floor; both the place of the emission otherwise. */
  fromHz: z.number().nullable(),
  toHz: z.number().nullable(),
  level: z.number().nullable(),
  limit: z.number().nullable(),
  /** limit − level, positive under the limit. */
  marginDb: z.number().nullable(),
  uncertaintyDb: z.number().nullable(),
  verdict: verdict.nullable(),
  /** Why the reading cannot decide. */
  because: z.string().nullable(),
  heightM: z.number().nullable(),
  azimuthDeg: z.number().nullable(),
  /** The run the reading comes from. */
  run: runRef.nullable(),
  /** The item of the state before that it was carried from. */
  carriedFrom: z.strictObject({ number: z.string(), state: z.string() }).nullable(),
  carriedTo: z.string().nullable(),
  scheduledOn: day.nullable(),
  note: z.string().nullable(),
  /** A person set it aside; the runs reopen it only when it reads worse. */
  setAside: z.boolean(),
  since: instant,
});
export type RetestItem = z.infer<typeof retestItem>;

export const retestChange = z.strictObject({
  at: instant,
  by: person,
  action: z.enum(['opened', 'updated', 'scheduled', 'measured', 'cleared', 'withdrawn', 'reopened']),
  from: retestStatus.nullable(),
  to: retestStatus,
  reason: z.string(),
  run: runRef.nullable(),
  marginFromDb: z.number().nullable(),
  marginToDb: z.number().nullable(),
  scheduledOn: day.nullable(),
  note: z.string().nullable(),
});
/** Changes newest first, at most 200. */
export const retestView = z.strictObject({ ...retestItem.shape, changes: z.array(retestChange) });
export type RetestView = z.infer<typeof retestView>;

export const retestFilters = z.strictObject({
  /** `open`: waiting, scheduled or measured and not settled. */
  status: z.enum([...RETEST_STATUSES, 'open']).optional(),
  reason: retestReason.optional(),
  port: port.optional(),
  sampleId: publicId.optional(),
  stateId: publicId.optional(),
  productId: publicId.optional(),
  organisationId: publicId.optional(),
  /** What a run opened, changed or settled. */
  runId: publicId.optional(),
});
export type RetestFilters = z.infer<typeof retestFilters>;

export const changeRetestBody = z.discriminatedUnion('act', [
  z.strictObject({
    act: z.literal('schedule'),
    day: day.nullable().default(null),
    note: z.string().trim().max(300, 'takes at most 300 characters').nullable().default(null),
  }),
  z.strictObject({ act: z.literal('withdraw'), reason: text(300) }),
  z.strictObject({ act: z.literal('reopen'), reason: text(300) }),
]);

export const listRetests = operation({
  id: 'listRetests',
  method: 'GET',
  path: '/api/retests',
  summary: 'The retest queue: over first, then prescans to repeat and what needs a final, smallest margin first',
  permission: 'retest.list',
  status: 200,
  query: z.strictObject({ ...pageQuery.shape, ...retestFilters.shape }),
  reply: pageOf(retestItem),
});
export const readRetest = operation({
  id: 'readRetest',
  method: 'GET',
  path: '/api/retests/{id}',
  summary: 'One retest with its changes',
  permission: 'retest.list',
  status: 200,
  params: z.strictObject({ id: publicId }),
  reply: retestView,
});
export const changeRetest = operation({
  id: 'changeRetest',
  method: 'PATCH',
  path: '/api/retests/{id}',
  summary: 'Schedule a retest, set it aside with a reason, or reopen it',
  permission: 'retest.change',
  status: 200,
  params: z.strictObject({ id: publicId }),
  body: changeRetestBody,
  reply: retestView,
  ifMatch: true,
});
export const downloadFrequencyList = operation({
  id: 'downloadFrequencyList',
  method: 'GET',
  path: '/api/retests/frequency-list',
  summary: 'Emissions to measure as a list for the receiver; waiting and scheduled ones where no status is named',
  permission: 'retest.list',
  status: 200,
  query: z.strictObject({ ...retestFilters.shape, format: z.enum(['csv', 'txt']).default('csv') }),
  download: true,
});
