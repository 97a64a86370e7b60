import { Op } from 'sequelize';
import type { Actor } from '@/auth/actor';
import { env } from '@/config/env';
import { VERDICTS } from '@/emc/kinds';
import { Conflict, NotFound } from '@/errors';
import type { Evaluation } from '@/models/evaluation';
import { EvaluationCandidate } from '@/models/evaluationCandidate';
import type { LimitSet } from '@/models/limitSet';
import { ModificationState } from '@/models/modificationState';
import { Sweep } from '@/models/sweep';
import { currentTransaction } from '@/models/unitOfWork';
import type { PortResult, StateResult } from '@/schemas/resultMail';
import { labSettings } from './lab';
import { linesOf } from './limitSets';
import { portVerdictOf } from './portVerdict';
import type { WholeState } from './runs';
import { stateLabel } from './samples';

type Run = Sweep & { evaluation: Evaluation; limitSet: LimitSet };
type Verdict = PortResult['verdict'];

/** A state with its sample, job, product and client. The lab's people see every one. @throws {NotFound} */
export async function findState(publicId: string): Promise<WholeState> {
  const job = { association: 'job', include: ['organisation', 'product'] };
  const sample = { association: 'sample', include: [job] };
  const row = await ModificationState.findOne({ where: { publicId }, include: [sample] });
  if (!row) throw new NotFound('modification state');
  return row as WholeState;
}

/**
 * How a state stands now, for its result e-mail: every port's verdict with the emission that governs it. Trials and
 * voided runs do not speak, ambient runs are without the sample. The state is held, so that no run joins it meanwhile.
 * @throws {Conflict} when nothing speaks for the state
 */
export async function stateResult(actor: Actor, state: WholeState, note: string) {
  await ModificationState.findByPk(state.id, { lock: currentTransaction().LOCK.UPDATE });
  const all = (await Sweep.findAll({
    where: { stateId: state.id, evaluationId: { [Op.not]: null } },
    include: ['evaluation', 'limitSet'],
    order: [['id', 'ASC']],
  })) as Run[];
  const speaking = all.filter(({ purpose, trial, voidedAt }) => purpose !== 'ambient' && !trial && !voidedAt);
  const label = stateLabel(state.position);
  if (speaking.length === 0) {
    throw new Conflict(`Nothing speaks for ${label} yet: upload its runs first, then send the result.`);
  }
  const ports: PortResult[] = [];
  for (const port of new Set(speaking.map((run) => run.port))) {
    ports.push(await portResult(speaking.filter((run) => run.port === port)));
  }
  const { sample } = state;
  const { job } = sample;
  const { name: lab } = await labSettings();
  const result: StateResult = {
    lab,
    sender: actor.name,
    product: { code: job.product.code, name: job.product.name },
    sample: { code: sample.code, serial: sample.serial },
    state: { label, description: state.description },
    job: { number: job.number, title: job.title },
    ports: ports.sort(worstFirst),
    leftOut: {
      trials: all.filter(({ trial, voidedAt }) => trial && !voidedAt).length,
      voided: all.filter(({ voidedAt }) => voidedAt).length,
    },
    partial: speaking.flatMap((run) => (run.partial ? [{ run: run.number, readToHz: run.partial.readToHz }] : [])),
    note,
    link: `${env().APP_ORIGIN}/samples/${sample.publicId}#${label}`,
  };
  return { result, evaluationIds: speaking.map((run) => run.evaluation.publicId) };
}

/** The vocabulary lists verdicts worst first; within one the smaller margin. */
function worstFirst(a: PortResult, b: PortResult): number {
  const verdicts = VERDICTS.indexOf(a.verdict) - VERDICTS.indexOf(b.verdict);
  return verdicts || (a.worst?.marginDb ?? Infinity) - (b.worst?.marginDb ?? Infinity);
}

async function portResult(runs: Run[]): Promise<PortResult> {
  const { port, stateId } = runs[0]!;
  const { verdict, missing } = await portVerdictOf({ port, stateId });
  const sets = [...new Map(runs.map(({ limitSet }) => [limitSet.id, limitSet])).values()];
  const lines = await linesOf(sets);
  return {
    port,
    verdict,
    missing,
    worst: await governing(runs, verdict, new Map([...lines.values()].flat().map((line) => [line.id, line.name]))),
    limitSets: sets.map(({ id, name, revision }) => ({
      name,
      revision,
      lines: lines.get(id)!.map((line) => ({ name: line.name, revision: line.revision })),
    })),
    runs: runs.map((run) => run.number),
  };
}

/** Runs that can have brought a port to its verdict; where it is not covered, whatever was measured comes closest. */
const BROUGHT_BY: Record<Verdict, readonly Verdict[]> = {
  over: ['over'],
  'needs-final': ['needs-final'],
  inconclusive: ['inconclusive'],
  'not-covered': VERDICTS,
  under: ['under', 'not-covered'],
};

async function governing(runs: Run[], verdict: Verdict, lineNames: Map<string, string>): Promise<PortResult['worst']> {
  const margin = ({ evaluation }: Run) => evaluation.worstMarginDb ?? Infinity;
  const [run] = runs
    .filter(({ evaluation }) => BROUGHT_BY[verdict].includes(evaluation.verdict) && evaluation.worstMarginDb !== null)
    .sort((a, b) => margin(a) - margin(b));
  if (!run) return null;
  const worst = await EvaluationCandidate.findOne({ where: { evaluationId: run.evaluation.id, rank: 1 } });
  if (!worst) return null;
  const { kind, frequencyHz, fromHz, toHz, marginDb, uncertaintyDb, lineId } = worst;
  const lineName = lineNames.get(lineId) ?? 'its limit line';
  return { kind, frequencyHz, fromHz, toHz, marginDb, uncertaintyDb, lineName, run: run.number };
}
