import { Op } from 'sequelize';
import { askedRanges } from '@/emc/coverage';
import type { Port } from '@/emc/kinds';
import type { Reading, RetestRun } from '@/emc/retests';
import type { Evaluation } from '@/models/evaluation';
import { EvaluationCandidate } from '@/models/evaluationCandidate';
import { LimitLineRevision } from '@/models/limitLineRevision';
import { Sweep } from '@/models/sweep';
import { readPieces } from '@/models/traceStore';
import { lineView, toCoreLine } from './limitSets';
import { ROWS_AT_A_TIME } from './retestRows';

/** A candidate with all that a retest shows of it. */
export interface LoadedReading extends Reading {
  level: number;
  limit: number;
  uncertaintyDb: number;
  because: string | null;
  run: Sweep;
  line: LimitLineRevision;
}
export type LoadedRun = RetestRun<LoadedReading> & { row: Sweep };

/** A final of more points than this is a sweep; what it covers is known without its axis. */
const SPOTS_AT_MOST = 5000;

/** The runs that speak for a state and port (no trial, not voided, not ambient) as their newest evaluations say. */
export async function speakingRuns(stateIds: readonly number[], port: Port): Promise<LoadedRun[]> {
  const where = { stateId: [...stateIds], port, evaluationId: { [Op.not]: null }, trial: null, voidedAt: null };
  const rows = (await Sweep.findAll({
    where: { ...where, purpose: { [Op.ne]: 'ambient' } },
    include: ['evaluation'],
    order: [['id', 'ASC']],
  })) as (Sweep & { evaluation: Evaluation })[];
  const lineIds = [...new Set(rows.flatMap(({ evaluation }) => evaluation.inputs.limitLines))];
  const revisions = await LimitLineRevision.findAll({ where: { publicId: lineIds } });
  const lines = new Map(revisions.map((line) => [line.publicId, line]));
  const runs: LoadedRun[] = [];
  for (const row of rows) runs.push(await speaking(row, lines, await candidatesOf(row.evaluation.id)));
  return runs;
}

/** As many at a time as to keep nobody waiting while they are read. */
async function candidatesOf(evaluationId: number): Promise<EvaluationCandidate[]> {
  const candidates: EvaluationCandidate[] = [];
  for (;;) {
    const some = await EvaluationCandidate.findAll({
      where: { evaluationId, rank: { [Op.gt]: candidates.at(-1)?.rank ?? 0 } },
      order: [['rank', 'ASC']],
      limit: ROWS_AT_A_TIME,
    });
    candidates.push(...some);
    if (some.length < ROWS_AT_A_TIME) return candidates;
  }
}

async function speaking(
  row: Sweep & { evaluation: Evaluation },
  lines: ReadonlyMap<string, LimitLineRevision>,
  candidates: readonly EvaluationCandidate[],
): Promise<LoadedRun> {
  const { purpose, polarisation, line, heightM, heightSwept, evaluation } = row;
  const keyOf = (lineId: string) => lines.get(lineId)!.lineKey;
  return {
    id: row.id,
    row,
    purpose,
    polarisation,
    line,
    heightM,
    heightSwept,
    verdict: evaluation.verdict,
    partial: row.partial !== null,
    gaps: evaluation.gaps.map((gap) => ({ ...gap, lineId: keyOf(gap.lineId) })),
    lines: evaluation.inputs.limitLines.map((lineId) => {
      const revision = lines.get(lineId)!;
      return { id: revision.lineKey, name: revision.name, asked: askedRanges(toCoreLine(lineView(revision))) };
    }),
    readings: candidates.map((candidate) => readingOf(candidate, row, lines.get(candidate.lineId)!)),
    spotsHz: await spotsOf(row),
  };
}

function readingOf(candidate: EvaluationCandidate, run: Sweep, line: LimitLineRevision): LoadedReading {
  const { kind, frequencyHz, fromHz, toHz, level, limit, marginDb, uncertaintyDb, verdict } = candidate;
  const rbwHz = run.reading.traces.find(({ index }) => index === candidate.traceIndex)?.rbwHz ?? 0;
  const range = kind === 'floor' ? { fromHz, toHz } : { fromHz: frequencyHz, toHz: frequencyHz };
  const figures = { frequencyHz, level, limit, marginDb, uncertaintyDb, verdict, because: candidate.because };
  const bandwidthHz = Math.max(rbwHz, line.bandwidthHz);
  return { kind, ...range, bandwidthHz, lineId: line.lineKey, ...figures, run, line };
}

/** The points of a final that leaves ground between them: it was tuned to each. */
async function spotsOf(row: Sweep & { evaluation: Evaluation }): Promise<number[]> {
  const apart = row.evaluation.gaps.some(({ because }) => because === 'gap');
  if (row.purpose !== 'final' || row.partial || !apart || row.points > SPOTS_AT_MOST) return [];
  return (await readPieces(row.id)).flatMap(({ frequencyHz }) => [...frequencyHz]);
}
