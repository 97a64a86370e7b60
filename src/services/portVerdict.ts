import { Op } from 'sequelize';
import { authorise, visibleOrganisation, type Actor } from '@/auth/actor';
import type { Port, Verdict } from '@/emc/kinds';
import { portVerdict, type PortVerdict } from '@/emc/port';
import { severity } from '@/emc/verdict';
import type { Evaluation } from '@/models/evaluation';
import type { Job } from '@/models/job';
import { LimitSet } from '@/models/limitSet';
import type { ModificationState } from '@/models/modificationState';
import type { Sample } from '@/models/sample';
import { Sweep } from '@/models/sweep';
import { unitOfWork } from '@/models/unitOfWork';
import type { LimitLineView, SweepView } from '@/schemas/sweep';
import { linesOf } from './limitSets';
import { stateLabel } from './samples';
import { setupBriefs } from './setupBriefs';

type Judged = Sweep & { evaluation: Evaluation };

/** What can speak for a state: evaluated, not voided, no trial. */
const SPEAKING = { evaluationId: { [Op.not]: null }, trial: null, voidedAt: null };

/** The verdict of a run's port over every run of the same sample state. The caller has shown that it may see the run. */
export async function portVerdictOf(run: Pick<Sweep, 'stateId' | 'port'>): Promise<SweepView['portVerdict']> {
  const { stateId, port } = run;
  const rows = (await Sweep.findAll({
    where: { stateId, port, ...SPEAKING },
    include: ['evaluation'],
    order: [['id', 'ASC']],
  })) as Judged[];
  const judged = judge(port, rows, await linesFor(rows));
  const setups = await setupBriefs(rows);
  return {
    ...judged,
    runs: rows.map((row) => ({ id: row.publicId, number: row.number, setup: setups.get(row.id)! })),
  };
}

async function linesFor(rows: readonly Judged[]): Promise<Map<number, LimitLineView[]>> {
  return linesOf(await LimitSet.findAll({ where: { id: [...new Set(rows.map((row) => row.limitSetId))] } }));
}

function judge(port: Port, rows: readonly Judged[], lines: ReadonlyMap<number, LimitLineView[]>): PortVerdict {
  const named = nameLines(rows.flatMap((row) => lines.get(row.limitSetId)!));
  return portVerdict(
    port,
    rows.map((row) => ({
      purpose: row.purpose,
      polarisation: row.polarisation,
      line: row.line,
      heightM: row.heightM,
      heightSwept: row.heightSwept,
      verdict: row.evaluation.verdict,
      gaps: row.evaluation.gaps,
      partial: row.partial !== null,
      lines: lines.get(row.limitSetId)!.map(({ id }) => ({ id, name: named.get(id)! })),
    })),
  );
}

/** Two revisions of a line are two lines: a position judged by one is not compared with the other, and says which. */
function nameLines(lines: readonly LimitLineView[]): Map<string, string> {
  const several = ({ id, name }: LimitLineView) => lines.some((other) => other.name === name && other.id !== id);
  return new Map(lines.map((line) => [line.id, several(line) ? `${line.name}, revision ${line.revision}` : line.name]));
}

/** How one port stands in the newest state in which it was measured, and the worst of its runs there. */
export interface PortStanding {
  port: Port;
  state: string;
  verdict: Verdict;
  worst: { frequencyHz: number; marginDb: number } | null;
}

type Placed = Judged & { state: ModificationState & { sample: Sample & { job: Job } } };

/**
 * The ports of every sample of some jobs (public ids), by job, in a fixed number of queries. Of the jobs asked, those of
 * another organisation and those without a run that counts are not in the answer.
 */
export async function standingsOfJobs(
  actor: Actor | null,
  jobIds: readonly string[],
): Promise<Map<string, PortStanding[]>> {
  authorise(actor, 'sweep.list');
  const own = visibleOrganisation(actor);
  const job = {
    association: 'job',
    required: true,
    where: { publicId: [...jobIds], ...(own !== null && { organisationId: own }) },
  };
  return unitOfWork(async () => {
    const rows = (await Sweep.findAll({
      where: { ...SPEAKING, purpose: { [Op.ne]: 'ambient' } },
      include: [
        { association: 'state', required: true, include: [{ association: 'sample', required: true, include: [job] }] },
        {
          association: 'evaluation',
          attributes: ['id', 'verdict', 'gaps', 'worstFrequencyHz', 'worstMarginDb'],
        },
      ],
      order: [['id', 'ASC']],
    })) as Placed[];
    const lines = await linesFor(rows);
    const standings = new Map<string, PortStanding[]>();
    for (const group of newestOfEachPort(rows)) {
      const { state, port } = group[0]!;
      const { publicId } = state.sample.job;
      const standing = { port, state: stateLabel(state.position), worst: worstOf(group) };
      const known = standings.get(publicId) ?? [];
      standings.set(publicId, [...known, { ...standing, verdict: judge(port, group, lines).verdict }]);
    }
    return standings;
  });
}

/** The runs of each sample's port in the newest state in which it was measured. */
function newestOfEachPort(rows: readonly Placed[]): Placed[][] {
  const groups = new Map<string, Placed[]>();
  for (const row of rows) {
    const key = `${row.state.sampleId} ${row.port}`;
    const known = groups.get(key);
    const newer = !known || row.state.position > known[0]!.state.position;
    if (newer) groups.set(key, [row]);
    else if (row.stateId === known[0]!.stateId) known.push(row);
  }
  return [...groups.values()];
}

/** Worst by verdict, then by margin, as the lists are sorted. */
function worstOf(rows: readonly Placed[]): PortStanding['worst'] {
  const [worst] = [...rows].sort(
    ({ evaluation: one }, { evaluation: other }) =>
      severity(one.verdict) - severity(other.verdict) ||
      (one.worstMarginDb ?? Infinity) - (other.worstMarginDb ?? Infinity),
  );
  const { worstFrequencyHz: frequencyHz, worstMarginDb: marginDb } = worst!.evaluation;
  return frequencyHz === null || marginDb === null ? null : { frequencyHz, marginDb };
}
