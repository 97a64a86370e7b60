import { z } from 'zod';
import { UCISPR_EDITIONS, UCISPR_MEASUREMENTS } from '@/emc/ucispr';
import { instant, person, polarisation, port, publicId, version } from './common';
import { operation } from './operation';
import { pathItemView } from './sweep';
import { factorQuantity } from './tables';

/* One signal path: what it adds to a reading over frequency, how certain that is, and from which budget. */

const text = (most: number) => z.string().trim().min(1, 'is needed').max(most);
const idParams = z.strictObject({ id: publicId });

/** How a value is stated, and with it what it is divided by. Source: JCGM 100:2008 (GUM) 4.3. */
export const distribution = z.discriminatedUnion('shape', [
  z.strictObject({ shape: z.literal('normal'), k: z.number().positive().max(10) }),
  z.strictObject({ shape: z.enum(['rectangular', 'triangular', 'U-shaped']) }),
]);
export type DistributionView = z.infer<typeof distribution>;

export const contribution = z.strictObject({
  name: text(120),
  /** Half-width of the interval, or the uncertainty stated with its k, in dB. */
  valueDb: z.number().min(0).max(60),
  distribution,
  sensitivity: z.number().min(-10).max(10).default(1),
  source: text(300),
  /** n − 1 for a value from n readings; null for one without limit. */
  degreesOfFreedom: z.number().min(1).max(1e6).nullable().default(null),
});
export type ContributionView = z.infer<typeof contribution>;

export const budgetRange = z
  .strictObject({
    startHz: z.number().positive().max(1e12),
    stopHz: z.number().positive().max(1e12),
    contributions: z.array(contribution).min(1, 'names at least one contribution').max(60),
  })
  .refine(({ startHz, stopHz }) => stopHz > startHz, { path: ['stopHz'], message: 'is not above the start' });
export const uncertaintyBudget = z.strictObject({
  prescan: z.array(budgetRange).min(1, 'has at least one range').max(20),
  final: z.array(budgetRange).min(1, 'has at least one range').max(20),
});
export type UncertaintyBudgetView = z.infer<typeof uncertaintyBudget>;

const budgetRow = z.strictObject({
  ...contribution.shape,
  divisor: z.number(),
  standardDb: z.number(),
  /** |sensitivity| times standardDb. */
  contributedDb: z.number(),
  /** Part of the combined variance, 0 to 1. */
  shareOfVariance: z.number().nullable(),
});
export const computedBudget = z.strictObject({
  rows: z.array(budgetRow),
  combinedDb: z.number(),
  effectiveDegreesOfFreedom: z.number().nullable(),
  coverageFactor: z.number(),
  expandedDb: z.number(),
});
export type ComputedBudget = z.infer<typeof computedBudget>;

/** Expanded uncertainty over one range, the budget it comes from, and how it stands to Ucispr. */
export const uncertaintyView = z.strictObject({
  purpose: z.enum(['prescan', 'final']),
  startHz: z.number(),
  stopHz: z.number(),
  expandedDb: z.number(),
  /** Null: stated, not computed. */
  budget: computedBudget.nullable(),
  ucispr: z.array(
    z.strictObject({
      fromHz: z.number(),
      toHz: z.number(),
      measurement: z.enum(UCISPR_MEASUREMENTS),
      edition: z.enum(UCISPR_EDITIONS),
      ucisprDb: z.number(),
      /** U less Ucispr where that is above zero, otherwise 0. */
      excessDb: z.number(),
    }),
  ),
});
export type UncertaintyView = z.infer<typeof uncertaintyView>;

const factorTable = z.strictObject({
  id: publicId,
  name: z.string(),
  revision: z.int(),
  quantity: factorQuantity,
  polarisation: polarisation.nullable(),
  distanceM: z.number().nullable(),
  source: z.string(),
  frequencyHz: z.array(z.number()),
  valueDb: z.array(z.number()),
});
export const pathItemRecord = z.strictObject({
  ...pathItemView.shape,
  equipmentId: publicId,
  state: z.enum(['in-use', 'quarantined', 'retired']),
  /** Null for an item that adds nothing, such as the receiver. */
  term: z.string().nullable(),
  sign: z.enum(['+', '−']).nullable(),
  /** Where it is in a path split by frequency; an open end is null. */
  fromHz: z.number().nullable(),
  toHz: z.number().nullable(),
  tables: z.array(factorTable),
});
export type PathItemRecord = z.infer<typeof pathItemRecord>;

