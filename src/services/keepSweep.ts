import type { z } from 'zod';
import { authorise, type Actor } from '@/auth/actor';
import { Conflict } from '@/errors';
import { ModificationState } from '@/models/modificationState';
import { Sweep } from '@/models/sweep';
import { currentTransaction, unitOfWork } from '@/models/unitOfWork';
import type { keepSweep as keepSweepBody, SweepView } from '@/schemas/sweep';
import { recordChange } from './audit';
import { nextNumber } from './counters';
import { writeEvaluation } from './evaluations';
import { rememberShape } from './fileShapes';
import { dayIn, labSettings } from './lab';
import { lockOpenJob } from './samples';
import { settleRetests } from './settleRetests';
import { dropSweep, refusePlanned, stageSweep, type PendingSweep } from './stageSweep';
import { readSweep } from './sweeps';

type Body = z.infer<typeof keepSweepBody>;

/**
 * Keeps an uploaded file as a run of a sample state: the original bytes, the traces, the evaluation and its audit
 * entry. The path's revision and its calibrations are those in force when it was measured; without that moment, when
 * it is kept (`at`).
 */
export async function keepSweep(actor: Actor | null, body: Body, at = new Date()): Promise<SweepView> {
  const pending = await stageSweep(actor, body, at);
  try {
    return await publishSweep(actor, body, pending);
  } catch (error) {
    await dropSweep(pending).catch(() => undefined);
    throw error;
  }
}

/** Gives a pending run its number and its evaluation, and all that follows from there being a run, in one transaction. */
export async function publishSweep(
  actor: Actor | null,
  body: Body,
  { id, state, upload, judged, at }: PendingSweep,
): Promise<SweepView> {
  authorise(actor, 'sweep.keep');
  return unitOfWork(async () => {
    // Judging took a while; what was looked at before it is decided under its locks.
    await lockOpenJob(state.jobId);
    const lock = currentTransaction().LOCK.UPDATE;
    refusePlanned(await ModificationState.findByPk(state.id, { lock, rejectOnEmpty: true }));
    const run = await Sweep.unscoped().findOne({ where: { id, evaluationId: null }, lock });
    if (!run) throw new Conflict('Keeping this file took too long, and it was let go. Keep it again.');
    const evaluation = await writeEvaluation(actor, run, judged, at);
    const { zone } = await labSettings();
    const year = dayIn(zone, at).slice(0, 4);
    const number = `R-${year.slice(2)}-${String(await nextNumber(`run-${year}`)).padStart(3, '0')}`;
    await run.update({ number, evaluationId: evaluation.id });
    await rememberShape(actor, upload, run, body, at);
    await settleRetests(actor, { stateId: state.id, port: body.port, because: `run ${number} kept`, at });
    recordChange(actor, {
      scope: `job-${state.jobPublicId}`,
      action: `run ${number} kept`,
      subjectType: 'sweep',
      subjectId: run.publicId,
      before: null,
      after: {
        number,
        state: body.stateId,
        sha256: upload.sha256,
        evaluation: evaluation.publicId,
        verdict: evaluation.verdict,
        choice: body,
      },
      at,
    });
    return readSweep(actor, run.publicId);
  });
}
