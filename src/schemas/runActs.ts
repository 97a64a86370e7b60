import { z } from 'zod';
import { instant, pageOf, pageQuery, person, publicId, verdict } from './common';
import { operation } from './operation';
import { evaluationView, sweepView } from './sweep';

/** Corrections of kept runs. Nothing is deleted by any of them, and each carries its reason. */

const params = z.strictObject({ id: publicId });
const reason = z.string().trim().min(1, 'is needed').max(300, 'takes at most 300 characters');
export const reasonBody = z.strictObject({ reason });
export const refileBody = z.strictObject({ stateId: publicId, reason });

export const refileSweep = operation({
  id: 'refileSweep',
  method: 'POST',
  path: '/api/sweeps/{id}/refile',
  summary: 'Move a run to another modification state, of this sample or another',
  permission: 'sweep.refile',
  status: 200,
  params,
  body: refileBody,
  reply: sweepView,
  ifMatch: true,
});
export const voidSweep = operation({
  id: 'voidSweep',
  method: 'POST',
  path: '/api/sweeps/{id}/void',
  summary: 'Mark a run as voided; it stays readable and speaks for nothing',
  permission: 'sweep.void',
  status: 200,
  params,
  body: reasonBody,
  reply: sweepView,
  ifMatch: true,
});
export const restoreSweep = operation({
  id: 'restoreSweep',
  method: 'POST',
  path: '/api/sweeps/{id}/restore',
  summary: 'Take the voiding of a run back; it speaks for its state again',
  permission: 'sweep.void',
  status: 200,
  params,
  body: reasonBody,
  reply: sweepView,
  ifMatch: true,
});

/** One evaluation of a run, and how it differs from the one before it. */
export const evaluationItem = z.strictObject({
  id: publicId,
  at: instant,
  by: person,
  engine: z.string(),
  verdict,
  counts: evaluationView.shape.counts,
  candidates: z.int(),
  worst: z.strictObject({ frequencyHz: z.number(), marginDb: z.number() }).nullable(),
  /** null for the evaluation the run was kept with. */
  reason: z.string().nullable(),
  /** Whether this is what the run is judged by now. */
  current: z.boolean(),
  /** What it used otherwise than the evaluation before it, one sentence each. */
  changes: z.array(z.string()),
  /** Whether its candidates and layers repeat the evaluation before it bit for bit. */
  repeats: z.boolean(),
});
export type EvaluationItem = z.infer<typeof evaluationItem>;

export const listEvaluations = operation({
  id: 'listEvaluations',
  method: 'GET',
  path: '/api/sweeps/{id}/evaluations',
  summary: 'Every evaluation of a run, newest first, and what is newer than the revisions it was judged with',
  permission: 'sweep.read',
  status: 200,
  params,
  query: pageQuery,
  reply: z.strictObject({
    ...pageOf(evaluationItem).shape,
    /** Revisions a new evaluation would use, one sentence each; empty for a reader who may not evaluate. */
    newer: z.array(z.string()),
  }),
});
export const evaluateSweep = operation({
  id: 'evaluateSweep',
  method: 'POST',
  path: '/api/sweeps/{id}/evaluations',
  summary: 'Judge the kept points again with the newest revisions of their path and limit set',
  permission: 'sweep.evaluate',
  status: 201,
  params,
  body: reasonBody,
  reply: z.strictObject({ evaluation: evaluationItem, sweep: sweepView }),
  idempotent: true,
});
