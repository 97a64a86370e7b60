import type { z } from 'zod';
import { Op } from 'sequelize';
import { authorise, type Actor } from '@/auth/actor';
import { Conflict, Invalid } from '@/errors';
import { ModificationState } from '@/models/modificationState';
import { Retest, type RetestStatus } from '@/models/retest';
import { RetestChange, type RetestAction } from '@/models/retestChange';
import type { Sweep } from '@/models/sweep';
import { currentTransaction, unitOfWork } from '@/models/unitOfWork';
import type { User } from '@/models/user';
import type { changeRetestBody, RetestFilters, RetestItem, RetestView } from '@/schemas/retest';
import { recordChange } from './audit';
import type { Page, PageRequest } from './paging';
import { findRetest, QUEUE_ORDER, queueAfter, queueCursor, retestItemOf, retestScope } from './retestViews';
import { lockOpenJob } from './samples';
import { settleRetests } from './settleRetests';
import { changeVersioned } from './versions';

const CHANGES_SHOWN = 200;
/** More than a receiver is tuned to in a week; a longer list is a filter that was forgotten. */
const LISTED_AT_MOST = 5000;

export async function listRetests(
  actor: Actor | null,
  { limit, after, ...filters }: PageRequest & RetestFilters,
): Promise<Page<RetestItem>> {
  authorise(actor, 'retest.list');
  return unitOfWork(async () => {
    const { where, include } = await retestScope(actor, filters);
    const rows = await Retest.findAll({
      where: { [Op.and]: [where, queueAfter(after)] },
      include,
      order: QUEUE_ORDER,
      limit: limit + 1,
      subQuery: false,
    });
    const shown = rows.slice(0, limit);
    const next = rows.length > limit ? queueCursor(shown.at(-1)!) : null;
    return { items: shown.map(retestItemOf), next };
  });
}

/** The emissions of a list in the order in which a receiver is tuned to them: sample, port, position, frequency. */
export async function frequencyList(actor: Actor | null, filters: RetestFilters): Promise<RetestItem[]> {
  authorise(actor, 'retest.list');
  return unitOfWork(async () => {
    const { where, include } = await retestScope(actor, filters);
    const asked = filters.status ? {} : { status: ['waiting', 'scheduled'] };
    const rows = await Retest.findAll({
      where: { [Op.and]: [where, asked, { kind: ['peak', 'floor'] }] },
      include,
      limit: LISTED_AT_MOST + 1,
      subQuery: false,
    });
    if (rows.length > LISTED_AT_MOST) {
      const message = `holds more than ${LISTED_AT_MOST} emissions; name a sample or a port`;
      throw new Invalid([{ pointer: '/query', message }]);
    }
    return rows.map(retestItemOf).sort(asTuned);
  });
}

function asTuned(a: RetestItem, b: RetestItem): number {
  const placeOf = ({ sample, state, port, position }: RetestItem) => [sample.code, state.label, port, position ?? ''];
  const [one, other] = [placeOf(a), placeOf(b)];
  const at = one.findIndex((part, i) => part !== other[i]);
  if (at >= 0) return one[at]! < other[at]! ? -1 : 1;
  return a.frequencyHz! - b.frequencyHz! || (a.number < b.number ? -1 : 1);
}

export async function readRetest(actor: Actor | null, publicId: string): Promise<RetestView> {
  authorise(actor, 'retest.list');
  return unitOfWork(async () => {
    const row = await findRetest(actor, publicId);
    const changes = await RetestChange.findAll({
      where: { retestId: row.id },
      include: ['user', { association: 'sweep', required: false, attributes: ['publicId', 'number'] }],
      order: [['id', 'DESC']],
      limit: CHANGES_SHOWN,
    });
    return { ...retestItemOf(row), changes: changes.map(changeView) };
  });
}

function changeView(row: RetestChange): RetestView['changes'][number] {
  const { user, sweep } = row as RetestChange & { user: User; sweep: Sweep | null };
  const { action, reason, marginFromDb, marginToDb, scheduledOn, note } = row;
  return {
    at: row.at.toISOString(),
    by: { id: user.publicId, name: user.name },
    action,
    from: row.fromStatus,
    to: row.toStatus,
    reason,
    run: sweep && { id: sweep.publicId, number: sweep.number },
    ...{ marginFromDb, marginToDb, scheduledOn, note },
  };
}

type Body = z.infer<typeof changeRetestBody>;

/** What a person does with a retest: place it on a day, set it aside with a reason, or take that back. */
export async function changeRetest(
  actor: Actor | null,
  publicId: string,
  version: number,
  body: Body,
  at = new Date(),
): Promise<RetestView> {
  authorise(actor, 'retest.change');
  return unitOfWork(async () => {
    const { id, stateId, port, state } = await findRetest(actor, publicId);
    const { job } = state.sample;
    await lockOpenJob(job.id);
    await ModificationState.findByPk(stateId, { lock: currentTransaction().LOCK.UPDATE });
    const row = await Retest.findByPk(id, { rejectOnEmpty: true });
    const { action, values, reason } = actOf(row, body, actor);
    await changeVersioned(Retest, row, version, { ...values, statusReason: reason }, 'retest');
    await RetestChange.create({
      retestId: id,
      at,
      userId: actor.userId,
      action,
      fromStatus: row.status,
      toStatus: values.status,
      reason,
      marginFromDb: row.marginDb,
      marginToDb: row.marginDb,
      ...(body.act === 'schedule' && { scheduledOn: body.day, note: body.note }),
    });
    recordChange(actor, {
      scope: `job-${job.publicId}`,
      action: `retest ${row.number} ${action}`,
      subjectType: 'retest',
      subjectId: publicId,
      before: { status: row.status, reason: row.statusReason },
      after: { status: values.status, ...body },
      at,
    });
    if (body.act === 'reopen') await settleRetests(actor, { stateId, port, because: `${row.number} reopened`, at });
    return readRetest(actor, publicId);
  });
}

interface Act {
  action: RetestAction;
  values: { status: RetestStatus } & Record<string, unknown>;
  reason: string;
}

const UNPLANNED = { scheduledOn: null, note: null };
const HELD_NO_MORE = { withdrawnBy: null, withdrawnMarginDb: null, withdrawnVerdict: null };

function actOf(row: Retest, body: Body, actor: Actor): Act {
  const { number, status, statusReason } = row;
  const open = status === 'waiting' || status === 'scheduled' || status === 'measured';
  if (body.act === 'reopen') {
    const byHand = status === 'scheduled' || (status === 'withdrawn' && row.withdrawnBy !== null);
    if (!byHand && open) throw new Conflict(`${number} is ${status} already.`);
    if (!byHand) throw new Conflict(`${number} is ${status}: ${statusReason}. A run that shows it again reopens it.`);
    return { action: 'reopened', values: { status: 'waiting', ...HELD_NO_MORE, ...UNPLANNED }, reason: body.reason };
  }
  if (!open) throw new Conflict(`${number} is ${status}: ${statusReason}. Reopen it first.`);
  if (body.act === 'schedule') {
    const { day, note } = body;
    return {
      action: 'scheduled',
      values: { status: 'scheduled', scheduledOn: day, note },
      reason: note || 'scheduled',
    };
  }
  const { marginDb, verdict } = row;
  const held = { withdrawnBy: actor.userId, withdrawnMarginDb: marginDb, withdrawnVerdict: verdict };
  return { action: 'withdrawn', values: { status: 'withdrawn', ...held, ...UNPLANNED }, reason: body.reason };
}
