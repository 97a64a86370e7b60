import { authorise, type Actor } from '@/auth/actor';
import { Conflict, Invalid } from '@/errors';
import { ModificationState } from '@/models/modificationState';
import { Sweep } from '@/models/sweep';
import { currentTransaction, unitOfWork } from '@/models/unitOfWork';
import type { SweepView } from '@/schemas/sweep';
import { recordChange } from './audit';
import { findRun, type Run, type WholeState } from './runs';
import { lockOpenJob, stateLabel } from './samples';
import { settleRetests } from './settleRetests';
import { readSweep } from './sweeps';
import { changeVersioned } from './versions';

interface Reasoned {
  reason: string;
}

/**
 * Moves a run to another state of this lab. Number, file and evaluation stay with it; what its state spoke for is
 * settled anew on both sides, and both jobs' chains say so. A client it leaves finds it no more.
 */
export async function refileSweep(
  actor: Actor | null,
  publicId: string,
  version: number,
  { stateId, reason }: Reasoned & { stateId: string },
  at = new Date(),
): Promise<SweepView> {
  authorise(actor, 'sweep.refile');
  return unitOfWork(async () => {
    const run = await findRun(actor, publicId);
    const from = run.state;
    const to = await wholeState(stateId);
    if (to.id === from.id) throw new Conflict(`Run ${run.number} stands under ${nameOf(to)} already.`);
    // In the order of their ids, so that two moves that cross wait for each other and never deadlock.
    for (const jobId of [...new Set([from.sample.job.id, to.sample.job.id])].sort((a, b) => a - b)) {
      await lockOpenJob(jobId);
    }
    await lockStates([from.id, to.id]);
    await to.reload({ include: [] });
    if (to.planned) {
      throw new Conflict(`${nameOf(to)} is still planned. Mark it as fitted before a run stands under it.`);
    }
    await changeVersioned(Sweep, run, version, { stateId: to.id }, 'run');
    record(actor, run, { from, to, reason, at });
    for (const state of [from, to]) {
      const because = `run ${run.number} re-filed from ${nameOf(from)} to ${nameOf(to)}`;
      await settleRetests(actor, { stateId: state.id, port: run.port, because, at });
    }
    return readSweep(actor, publicId);
  });
}

async function wholeState(publicId: string): Promise<WholeState> {
  const job = { association: 'job', include: ['organisation', 'product'] };
  const include = [{ association: 'sample', include: [job] }];
  const state = await ModificationState.findOne({ where: { publicId }, include });
  if (!state) throw new Invalid([{ pointer: '/stateId', message: 'is not a modification state of this lab' }]);
  return state as WholeState;
}

async function lockStates(ids: number[]): Promise<void> {
  const lock = currentTransaction().LOCK.UPDATE;
  await ModificationState.findAll({ where: { id: ids }, order: [['id', 'ASC']], lock });
}

const nameOf = (state: WholeState): string => `${stateLabel(state.position)} of ${state.sample.code}`;

interface Move extends Reasoned {
  from: WholeState;
  to: WholeState;
  at: Date;
}

/** The entry of the run joins the chain of the job it goes to; the job it leaves gets one of its own. */
function record(actor: Actor, run: Run, { from, to, reason, at }: Move): void {
  const placeOf = (state: WholeState) => ({
    job: state.sample.job.number,
    sample: state.sample.code,
    state: stateLabel(state.position),
    stateId: state.publicId,
    organisation: state.sample.job.organisation.publicId,
  });
  const change = { before: placeOf(from), after: { ...placeOf(to), reason }, at };
  recordChange(actor, {
    scope: `job-${to.sample.job.publicId}`,
    action: `run ${run.number} re-filed`,
    subjectType: 'sweep',
    subjectId: run.publicId,
    ...change,
  });
  if (from.sample.job.id === to.sample.job.id) return;
  recordChange(actor, {
    scope: `job-${from.sample.job.publicId}`,
    action: `run ${run.number} re-filed to job ${to.sample.job.number}`,
    subjectType: 'job',
    subjectId: from.sample.job.publicId,
    ...change,
  });
}

/** Marks a run as voided: readable, its bytes at hand, and without a voice in any verdict. */
export async function voidSweep(
  actor: Actor | null,
  publicId: string,
  version: number,
  { reason }: Reasoned,
  at = new Date(),
): Promise<SweepView> {
  authorise(actor, 'sweep.void');
  return changeVoice(actor, publicId, version, (run) => {
    if (run.voidedAt) throw new Conflict(`Run ${run.number} is voided already.`);
    return {
      action: 'voided',
      values: { voidedAt: at, voidReason: reason, voidedBy: actor.userId },
      before: { voided: false },
      after: { voided: true, reason },
      at,
    };
  });
}

/** Takes a voiding back. */
export async function restoreSweep(
  actor: Actor | null,
  publicId: string,
  version: number,
  { reason }: Reasoned,
  at = new Date(),
): Promise<SweepView> {
  authorise(actor, 'sweep.void');
  return changeVoice(actor, publicId, version, (run) => {
    if (!run.voidedAt) throw new Conflict(`Run ${run.number} is not voided.`);
    return {
      action: 'restored',
      values: { voidedAt: null, voidReason: null, voidedBy: null },
      before: { voided: true, reason: run.voidReason },
      after: { voided: false, reason },
      at,
    };
  });
}

interface Voicing {
  action: 'voided' | 'restored';
  values: Record<string, unknown>;
  before: Record<string, unknown>;
  after: Record<string, unknown>;
  at: Date;
}

async function changeVoice(
  actor: Actor,
  publicId: string,
  version: number,
  decide: (run: Run) => Voicing,
): Promise<SweepView> {
  return unitOfWork(async () => {
    const run = await findRun(actor, publicId);
    const { action, values, before, after, at } = decide(run);
    await lockOpenJob(run.state.sample.job.id);
    await lockStates([run.stateId]);
    await changeVersioned(Sweep, run, version, values, 'run');
    recordChange(actor, {
      scope: `job-${run.state.sample.job.publicId}`,
      action: `run ${run.number} ${action}`,
      subjectType: 'sweep',
      subjectId: publicId,
      before,
      after,
      at,
    });
    const because = `run ${run.number} ${action}`;
    await settleRetests(actor, { stateId: run.stateId, port: run.port, because, at });
    return readSweep(actor, publicId);
  });
}
