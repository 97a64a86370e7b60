import type { IncludeOptions } from 'sequelize';
import { visibleOrganisation, type Actor } from '@/auth/actor';
import type { DecisionRule } from '@/emc/kinds';
import type { TraceHead } from '@/emc/segment';
import { NotFound } from '@/errors';
import type { Evaluation } from '@/models/evaluation';
import type { Job } from '@/models/job';
import type { LimitSet } from '@/models/limitSet';
import type { ModificationState } from '@/models/modificationState';
import type { Organisation } from '@/models/organisation';
import type { Product } from '@/models/product';
import type { Sample } from '@/models/sample';
import { SignalPathRevision } from '@/models/signalPathRevision';
import { Sweep } from '@/models/sweep';
import type { SweepFile } from '@/models/sweepFile';
import type { User } from '@/models/user';
import type { LimitLineView } from '@/schemas/sweep';
import { notAppliedBecause } from './judgeFile';
import type { Judging } from './importTasks';
import { judgingOf } from './judging';
import { dayIn, labSettings } from './lab';
import { linesOf } from './limitSets';
import { loadPaths, termsOf, type LoadedPath, type LoadedTerm } from './signalPaths';

export type WholeState = ModificationState & {
  sample: Sample & { job: Job & { organisation: Organisation; product: Product } };
};
export type Run = Sweep & {
  state: WholeState;
  user: User;
  voider: User | null;
  evaluation: Evaluation;
  limitSet: LimitSet;
  file: SweepFile;
};

/** Joins a run to what names it; never to a table of blobs. `own` limits to one organisation. */
export function runInclude(own: number | null): IncludeOptions[] {
  const job = {
    association: 'job',
    required: true,
    include: ['organisation', 'product'],
    ...(own !== null && { where: { organisationId: own } }),
  };
  const sample = { association: 'sample', required: true, include: [job] };
  return [
    { association: 'state', required: true, include: [sample] },
    { association: 'user' },
    { association: 'voider' },
    { association: 'evaluation' },
  ];
}

/** A run the actor may see, or NotFound. */
export async function findRun(actor: Actor, publicId: string): Promise<Run> {
  const include = [...runInclude(visibleOrganisation(actor)), { association: 'limitSet' }, { association: 'file' }];
  const row = await Sweep.findOne({ where: { publicId }, include });
  if (!row) throw new NotFound('run');
  return row as Run;
}

export interface RunContext {
  path: LoadedPath | null;
  /** The day in the lab's zone on which the run was measured, or kept when that is not known. */
  day: string;
  terms: LoadedTerm[];
  lines: LimitLineView[];
  heads: TraceHead[];
  /** All the core needs apart from the points. */
  judged: Judging;
}

/** What a run is judged with: the revisions and the rule its current evaluation used. */
export async function contextOf(run: Run): Promise<RunContext> {
  const revision = run.pathRevisionId === null ? null : await SignalPathRevision.findByPk(run.pathRevisionId);
  return contextWith(run, revision, run.limitSet, run.evaluation.decisionRule);
}

/** The same with any revision of its path, any limit set and any rule. Throws Invalid where the path cannot serve this run. */
export async function contextWith(
  run: Run,
  revision: SignalPathRevision | null,
  limitSet: LimitSet,
  rule: DecisionRule,
): Promise<RunContext> {
  const day = dayIn((await labSettings()).zone, run.measuredAt ?? run.createdAt);
  const path = revision ? (await loadPaths([revision], day))[0]! : null;
  const lines = (await linesOf([limitSet])).get(limitSet.id)!;
  const { valuesHold, purpose, port, polarisation, distanceM, reading } = run;
  const { alreadyCorrected, traces, vbwHz = null, rbwShape = null } = reading;
  const setup = { polarisation, distanceM };
  const terms = path ? termsOf(path, setup, notAppliedBecause({ valuesHold, alreadyCorrected }, path)) : [];
  return {
    path,
    day,
    terms,
    lines,
    heads: traces.map((trace) => ({ ...trace, vbwHz, rbwShape })),
    judged: judgingOf({ revision, terms, lines, purpose, port, rule, partial: run.partial !== null }),
  };
}
