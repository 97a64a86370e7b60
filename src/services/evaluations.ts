import type { Actor } from '@/auth/actor';
import { ENGINE } from '@/emc/evaluate';
import { Evaluation } from '@/models/evaluation';
import { EvaluationCandidate } from '@/models/evaluationCandidate';
import { writeLayers } from '@/models/layerStore';
import { newPublicId } from '@/models/publicId';
import type { Sweep } from '@/models/sweep';
import type { Judged } from './judgeFile';

/** Writes what was judged as a new evaluation of the run; the run's pointer is moved by the caller. */
export async function writeEvaluation(actor: Actor, run: Sweep, judged: Judged, at: Date): Promise<Evaluation> {
  const { evaluation, path, terms, lines } = judged;
  const worst = evaluation.candidates[0];
  const row = await Evaluation.create({
    publicId: newPublicId(),
    sweepId: run.id,
    engine: ENGINE,
    decisionRule: judged.input.rule,
    inputs: {
      pathRevision: path?.revision.publicId ?? null,
      factorTables: terms.map(({ term, table }) => ({ term: term.id, table: table.publicId, applied: term.applied })),
      limitLines: lines.map((line) => line.id),
      uncertaintyOf: path?.revision.publicId ?? null,
    },
    verdict: evaluation.verdict,
    worstFrequencyHz: worst?.frequencyHz ?? null,
    worstMarginDb: worst?.marginDb ?? null,
    counts: evaluation.counts,
    pairs: evaluation.pairs,
    gaps: evaluation.gaps,
    candidates: evaluation.candidates.length,
    userId: actor.userId,
    createdAt: at,
  });
  await EvaluationCandidate.bulkCreate(
    evaluation.candidates.map((candidate) => ({ evaluationId: row.id, ...candidate })),
  );
  await writeLayers(
    row.id,
    judged.input.traces.map(({ index }, i) => ({ index, layer: evaluation.layers[i]! })),
  );
  return row;
}
