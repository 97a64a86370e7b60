import { Op } from 'sequelize';
import type { z } from 'zod';
import { authorise, visibleOrganisation, type Actor } from '@/auth/actor';
import { Invalid, NotFound } from '@/errors';
import { readSweepFile } from '@/models/blobs';
import { Evaluation } from '@/models/evaluation';
import { EvaluationCandidate } from '@/models/evaluationCandidate';
import { ModificationState } from '@/models/modificationState';
import { Sweep } from '@/models/sweep';
import { unitOfWork } from '@/models/unitOfWork';
import type { SetupBrief } from '@/schemas/setup';
import type { CandidateView, sweepListItem, SweepView } from '@/schemas/sweep';
import { olderThan, pageFrom, type PageRequest } from './paging';
import { portVerdictOf } from './portVerdict';
import { contextOf, findRun, runInclude, type Run, type RunContext } from './runs';
import { findSample, stateLabel } from './samples';
import { setupBriefs } from './setupBriefs';
import { itemView } from './signalPaths';
import { candidateOf, traceViews } from './sweepViews';

function itemOf(row: Sweep, setup: SetupBrief): z.infer<typeof sweepListItem> {
  const { state, user, evaluation } = row as Run;
  const { job } = state.sample;
  const { worstFrequencyHz, worstMarginDb } = evaluation;
  return {
    id: row.publicId,
    number: row.number,
    jobNumber: job.number,
    product: job.product.code,
    state: stateLabel(state.position),
    port: row.port,
    purpose: row.purpose,
    line: row.line,
    polarisation: row.polarisation,
    keptAt: row.createdAt.toISOString(),
    by: user.name,
    organisation: { id: job.organisation.publicId, name: job.organisation.name },
    sample: { id: state.sample.publicId, code: state.sample.code },
    verdict: evaluation.verdict,
    trial: row.trial,
    partial: row.partial !== null,
    voided: row.voidedAt !== null,
    strayed: setup.eutStayed === 'no' ? setup.whatHappened : null,
    worst:
      worstFrequencyHz === null || worstMarginDb === null
        ? null
        : { frequencyHz: worstFrequencyHz, marginDb: worstMarginDb },
    points: row.points,
  };
}

export async function listSweeps(actor: Actor | null, page: PageRequest & { sampleId?: string; stateId?: string }) {
  authorise(actor, 'sweep.list');
  return unitOfWork(async () => {
    const where: Record<string, unknown> = { ...olderThan(page), evaluationId: { [Op.not]: null } };
    if (page.sampleId) {
      const sample = await findSample(actor, page.sampleId);
      const states = await ModificationState.findAll({ where: { sampleId: sample.id }, attributes: ['id'] });
      where.stateId = states.map((state) => state.id);
    }
    if (page.stateId) {
      const state = await ModificationState.findOne({ where: { publicId: page.stateId } });
      where.stateId = state?.id ?? 0;
    }
    const rows = await Sweep.findAll({
      where,
      include: runInclude(visibleOrganisation(actor)),
      order: [['id', 'DESC']],
      limit: page.limit + 1,
      subQuery: false,
    });
    const setups = await setupBriefs(rows);
    return pageFrom(rows, page, (row) => itemOf(row, setups.get(row.id)!));
  });
}

export async function readSweep(actor: Actor | null, publicId: string): Promise<SweepView> {
  authorise(actor, 'sweep.read');
  return unitOfWork(async () => {
    const run = await findRun(actor, publicId);
    return view(run, await contextOf(run));
  });
}

