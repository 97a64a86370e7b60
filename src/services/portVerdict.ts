import { Op } from 'sequelize';
import { portVerdict } from '@/emc/port';
import type { Evaluation } from '@/models/evaluation';
import { LimitSet } from '@/models/limitSet';
import { Sweep } from '@/models/sweep';
import type { SweepView } from '@/schemas/sweep';
import { linesOf } from './limitSets';
import { setupBriefs } from './setupBriefs';

/** The verdict of a run's port over every run of the same sample state. The caller has shown that it may see the run. */
export async function portVerdictOf(run: Pick<Sweep, 'stateId' | 'port'>): Promise<SweepView['portVerdict']> {
  const rows = (await Sweep.findAll({
    where: { stateId: run.stateId, port: run.port, evaluationId: { [Op.not]: null }, trial: null, voidedAt: null },
    include: ['evaluation'],
    order: [['id', 'ASC']],
  })) as (Sweep & { evaluation: Evaluation })[];
  const sets = await LimitSet.findAll({ where: { id: [...new Set(rows.map((row) => row.limitSetId))] } });
  const lines = await linesOf(sets);
  const judged = portVerdict(
    run.port,
    rows.map((row) => ({
      purpose: row.purpose,
      polarisation: row.polarisation,
      line: row.line,
      heightM: row.heightM,
      heightSwept: row.heightSwept,
      verdict: row.evaluation.verdict,
      gaps: row.evaluation.gaps,
      partial: row.partial !== null,
      lines: lines.get(row.limitSetId)!.map(({ id, name }) => ({ id, name })),
    })),
  );
  const setups = await setupBriefs(rows);
  return {
    ...judged,
    runs: rows.map((row) => ({ id: row.publicId, number: row.number, setup: setups.get(row.id)! })),
  };
}
