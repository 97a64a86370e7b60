import { Op } from 'sequelize';
import { authorise, type Actor } from '@/auth/actor';
import { LAYER_COLUMNS } from '@/emc/columns';
import type { DecisionRule } from '@/emc/kinds';
import type { TraceHead } from '@/emc/segment';
import type { Evaluation } from '@/emc/types';
import { isReceiverInput } from '@/emc/units';
import { Conflict, Invalid, Unreadable, type Issue } from '@/errors';
import type { Answers, Recognition } from '@/ingest/types';
import type { Job } from '@/models/job';
import { LimitSet } from '@/models/limitSet';
import { ModificationState } from '@/models/modificationState';
import { SignalPath } from '@/models/signalPath';
import { SignalPathRevision } from '@/models/signalPathRevision';
import { unitOfWork } from '@/models/unitOfWork';
import type { Upload } from '@/models/upload';
import type { z } from 'zod';
import type { LimitLineView, previewBody, PreviewView, SweepChoice } from '@/schemas/sweep';
import { dueOnDay } from './calibrationState';
import type { JudgedFile, Judging } from './importTasks';
import { judgingOf } from './judging';
import { dayIn, labSettings } from './lab';
import { linesOf } from './limitSets';
import { loadPaths, termsOf, type LoadedPath, type LoadedTerm } from './signalPaths';
import { findUpload, recognitionOf } from './sweepFiles';
import { candidateOf, columnsView, traceViews } from './sweepViews';
import { onUpload } from './uploadTasks';

/** What was judged, without its points. */
export interface Judged extends Gathered {
  input: Judging & { traces: readonly TraceHead[] };
  evaluation: Evaluation;
}

/** Why a term is not added, by term id. */
export function notAppliedBecause(
  choice: Pick<SweepChoice, 'valuesHold' | 'alreadyCorrected'>,
  path: LoadedPath | null,
) {
  if (choice.valuesHold === 'field') {
    const ids = path?.items.map((item) => item.equipment.identifier) ?? [];
    return new Map(ids.map((id) => [id, 'the file holds field strength already']));
  }
  return new Map(
    (choice.alreadyCorrected ?? []).map((id) => [id, 'the reading holds it already, as stated when it was kept']),
  );
}

function check(
  choice: SweepChoice,
  recognition: Recognition,
  limitSet: LimitSet | null,
  path: LoadedPath | null,
): asserts limitSet is LimitSet {
  const issues: Issue[] = [];
  const say = (pointer: string, message: string) => issues.push({ pointer, message });
  if (!limitSet) throw new Invalid([{ pointer: '/limitSetId', message: 'is not a limit set of this lab' }]);
  if (limitSet.port !== choice.port) say('/limitSetId', `is for another port (${limitSet.port})`);
  if (path && path.path.port !== choice.port) say('/pathId', `is for another port (${path.path.port})`);
  if (choice.port === 'enclosure') {
    if (!choice.polarisation) say('/polarisation', 'is needed for a radiated run');
    if (!choice.distanceM) say('/distanceM', 'is needed for a radiated run');
    else if (limitSet.distanceM !== null && limitSet.distanceM !== choice.distanceM) {
      say('/distanceM', `differs from the limit set, which is for ${limitSet.distanceM} m`);
    }
  }
  if (choice.port === 'ac-mains' && !choice.line) say('/line', 'is needed: which conductor was measured');
  const field = choice.valuesHold === 'field';
  choice.traces.forEach((trace, i) => {
    const isField = trace.unit === 'dBuV/m' || trace.unit === 'dBuA/m';
    if (!recognition.traces.some(({ index }) => index === trace.index))
      say(`/traces/${i}/index`, 'is not a trace of this file');
    if (trace.unit === 'dB') say(`/traces/${i}/unit`, 'is relative; a level needs an absolute unit to be judged');
    else if (field && !isField) say(`/traces/${i}/unit`, 'is not field strength, but the values are said to be');
    else if (!field && isField) say(`/traces/${i}/unit`, 'is field strength; say that the values are field strength');
    else if (!field && path && !isReceiverInput(trace.unit)) {
      say(`/traces/${i}/unit`, 'takes no factor; this path would add some');
    }
  });
  const known = new Set(path?.items.map((item) => item.equipment.identifier));
  (choice.alreadyCorrected ?? []).forEach((id, i) => {
    if (!known.has(id)) say(`/alreadyCorrected/${i}`, 'is not an item of this signal path');
  });
  const corrected = recognition.correctedFor.map(({ what, line }) => `${what} (line ${line})`).join(', ');
  if (choice.alreadyCorrected === null && !field && corrected) {
    say('/alreadyCorrected', `is needed: the file says that its values hold ${corrected}`);
  }
  const sweeps = recognition.sweeps.length;
  if (choice.sweepIndex === null && sweeps > 1) say('/sweepIndex', `is needed: the file holds ${sweeps} sweeps`);
  if (choice.keepPartial && !recognition.partial) {
    const why = recognition.refusal ? 'holds nothing before it that could be kept' : 'is whole';
    say('/keepPartial', `is for a file that breaks off; this one ${why}`);
  }
  if (choice.sweepIndex !== null && choice.sweepIndex >= Math.max(1, sweeps)) say('/sweepIndex', 'is not in this file');
  if (new Set(choice.traces.map((trace) => trace.index)).size !== choice.traces.length) {
    say('/traces', 'names a trace twice');
  }
  if (issues.length) throw new Invalid(issues);
}

