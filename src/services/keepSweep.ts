import type { z } from 'zod';
import { authorise, type Actor } from '@/auth/actor';
import { Conflict, Invalid, NotFound } from '@/errors';
import { keepUpload, readUpload } from '@/models/blobs';
import { ModificationState } from '@/models/modificationState';
import { newPublicId } from '@/models/publicId';
import type { StoredPartial } from '@/models/stored';
import { Sweep } from '@/models/sweep';
import { SweepFile } from '@/models/sweepFile';
import { SweepFilePart } from '@/models/sweepFilePart';
import { writeTraces } from '@/models/traceStore';
import { currentTransaction, unitOfWork } from '@/models/unitOfWork';
import type { Upload } from '@/models/upload';
import type { keepSweep as keepSweepBody, SweepView } from '@/schemas/sweep';
import { recordChange } from './audit';
import { nextNumber } from './counters';
import { writeEvaluation } from './evaluations';
import { rememberShape } from './fileShapes';
import { gather, judge, rangeOf, type Judged } from './judgeFile';
import { dayIn, labSettings } from './lab';
import { findSample, lockOpenJob, stateLabel } from './samples';
import { settleRetests } from './settleRetests';
import { findUpload, recognitionOf } from './sweepFiles';
import { readSweep } from './sweeps';

type Body = z.infer<typeof keepSweepBody>;

/** A bench PC's clock may run a little ahead. */
const CLOCK_SLACK_MS = 5 * 60_000;

/**
 * Keeps an uploaded file as a run of a sample state: the original bytes, the traces, the evaluation and its audit
 * entry, in one transaction. The path's revision and its calibrations are those in force when it was measured; without
 * that moment, when it is kept (`at`).
 */
