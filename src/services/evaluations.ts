import { authorise, type Actor } from '@/auth/actor';
import { mayRole } from '@/auth/permissions';
import { ENGINE } from '@/emc/evaluate';
import type { EvaluationInput } from '@/emc/types';
import { Conflict } from '@/errors';
import { Evaluation } from '@/models/evaluation';
import { EvaluationCandidate } from '@/models/evaluationCandidate';
import { readLayers, writeLayers } from '@/models/layerStore';
import { newPublicId } from '@/models/publicId';
import { Sweep } from '@/models/sweep';
import { readPieces } from '@/models/traceStore';
import { unitOfWork } from '@/models/unitOfWork';
import type { User } from '@/models/user';
import type { EvaluationItem } from '@/schemas/runActs';
import type { SweepView } from '@/schemas/sweep';
import { recordChange } from './audit';
import { changesBetween, inputsOf, nameInputs, type InputChange, type Used } from './evaluationInputs';
import { evaluateApart } from './importWorkers';
import type { Judged } from './judgeFile';
import { contextNow } from './newestRevisions';
import { olderThan, pageFrom, type Page, type PageRequest } from './paging';
import { findRun, type Run } from './runs';
import { lockOpenJob } from './samples';
import { settleRetests } from './settleRetests';
import { readSweep } from './sweeps';
import { joined } from './sweepWorking';
import { changeVersioned } from './versions';

const CANDIDATES_AT_ONCE = 100;

/** Writes what was judged as a new evaluation of the run; the run's pointer is moved by the caller. */
export async function writeEvaluation(
  actor: Actor,
  run: Sweep,
  judged: Judged,
  at: Date,
  again: { reason: string | null; repeatsId: number | null } = { reason: null, repeatsId: null },
): Promise<Evaluation> {
  const { evaluation } = judged;
  const worst = evaluation.candidates[0];
  const row = await Evaluation.create({
    publicId: newPublicId(),
    sweepId: run.id,
    engine: ENGINE,
    decisionRule: judged.input.rule,
    inputs: inputsOf(judged),
    verdict: evaluation.verdict,
    worstFrequencyHz: worst?.frequencyHz ?? null,
    worstMarginDb: worst?.marginDb ?? null,
    counts: evaluation.counts,
    pairs: evaluation.pairs,
    gaps: evaluation.gaps,
    candidates: evaluation.candidates.length,
    ...again,
    userId: actor.userId,
    createdAt: at,
  });
  const candidates = evaluation.candidates.map((candidate) => ({ evaluationId: row.id, ...candidate }));
  // A floor without an end may hold thousands; no statement is so long that others wait for its text.
  for (let from = 0; from < candidates.length; from += CANDIDATES_AT_ONCE) {
    await EvaluationCandidate.bulkCreate(candidates.slice(from, from + CANDIDATES_AT_ONCE));
  }
  await writeLayers(
    row.id,
    judged.input.traces.map(({ index }, i) => ({ index, layer: evaluation.layers[i]! })),
  );
  return row;
}

/**
 * Judges the kept points of a run again: with the newest revision of its path that holds for the day it was measured,
 * and the newest of its limit set. What was judged before stays as it is; the run points at the new evaluation.
 */
export async function evaluateSweep(
  actor: Actor | null,
  publicId: string,
  { reason }: { reason: string },
  at = new Date(),
): Promise<{ evaluation: EvaluationItem; sweep: SweepView }> {
  authorise(actor, 'sweep.evaluate');
  return unitOfWork(async () => {
    const run = await findRun(actor, publicId);
    if (run.voidedAt) throw new Conflict(`Run ${run.number} is voided. Restore it before it is judged again.`);
    const before = run.evaluation;
    const judged = await judgeAgain(actor, run);
    const repeatsId = (await sameFigures(before, judged)) ? before.id : null;
    // Judging takes a while; whether the run is still the one that was read is decided under its job's lock.
    await lockOpenJob(run.state.sample.job.id);
    const row = await writeEvaluation(actor, run, judged, at, { reason, repeatsId });
    const pinned = { pathRevisionId: judged.path?.revision.id ?? null, limitSetId: judged.limitSet.id };
    await changeVersioned(Sweep, run, run.version, { ...pinned, evaluationId: row.id }, 'run');
    const told = ({ publicId: evaluation, engine, verdict, worstMarginDb, inputs }: Evaluation) => ({
      ...{ evaluation, engine, verdict, worstMarginDb, inputs },
    });
    recordChange(actor, {
      scope: `job-${run.state.sample.job.publicId}`,
      action: `run ${run.number} re-evaluated`,
      subjectType: 'sweep',
      subjectId: publicId,
      before: told(before),
      after: { ...told(row), reason },
      at,
    });
    await settleRetests(actor, {
      stateId: run.stateId,
      port: run.port,
      because: `run ${run.number} re-evaluated`,
      at,
    });
    const { items } = await evaluationsOf(await findRun(actor, publicId), { limit: 1 });
    return { evaluation: items[0]!, sweep: await readSweep(actor, publicId) };
  });
}