/** The revision of a path that was in force at a moment. */
async function pathAt(publicId: string | null, at: Date): Promise<LoadedPath | null> {
  if (publicId === null) return null;
  const path = await SignalPath.findOne({ where: { publicId } });
  const revision =
    path &&
    (await SignalPathRevision.findOne({
      where: { signalPathId: path.id, createdAt: { [Op.lte]: at } },
      order: [['revision', 'DESC']],
    }));
  if (!revision) throw new Invalid([{ pointer: '/pathId', message: 'is not a signal path of this lab' }]);
  const day = dayIn((await labSettings()).zone, at);
  const [loaded] = await loadPaths([revision], day);
  for (const { equipment, calibration } of loaded!.items) {
    if (equipment.state !== 'in-use') {
      throw new Conflict(`${equipment.identifier} on this path is ${equipment.state}. Choose another path.`);
    }
    if (dueOnDay(calibration, day) === 'lapsed') {
      const { identifier } = equipment;
      throw new Conflict(`The calibration of ${identifier} lapsed on ${calibration!.dueOn}. Choose another path.`);
    }
  }
  return loaded!;
}

export interface Gathered {
  path: LoadedPath | null;
  terms: LoadedTerm[];
  limitSet: LimitSet;
  lines: LimitLineView[];
}

/** The set, null where the lab has none of that id. Throws Invalid for one withdrawn, naming what stands in its place. */
async function limitSetInUse(publicId: string): Promise<LimitSet | null> {
  const limitSet = await LimitSet.findOne({ where: { publicId } });
  if (!limitSet?.withdrawnAt) return limitSet;
  const { name, port, revision } = limitSet;
  const now = await LimitSet.findOne({ where: { name, port, withdrawnAt: null }, order: [['revision', 'DESC']] });
  const instead = now ? `; revision ${now.revision} of ${name} stands now, choose it` : '; choose another set';
  throw new Invalid([{ pointer: '/limitSetId', message: `was withdrawn (revision ${revision})${instead}` }]);
}

/** What a choice refers to, checked; queries only. `at` decides which revision of the path applies. Throws Invalid. */
export async function gather(recognition: Recognition, choice: SweepChoice, at: Date): Promise<Gathered> {
  const limitSet = await limitSetInUse(choice.limitSetId);
  const path = await pathAt(choice.pathId, at);
  check(choice, recognition, limitSet, path);
  const lines = (await linesOf([limitSet])).get(limitSet.id)!;
  const terms = path ? termsOf(path, choice, notAppliedBecause(choice, path)) : [];
  return { path, terms, limitSet, lines };
}

