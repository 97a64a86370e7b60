import type { z } from 'zod';
import { authorise, type Actor } from '@/auth/actor';
import { ENGINE } from '@/emc/evaluate';
import { Conflict, Invalid } from '@/errors';
import { keepUpload, readUpload } from '@/models/blobs';
import { Evaluation } from '@/models/evaluation';
import { EvaluationCandidate } from '@/models/evaluationCandidate';
import { writeLayers } from '@/models/layerStore';
import { ModificationState } from '@/models/modificationState';
import { newPublicId } from '@/models/publicId';
import { Sweep } from '@/models/sweep';
import { SweepFile } from '@/models/sweepFile';
import { evenAxis, writeTraces } from '@/models/traceStore';
import { unitOfWork } from '@/models/unitOfWork';
import type { Upload } from '@/models/upload';
import type { keepSweep as keepSweepBody, SweepView } from '@/schemas/sweep';
import { recordChange } from './audit';
import { nextNumber } from './counters';
import { judgeFile, type Judged } from './judgeFile';
import { dayIn, labSettings } from './lab';
import { findSample, stateLabel } from './samples';
import { findUpload, recognitionOf } from './sweepFiles';
import { readSweep } from './sweeps';

type Body = z.infer<typeof keepSweepBody>;

/**
 * Keeps an uploaded file as a run of a sample state: the original bytes, the traces, the evaluation and its audit
 * entry, in one transaction. `at` is when it is kept; an earlier moment takes the path revision in force then.
 */
export async function keepSweep(actor: Actor | null, body: Body, at = new Date()): Promise<SweepView> {
  authorise(actor, 'sweep.keep');
  return unitOfWork(async () => {
    const state = await findState(actor, body.stateId);
    const upload = await findUpload(body.fileId);
    const judged = await judgeFile(await readUpload(upload.id), recognitionOf(upload), body, at);
    const run = await writeRun(actor, body, { state, upload, judged, at });
    const evaluation = await writeEvaluation(actor, run, judged, at);
    const { zone } = await labSettings();
    const year = dayIn(zone, at).slice(0, 4);
    const number = `R-${year.slice(2)}-${String(await nextNumber(`run-${year}`)).padStart(3, '0')}`;
    await Sweep.update({ number, evaluationId: evaluation.id }, { where: { id: run.id } });
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

async function findState(actor: Actor, publicId: string) {
  const state = await ModificationState.findOne({ where: { publicId }, include: ['sample'] });
  if (!state) throw new Invalid([{ pointer: '/stateId', message: 'is not a modification state of this lab' }]);
  const { sample } = state as ModificationState & { sample: { publicId: string } };
  const { job } = await findSample(actor, sample.publicId);
  if (job.state !== 'open') throw new Conflict(`Job ${job.number} is ${job.state}. Reopen it to keep a run.`);
  if (state.planned) {
    throw new Conflict(`${stateLabel(state.position)} is still planned. Mark it as fitted before measuring it.`);
  }
  return { id: state.id, jobPublicId: job.publicId };
}

interface Keeping {
  state: { id: number };
  upload: Upload;
  judged: Judged;
  at: Date;
}

async function writeRun(actor: Actor, body: Body, { state, upload, judged, at }: Keeping): Promise<Sweep> {
  const { name, bytes, sha256, recognition } = upload;
  const file = await SweepFile.create({
    publicId: newPublicId(),
    name,
    bytes,
    sha256,
    recognition,
    userId: actor.userId,
    createdAt: at,
  });
  await keepUpload(upload.id, file.id);
  const axis = judged.input.traces[0]!.frequencyHz;
  const { purpose, port, line, polarisation, heightM, azimuthDeg, distanceM, operatingMode, valuesHold } = body;
  const { frequencyUnit, centreHz, alreadyCorrected, traces, sweepIndex, measuredAt } = body;
  const publicId = newPublicId();
  const run = await Sweep.create({
    publicId,
    // replaced by its number at the end of the unit, so that the counter is locked as briefly as can be
    number: publicId,
    stateId: state.id,
    sweepFileId: file.id,
    sweepIndex,
    purpose,
    port,
    line,
    polarisation,
    heightM,
    azimuthDeg,
    distanceM,
    operatingMode,
    valuesHold,
    pathRevisionId: judged.path?.revision.id ?? null,
    limitSetId: judged.limitSet.id,
    reading: { frequencyUnit, centreHz, alreadyCorrected, traces, remarks: remarksOn(upload, body) },
    measuredAt: measuredAt === null ? null : new Date(measuredAt),
    points: axis.length,
    firstHz: axis.reduce((low, f) => Math.min(low, f), Infinity),
    lastHz: axis.reduce((high, f) => Math.max(high, f), 0),
    stepHz:
      evenAxis(axis)?.stepHz ??
      (recognitionOf(upload).frequency.evenStep ? recognitionOf(upload).frequency.stepHz : null),
    userId: actor.userId,
    createdAt: at,
  });
  await writeTraces(
    run.id,
    axis,
    judged.input.traces.map(({ index, reading }) => ({ index, levels: reading })),
  );
  return run;
}

/** What recognition remarked, and where a person read the file otherwise than it says. */
function remarksOn(upload: Upload, body: Body): string[] {
  const recognition = recognitionOf(upload);
  const remarks = recognition.remarks.map(({ text, line }) => (line === null ? text : `Line ${line}: ${text}`));
  const { unit } = recognition.frequency;
  if (unit !== null && unit !== body.frequencyUnit) {
    remarks.push(`The file states its frequencies in ${unit}; they were read in ${body.frequencyUnit} by hand.`);
  }
  for (const trace of body.traces) {
    const stated = recognition.traces.find(({ index }) => index === trace.index);
    if (stated?.unit && stated.unit !== trace.unit) {
      remarks.push(`The file states ${stated.unit} for ${trace.name}; it was read as ${trace.unit} by hand.`);
    }
    if (stated?.detector && stated.detector !== trace.detector) {
      remarks.push(
        `The file states a ${stated.detector} detector for ${trace.name}; it was read as ${trace.detector} by hand.`,
      );
    }
  }
  return remarks;
}

async function writeEvaluation(actor: Actor, run: Sweep, judged: Judged, at: Date): Promise<Evaluation> {
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