/** The kept points through the code that judged the file, so that the same revisions give the same bits. */
async function judgeAgain(actor: Actor, run: Run): Promise<Judged> {
  const { heads, judged, ...gathered } = await contextNow(run);
  const pieces = await readPieces(run.id);
  const traces = heads.map((head) => ({ ...head, ...joined(pieces, head.index) }));
  const input: EvaluationInput = { ...judged, traces };
  return { ...gathered, input, evaluation: await evaluateApart(actor.userId, input) };
}

/** Whether an evaluation's candidates, gaps and layers are these, bit for bit; the line of a new revision is another. */
async function sameFigures(row: Evaluation, { evaluation, input }: Judged): Promise<boolean> {
  if (row.engine !== evaluation.engine || row.verdict !== evaluation.verdict) return false;
  const stored = await EvaluationCandidate.findAll({ where: { evaluationId: row.id }, order: [['rank', 'ASC']] });
  const bare = stored.map((candidate) => {
    const { evaluationId: _, ...rest } = candidate.get({ plain: true });
    return rest;
  });
  if (!alike(bare, evaluation.candidates) || !alike(row.gaps, evaluation.gaps)) return false;
  const layers = await readLayers(row.id);
  return input.traces.every(({ index }, i) => {
    const before = layers.find((one) => one.index === index)?.layer;
    const now = evaluation.layers[i]!;
    const keys = Object.keys(now) as (keyof typeof now)[];
    return before !== undefined && keys.every((key) => sameBytes(before[key], now[key]));
  });
}

function sameBytes(one: ArrayBufferView, other: ArrayBufferView): boolean {
  const bytes = ({ buffer, byteOffset, byteLength }: ArrayBufferView) => Buffer.from(buffer, byteOffset, byteLength);
  return bytes(one).equals(bytes(other));
}

/** Plain records with the same fields and figures, in whatever order their fields were written. */
function alike<T extends object>(some: readonly T[], others: readonly T[]): boolean {
  const same = (one: T, other: T) =>
    Object.keys({ ...one, ...other }).every((key) => one[key as keyof T] === other[key as keyof T]);
  return some.length === others.length && some.every((one, i) => same(one, others[i]!));
}

/** Every evaluation of a run, newest first; for those who may evaluate, what is newer than the current one used. */
export async function listEvaluations(
  actor: Actor | null,
  publicId: string,
  page: PageRequest,
): Promise<Page<EvaluationItem> & { newer: string[] }> {
  authorise(actor, 'sweep.read');
  return unitOfWork(async () => {
    const run = await findRun(actor, publicId);
    const newer = mayRole(actor.role, 'sweep.evaluate') && !run.voidedAt ? await newerFor(run) : [];
    return { ...(await evaluationsOf(run, page)), newer };
  });
}

async function evaluationsOf(run: Run, page: PageRequest): Promise<Page<EvaluationItem>> {
  const rows = await Evaluation.findAll({
    where: { sweepId: run.id, ...olderThan(page) },
    include: ['user'],
    order: [['id', 'DESC']],
    limit: page.limit + 1,
  });
  const names = await nameInputs(rows.map(({ inputs }) => inputs));
  return pageFrom(rows, page, (row): EvaluationItem => {
    const before = rows[rows.indexOf(row) + 1];
    const { user } = row as Evaluation & { user: User };
    const { worstFrequencyHz: frequencyHz, worstMarginDb: marginDb } = row;
    return {
      id: row.publicId,
      at: row.createdAt.toISOString(),
      by: { id: user.publicId, name: user.name },
      engine: row.engine,
      verdict: row.verdict,
      counts: row.counts,
      candidates: row.candidates,
      worst: frequencyHz === null || marginDb === null ? null : { frequencyHz, marginDb },
      reason: row.reason,
      current: row.id === run.evaluationId,
      changes: before ? changesBetween(before, row, names).map(changeText) : [],
      repeats: row.repeatsId !== null,
    };
  });
}

/** `table ANT-02 vertical, table 4: revision 2, before that revision 1`. */
function changeText({ what, now, before }: InputChange): string {
  return `${what}: ${now}, before that ${before}`;
}

async function newerFor(run: Run): Promise<string[]> {
  const context = await contextNow(run);
  const now: Used = { engine: ENGINE, decisionRule: context.judged.rule, inputs: inputsOf(context) };
  const names = await nameInputs([run.evaluation.inputs, now.inputs]);
  return changesBetween(run.evaluation, now, names).map(({ what, now: revision }) =>
    what === 'engine' || what === 'decision rule'
      ? `The ${what} is ${revision} now.`
      : `${what[0]!.toUpperCase()}${what.slice(1)} ${revision} is newer.`,
  );
}
