import { z } from 'zod';
import { lineDetector, publicId, verdict } from './common';
import { operation } from './operation';
import { sweepView, windowView } from './sweep';

/** Two runs of one sample over each other. b is compared with a: `M2 beside M1` has M1 as a. */

/** Of each run what a reader needs beside its columns. */
export const comparedRun = sweepView.pick({
  id: true,
  number: true,
  purpose: true,
  port: true,
  line: true,
  polarisation: true,
  heightM: true,
  heightSwept: true,
  distanceM: true,
  operatingMode: true,
  trial: true,
  partial: true,
  voided: true,
  measuredAt: true,
  keptAt: true,
  job: true,
  organisation: true,
  sample: true,
  state: true,
  limitSet: true,
  points: true,
  firstHz: true,
  lastHz: true,
  stepHz: true,
  traces: true,
  evaluation: true,
});
export type ComparedRun = z.infer<typeof comparedRun>;

/** A trace of each run laid over each other, and how much higher b is per stretch, dB; negative is lower. */
export const differenceView = z.strictObject({
  a: z.int(),
  b: z.int(),
  sameDetector: z.boolean(),
  fromHz: z.array(z.number()),
  toHz: z.array(z.number()),
  differenceDb: z.array(z.number()),
});
export type DifferenceView = z.infer<typeof differenceView>;

/** What one run shows of an emission. */
const sightingView = z.strictObject({
  frequencyHz: z.number(),
  level: z.number(),
  marginDb: z.number().nullable(),
  uncertaintyDb: z.number().nullable(),
  /** null where the emission is none of the run's candidates: its level is the highest of the points there. */
  verdict: verdict.nullable(),
});
export const comparedEmission = z.strictObject({
  /** 1 is the worst in b, or in a where b has none. */
  rank: z.int(),
  kind: z.enum(['peak', 'floor']),
  frequencyHz: z.number(),
  fromHz: z.number(),
  toHz: z.number(),
  /** Which of `differences` it was seen in, and which limit. */
  pair: z.int(),
  limit: lineDetector,
  /** null where the run did not read there. */
  a: sightingView.nullable(),
  b: sightingView.nullable(),
  /** The level of b less that of a, dB; of a floor, whose worst point wanders, the margin of a less that of b. */
  movedDb: z.number().nullable(),
});
export type ComparedEmission = z.infer<typeof comparedEmission>;

/** Why a difference holds more than the modification, or is not there; what a and b have instead of one thing. */
export const caution = z.strictObject({
  what: z.enum([
    'unit',
    'no-overlap',
    'overlap',
    'detector',
    'no-counterpart',
    'rbw',
    'step',
    'position',
    'height',
    'distance',
    'path',
    'limits',
    'mode',
    'partial',
    'voided',
  ]),
  a: z.union([z.string(), z.number()]).nullable(),
  b: z.union([z.string(), z.number()]).nullable(),
});
export type Caution = z.infer<typeof caution>;

export const comparisonView = z.strictObject({
  fromHz: z.number(),
  toHz: z.number(),
  columns: z.int(),
  a: windowView.shape.traces,
  b: windowView.shape.traces,
  differences: z.array(differenceView),
  /** null when only the columns were asked for. */
  about: z
    .strictObject({
      a: comparedRun,
      b: comparedRun,
      /** Of the candidates of both runs, the 50 worst of each. */
      emissions: z.array(comparedEmission),
      cautions: z.array(caution),
    })
    .nullable(),
});
export type ComparisonView = z.infer<typeof comparisonView>;

export const comparisonQuery = z.strictObject({
  a: publicId,
  b: publicId,
  /** Both ends, or neither for all that either run covers. */
  fromHz: z.coerce.number().positive().optional(),
  toHz: z.coerce.number().positive().optional(),
  columns: z.coerce.number().int().min(16).max(4096).default(1024),
  only: z.enum(['columns']).optional(),
});

export const compareSweeps = operation({
  id: 'compareSweeps',
  method: 'GET',
  path: '/api/comparisons',
  summary: 'Two runs of one sample over each other, with their difference per column and per emission',
  permission: 'sweep.compare',
  status: 200,
  query: comparisonQuery,
  reply: comparisonView,
});
