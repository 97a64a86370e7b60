import { col, fn } from 'sequelize';
import { authorise, visibleOrganisation, type Actor } from '@/auth/actor';
import { Retest, type RetestReason } from '@/models/retest';
import { unitOfWork } from '@/models/unitOfWork';
import { findSample } from './samples';

/** How many retests wait for somebody, by reason; what is scheduled or measured waits for nobody. */
export async function waitingRetests(actor: Actor | null): Promise<Record<RetestReason, number>> {
  authorise(actor, 'retest.list');
  const own = visibleOrganisation(actor);
  const job = { association: 'job', attributes: [], required: true, where: { organisationId: own } };
  const sample = { association: 'sample', attributes: [], required: true, include: [job] };
  const include = own === null ? [] : [{ association: 'state', attributes: [], required: true, include: [sample] }];
  return unitOfWork(async () => {
    const rows = (await Retest.findAll({
      attributes: ['reason', [fn('COUNT', col('Retest.id')), 'count']],
      where: { status: 'waiting' },
      include,
      group: ['Retest.reason'],
      raw: true,
    })) as unknown as { reason: RetestReason; count: number | string }[];
    const counted = Object.fromEntries(rows.map(({ reason, count }) => [reason, Number(count)]));
    return { over: 0, 'needs-final': 0, 'repeat-prescan': 0, ...counted };
  });
}

/** How many retests of each state of a sample are open (waiting, scheduled, measured), by the state's public id. */
export async function openByState(actor: Actor | null, sampleId: string): Promise<Map<string, number>> {
  authorise(actor, 'retest.list');
  return unitOfWork(async () => {
    const sample = await findSample(actor, sampleId);
    const rows = (await Retest.findAll({
      attributes: ['stateId', [fn('COUNT', col('Retest.id')), 'count']],
      where: { status: ['waiting', 'scheduled', 'measured'] },
      include: [{ association: 'state', attributes: ['publicId'], required: true, where: { sampleId: sample.id } }],
      group: ['Retest.state_id', 'state.id'],
      raw: true,
      nest: true,
    })) as unknown as { state: { publicId: string }; count: number | string }[];
    return new Map(rows.map(({ state, count }) => [state.publicId, Number(count)]));
  });
}