async function view(run: Run, context: RunContext): Promise<SweepView> {
  const { state, evaluation, file, limitSet, user } = run;
  const { sample } = state;
  const { job } = sample;
  const { path, day, lines, judged } = context;
  const worst = await EvaluationCandidate.findOne({ where: { evaluationId: evaluation.id, rank: 1 } });
  return {
    id: run.publicId,
    version: run.version,
    number: run.number,
    purpose: run.purpose,
    port: run.port,
    line: run.line,
    polarisation: run.polarisation,
    heightM: run.heightM,
    heightSwept: run.heightSwept,
    azimuthDeg: run.azimuthDeg,
    distanceM: run.distanceM,
    operatingMode: run.operatingMode,
    trial: run.trial,
    partial: run.partial,
    voided: run.voidedAt && {
      at: run.voidedAt.toISOString(),
      by: { id: run.voider!.publicId, name: run.voider!.name },
      reason: run.voidReason!,
    },
    keptAt: run.createdAt.toISOString(),
    measuredAt: run.measuredAt?.toISOString() ?? null,
    by: { id: user.publicId, name: user.name },
    organisation: { id: job.organisation.publicId, name: job.organisation.name },
    job: { id: job.publicId, number: job.number, title: job.title },
    sample: {
      id: sample.publicId,
      product: `${job.product.name} ${job.product.code}`,
      code: sample.code,
      serial: sample.serial,
    },
    state: { id: state.publicId, label: stateLabel(state.position), description: state.description },
    path: path && {
      id: path.path.publicId,
      code: path.path.code,
      name: path.path.name,
      revision: path.revision.revision,
      items: path.items.map((item) => itemView(item, day)),
    },
    limitSet: { id: limitSet.publicId, name: limitSet.name, lines },
    file: { id: file.publicId, name: file.name, bytes: file.bytes, sha256: file.sha256 },
    valuesHold: run.valuesHold,
    points: run.points,
    firstHz: run.firstHz,
    lastHz: run.lastHz,
    stepHz: run.stepHz,
    remarks: run.reading.remarks,
    traces: traceViews(run.reading.traces, run, judged),
    evaluation: {
      id: evaluation.publicId,
      engine: evaluation.engine,
      at: evaluation.createdAt.toISOString(),
      verdict: evaluation.verdict,
      counts: evaluation.counts,
      worst: worst && candidateView(worst, run),
      gaps: evaluation.gaps,
      uncertainty: [...judged.uncertainty[run.purpose === 'final' ? 'final' : 'prescan']],
      decisionRule: evaluation.decisionRule,
    },
    setup: (await setupBriefs([run])).get(run.id)!,
    portVerdict: await portVerdictOf(run),
  };
}

function candidateView(row: EvaluationCandidate, run: Run): CandidateView {
  const { evaluationId: _, ...candidate } = row.get({ plain: true });
  return candidateOf(candidate, run.reading.traces);
}

/** Candidates worst first; the cursor is the rank of the last one shown. */
export async function listCandidates(
  actor: Actor | null,
  publicId: string,
  page: PageRequest & { evaluation?: string },
) {
  authorise(actor, 'sweep.read');
  return unitOfWork(async () => {
    const run = await findRun(actor, publicId);
    const evaluation = page.evaluation
      ? await Evaluation.findOne({ where: { publicId: page.evaluation, sweepId: run.id } })
      : run.evaluation;
    if (!evaluation) throw new NotFound('evaluation of this run');
    const from = page.after === undefined ? 0 : Number(page.after);
    if (!Number.isSafeInteger(from) || from < 0) {
      throw new Invalid([{ pointer: '/query/after', message: 'is not a cursor of this list' }]);
    }
    const rows = await EvaluationCandidate.findAll({
      where: { evaluationId: evaluation.id, rank: { [Op.gt]: from } },
      order: [['rank', 'ASC']],
      limit: page.limit + 1,
    });
    const shown = rows.slice(0, page.limit);
    return {
      total: evaluation.candidates,
      items: shown.map((row) => candidateView(row, run)),
      next: rows.length > page.limit ? String(shown.at(-1)!.rank) : null,
    };
  });
}

/** The original file, byte for byte. */
export async function downloadSweepFile(
  actor: Actor | null,
  publicId: string,
): Promise<{ name: string; bytes: Buffer }> {
  authorise(actor, 'sweep.read');
  return unitOfWork(async () => {
    const { file } = await findRun(actor, publicId);
    return { name: file.name, bytes: await readSweepFile(file.id) };
  });
}