export async function keepSweep(actor: Actor | null, body: Body, at = new Date()): Promise<SweepView> {
  authorise(actor, 'sweep.keep');
  return unitOfWork(async () => {
    const state = await findState(actor, body.stateId);
    refusePlanned(state.row);
    // Locked, so that housekeeping cannot take the file away between reading and copying it.
    const upload = await findUpload(body.fileId, { lock: true });
    const recognition = recognitionOf(upload);
    const measuredAt = body.measuredAt === null ? at : new Date(body.measuredAt);
    if (measuredAt.getTime() > at.getTime() + CLOCK_SLACK_MS) {
      throw new Invalid([{ pointer: '/measuredAt', message: 'lies in the future' }]);
    }
    const gathered = await gather(recognition, body, measuredAt);
    const judged = await judge(await readUpload(upload.id), recognition, body, gathered);
    // Judging takes a while; what was looked at before it is decided under its locks.
    await lockOpenJob(state.jobId);
    refusePlanned(await state.row.reload({ lock: currentTransaction().LOCK.UPDATE, include: [] }));
    const run = await writeRun(actor, body, { state: state.row, upload, judged, at });
    const evaluation = await writeEvaluation(actor, run, judged, at);
    const { zone } = await labSettings();
    const year = dayIn(zone, at).slice(0, 4);
    const number = `R-${year.slice(2)}-${String(await nextNumber(`run-${year}`)).padStart(3, '0')}`;
    await Sweep.update({ number, evaluationId: evaluation.id }, { where: { id: run.id } });
    await rememberShape(actor, upload, run, body, at);
    await settleRetests(actor, { stateId: state.row.id, port: body.port, because: `run ${number} kept`, at });
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
  if (job.state !== 'open') throw new Conflict(`Job ${job.number} is ${job.state}. Reopen it first.`);
  return { row: state, jobId: job.id, jobPublicId: job.publicId };
}

function refusePlanned({ planned, position }: ModificationState): void {
  if (planned) throw new Conflict(`${stateLabel(position)} is still planned. Mark it as fitted before measuring it.`);
}

interface Keeping {
  state: ModificationState;
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
  if ((await SweepFilePart.count({ where: { sweepFileId: file.id } })) === 0) throw new NotFound('uploaded file');
  const axis = judged.input.traces[0]!.frequencyHz;
  const { purpose, port, line, polarisation, heightM, heightSwept, azimuthDeg, distanceM } = body;
  const { operatingMode, valuesHold, trial } = body;
  const { frequencyUnit, centreHz, traces, sweepIndex, measuredAt } = body;
  const { vbwHz = null, rbwShape = null } = judged.input.traces[0]!;
  const alreadyCorrected = body.alreadyCorrected ?? [];
  const remarks = remarksOn(upload, body);
  const publicId = newPublicId();
  const run = await Sweep.create({
    publicId,
    // replaced by its number at the end of the unit, so that the counter is locked as briefly as can be
    number: publicId,
    stateId: state.id,
    sweepFileId: file.id,
    sweepIndex: sweepIndex ?? 0,
    purpose,
    port,
    line,
    polarisation,
    heightM,
    heightSwept,
    azimuthDeg,
    distanceM,
    operatingMode,
    trial,
    partial: body.keepPartial ? partialOf(upload, axis) : null,
    valuesHold,
    pathRevisionId: judged.path?.revision.id ?? null,
    limitSetId: judged.limitSet.id,
    reading: { frequencyUnit, centreHz, alreadyCorrected, traces, remarks, vbwHz, rbwShape },
    measuredAt: measuredAt === null ? null : new Date(measuredAt),
    points: axis.length,
    ...rangeOf(axis),
    stepHz: stepOf(axis),
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

/** Where the file was cut, as its refusal said it. */
function partialOf(upload: Upload, axis: Float64Array): StoredPartial {
  const { refusal, partial } = recognitionOf(upload);
  const message = refusal!.message.replace(/ Export [^.]*\.$/, '');
  return { line: partial!.line, message, readToHz: axis.at(-1)! };
}

/** The distance between neighbours when all are equal to a millionth of it, else null. */
function stepOf(frequencyHz: Float64Array): number | null {
  const steps = frequencyHz.length - 1;
  if (steps < 1) return null;
  const step = (frequencyHz[steps]! - frequencyHz[0]!) / steps;
  for (let i = 0; i < steps; i++) {
    if (Math.abs(frequencyHz[i + 1]! - frequencyHz[i]! - step) > Math.abs(step) * 1e-6) return null;
  }
  return step;
}

/** What recognition remarked, and where a person read the file otherwise than it says. */
function remarksOn(upload: Upload, body: Body): string[] {
  const recognition = recognitionOf(upload);
  const remarks = recognition.remarks.map(({ text, line }) => (line === null ? text : `Line ${line}: ${text}`));
  if (body.valuesHold === 'receiver-input' && !body.alreadyCorrected?.length) {
    for (const { what, line } of recognition.correctedFor) {
      remarks.push(`Line ${line} says that the values hold ${what}; nothing was left out for it, by hand.`);
    }
  }
  const { unit } = recognition.frequency;
  if (unit !== null && unit !== body.frequencyUnit) {
    remarks.push(`The file states its frequencies in ${unit}; they were read in ${body.frequencyUnit} by hand.`);
  }
  for (const trace of body.traces) {
    const stated = recognition.traces.find(({ index }) => index === trace.index);
    if (stated?.unit && stated.unit !== trace.unit) {
      remarks.push(`The file states ${stated.unit} for ${trace.name}; it was read as ${trace.unit} by hand.`);
    }
    const { rbwHz } = recognition.settings;
    if (rbwHz !== null && trace.rbwHz !== rbwHz) {
      remarks.push(
        `The file states an RBW of ${rbwHz} Hz; ${trace.name} was said to have ${trace.rbwHz ?? 'an unknown one'}.`,
      );
    }
    if (stated?.detector && stated.detector !== trace.detector) {
      remarks.push(
        `The file states a ${stated.detector} detector for ${trace.name}; it was read as ${trace.detector} by hand.`,
      );
    }
  }
  return remarks;
}