/**
 * Reads a held file as chosen, rounds its levels to Float32 once and evaluates them against the limit set.
 * Throws Unreadable with the line of the file, Invalid where the frequencies cannot be an axis.
 * @param store whether the points are wanted in the rows they are stored in
 */
export async function judge(
  actor: Actor,
  upload: Upload,
  choice: SweepChoice,
  gathered: Gathered,
  { store, rule }: { store: boolean; rule: DecisionRule },
): Promise<Judged & JudgedFile> {
  const { path, terms, lines } = gathered;
  const recognition = recognitionOf(upload);
  if (recognition.refusal && !choice.keepPartial) {
    const { message, line, found, expected } = recognition.refusal;
    throw new Unreadable(message, line, found, expected);
  }
  const { frequencyUnit, centreHz, sweepIndex } = choice;
  const answers: Answers = {
    frequencyUnit,
    sweepIndex: sweepIndex ?? 0,
    partial: choice.keepPartial,
    ...(centreHz !== null && { centreHz }),
    traces: recognition.traces.map(({ index }) => {
      const chosen = choice.traces.find((trace) => trace.index === index);
      return chosen ? { index, use: true, unit: chosen.unit, detector: chosen.detector } : { index, use: false };
    }),
  };
  const { purpose, port, keepPartial: partial } = choice;
  const judging = judgingOf({ revision: path?.revision ?? null, terms, lines, purpose, port, rule, partial });
  const { traces } = choice;
  const task = { kind: 'judge' as const, recognition, answers, traces, judging, store };
  const result = await onUpload(actor, upload, task);
  if ('unreadable' in result) {
    const { message, line, found, expected } = result.unreadable;
    throw new Unreadable(message, line, found, expected);
  }
  if ('noFrequency' in result) {
    const pointer = centreHz === null ? '/frequencyUnit' : '/centreHz';
    throw new Invalid([{ pointer, message: 'leaves no frequency above 0 Hz' }]);
  }
  return { ...gathered, ...result, input: { ...judging, traces: result.heads } };
}

/** The rule of the job that a state belongs to. Throws Invalid for a state the lab does not have. */
async function ruleOfState(publicId: string): Promise<DecisionRule> {
  const sample = { association: 'sample', include: ['job'] };
  const state = await ModificationState.findOne({ where: { publicId }, include: [sample] });
  if (!state) throw new Invalid([{ pointer: '/stateId', message: 'is not a modification state of this lab' }]);
  return (state as ModificationState & { sample: { job: Job } }).sample.job.decisionRule;
}

/** A held file judged as it would be kept now; nothing is stored. */
export async function previewSweepFile(
  actor: Actor | null,
  fileId: string,
  { stateId, ...choice }: z.infer<typeof previewBody>,
): Promise<PreviewView> {
  authorise(actor, 'sweep-file.read');
  const { upload, rule, gathered } = await unitOfWork(async () => {
    const upload = await findUpload(fileId);
    const rule = stateId === null ? 'guarded-by-u' : await ruleOfState(stateId);
    return { upload, rule, gathered: await gather(recognitionOf(upload), choice, new Date()) };
  });
  // Nothing of the database is held while the file is read and judged.
  const { evaluation, input, lines, axis } = await judge(actor, upload, choice, gathered, { store: false, rule });
  const { firstHz, lastHz } = axis;
  const worst = evaluation.candidates[0];
  return {
    window: {
      fromHz: firstHz,
      toHz: lastHz,
      columns: LAYER_COLUMNS,
      traces: input.traces.map((trace, i) => columnsView(trace.index, evaluation.layers[i]!)),
    },
    traces: traceViews(input.traces, { firstHz, lastHz }, input),
    lines,
    uncertainty: [...input.uncertainty[input.purpose === 'final' ? 'final' : 'prescan']],
    decisionRule: rule,
    verdict: evaluation.verdict,
    counts: evaluation.counts,
    worst: worst ? candidateOf(worst, input.traces) : null,
    gaps: evaluation.gaps,
  };
}