/** The total and what each term adds to it, in the order of the correction's `terms`. */
export const correctionAt = z.strictObject({
  frequencyHz: z.number(),
  totalDb: z.number().nullable(),
  shares: z.array(
    z.strictObject({
      /** As it enters the sum, a gain below zero; null outside its table and where it is not in the path. */
      shareDb: z.number().nullable(),
      /** False outside its range in a path split by frequency. */
      inPath: z.boolean(),
      /** The two rows it lies between; the same row twice where one was hit. */
      rows: z
        .strictObject({ lowerHz: z.number(), lowerDb: z.number(), upperHz: z.number(), upperDb: z.number() })
        .nullable(),
    }),
  ),
});
export type CorrectionAt = z.infer<typeof correctionAt>;

export const correctionView = z.strictObject({
  /** Null where no table differs by polarisation. */
  polarisation: polarisation.nullable(),
  /** The table each term takes, in the order of the path. */
  terms: z.array(
    z.strictObject({ identifier: z.string(), name: z.string(), sign: z.enum(['+', '−']), tableId: publicId }),
  ),
  /** Straight over log f between their points, one for each piece of the path; nothing where any term has no value. */
  lines: z.array(z.array(z.strictObject({ frequencyHz: z.number(), totalDb: z.number() }))),
  /** Where it is known, and where not by the items that have no value. */
  stretches: z.array(z.strictObject({ fromHz: z.number(), toHz: z.number(), missing: z.array(z.string()) })),
  /** At round frequencies from the lowest to the highest it is known at, both included, and at the one asked for. */
  at: z.array(correctionAt),
});
export type CorrectionView = z.infer<typeof correctionView>;

const runRef = z.strictObject({ id: publicId, number: z.string(), measuredAt: instant, revision: z.int() });
const revisionView = z.strictObject({
  revision: z.int(),
  enteredAt: instant,
  enteredBy: person.nullable(),
  reason: z.string().nullable(),
  /** Whether its uncertainty is computed from a budget. */
  budget: z.boolean(),
  uncertaintySource: z.string(),
  /** Largest expanded uncertainty; null where none is stated. */
  prescanDb: z.number().nullable(),
  finalDb: z.number().nullable(),
  runs: z.int(),
});

export const pathRecord = z.strictObject({
  id: publicId,
  version,
  code: z.string(),
  name: z.string(),
  port,
  position: z.string(),
  /** The revision that is shown. */
  revision: z.int(),
  /** Of its antenna factor; null where there is none. */
  distanceM: z.number().nullable(),
  /** In what the total is stated: of its transducer, dB/m with an antenna factor; else dB. */
  unit: z.string(),
  items: z.array(pathItemRecord),
  corrections: z.array(correctionView),
  uncertaintySource: z.string(),
  uncertainty: z.array(uncertaintyView),
  /** Corrected, but with no stated uncertainty: nothing is concluded there. */
  withoutUncertainty: z.array(
    z.strictObject({ purpose: z.enum(['prescan', 'final']), fromHz: z.number(), toHz: z.number() }),
  ),
  /** Newest first. */
  revisions: z.array(revisionView),
  /** Runs through any revision; the newest ten. */
  runs: z.strictObject({ count: z.int(), latest: z.array(runRef) }),
});
export type PathRecord = z.infer<typeof pathRecord>;

export const readPath = operation({
  id: 'readPath',
  method: 'GET',
  path: '/api/signal-paths/{id}',
  summary: 'A signal path: items, total correction over frequency, uncertainty with its budget, revisions and runs',
  permission: 'path.list',
  status: 200,
  params: idParams,
  query: z.strictObject({
    /** An earlier revision; left out, the newest. */
    revision: z.coerce.number().int().min(1).max(1e6).optional(),
    /** One more frequency to state the correction at. */
    atHz: z.coerce.number().positive().max(1e12).optional(),
  }),
  reply: pathRecord,
});

export const reviseUncertaintyBody = z.strictObject({
  budget: uncertaintyBudget,
  /** Where the budget as a whole comes from. */
  uncertaintySource: text(300),
  reason: text(300),
});
export const reviseUncertainty = operation({
  id: 'reviseUncertainty',
  method: 'POST',
  path: '/api/signal-paths/{id}/uncertainty',
  summary:
    'Enter the budget of a path’s uncertainty as its next revision; runs keep the revision they were judged with',
  permission: 'path.enter',
  status: 201,
  params: idParams,
  body: reviseUncertaintyBody,
  reply: pathRecord,
  idempotent: true,
  ifMatch: true,
});
