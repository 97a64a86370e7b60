import { col, fn } from 'sequelize';
import { Photo } from '@/models/photo';
import { SetupRecord } from '@/models/setupRecord';
import type { SetupBrief, SetupPart } from '@/schemas/setup';

/** A part of a set-up counts as said when any of these is there. */
const SAID_BY: Record<Exclude<SetupPart, 'photograph'>, (keyof SetupRecord)[]> = {
  mode: ['operatingMode'],
  supply: ['supplyKind', 'supplyV', 'supplySource'],
  cables: ['cableLayout'],
  ancillary: ['ancillary'],
  temperature: ['temperatureC'],
  humidity: ['humidityPct'],
  deviations: ['deviations'],
  stayed: ['eutStayed'],
};

function unsaidIn(record: SetupRecord | undefined, photographs: number): SetupPart[] {
  const parts = Object.entries(SAID_BY) as [SetupPart, (keyof SetupRecord)[]][];
  const unsaid = parts.filter(([, names]) => !record || names.every((name) => record[name] === null));
  return [...unsaid.map(([part]) => part), ...(photographs === 0 ? (['photograph'] as const) : [])];
}

/** The set-ups of some runs in brief, by row id; every run has one. The caller has shown that it may see the runs. */
export async function setupBriefs(runs: readonly { id: number }[]): Promise<Map<number, SetupBrief>> {
  const sweepId = runs.map(({ id }) => id);
  if (sweepId.length === 0) return new Map();
  const records = await SetupRecord.findAll({ where: { sweepId }, order: [['revision', 'ASC']] });
  const newest = new Map(records.map((record) => [record.sweepId, record]));
  const counted = (await Photo.findAll({
    attributes: ['sweepId', [fn('COUNT', col('id')), 'count']],
    where: { sweepId, withdrawnAt: null },
    group: ['sweep_id'],
    raw: true,
  })) as unknown as { sweepId: number; count: number | string }[];
  const photographs = new Map(counted.map((row) => [Number(row.sweepId), Number(row.count)]));
  return new Map(
    sweepId.map((id) => {
      const record = newest.get(id);
      const { revision = null, eutStayed = null, whatHappened = null } = record ?? {};
      return [id, { revision, eutStayed, whatHappened, unsaid: unsaidIn(record, photographs.get(id) ?? 0) }];
    }),
  );
}
