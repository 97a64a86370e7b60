import { col, fn, Op, type IncludeOptions, type OrderItem, type WhereOptions } from 'sequelize';
import { visibleOrganisation, type Actor } from '@/auth/actor';
import type { LineUnit } from '@/emc/kinds';
import { Invalid, NotFound } from '@/errors';
import type { LimitLineRevision } from '@/models/limitLineRevision';
import { ModificationState } from '@/models/modificationState';
import { Organisation } from '@/models/organisation';
import { Retest } from '@/models/retest';
import { RetestChange } from '@/models/retestChange';
import type { Sweep } from '@/models/sweep';
import type { RetestFilters, RetestItem } from '@/schemas/retest';
import { findProduct } from './products';
import { findRun, type WholeState } from './runs';
import { findSample, stateLabel } from './samples';

export type WholeRetest = Retest & {
  state: WholeState;
  carried: ModificationState | null;
  limitLine: LimitLineRevision | null;
  sweep: Sweep | null;
  origin: (Retest & { state: ModificationState }) | null;
};

/** Joins a retest to what names it; `ofJob` narrows to the jobs of one organisation or product. */
export function retestInclude(ofJob: Record<string, number> = {}): IncludeOptions[] {
  const job = { association: 'job', required: true, where: ofJob, include: ['organisation', 'product'] };
  const sample = { association: 'sample', required: true, include: [job] };
  return [
    { association: 'state', required: true, include: [sample] },
    { association: 'carried', attributes: ['position'] },
    { association: 'limitLine' },
    { association: 'sweep', required: false, attributes: ['publicId', 'number'] },
    { association: 'origin', attributes: ['number'], include: [{ association: 'state', attributes: ['position'] }] },
  ];
}

/** What a list asks for, as conditions; a sample, product, run or client the actor may not see is not found. */
export async function retestScope(
  actor: Actor,
  { status, reason, port, ...ids }: RetestFilters,
): Promise<{ where: WhereOptions; include: IncludeOptions[] }> {
  const and: Record<string | symbol, unknown>[] = [];
  if (status) and.push({ status: status === 'open' ? ['waiting', 'scheduled', 'measured'] : status });
  if (reason) and.push({ reason });
  if (port) and.push({ port });
  if (ids.sampleId) and.push({ stateId: await stateIdsOf(actor, ids.sampleId) });
  if (ids.stateId) {
    const state = await ModificationState.findOne({ where: { publicId: ids.stateId }, include: ['sample'] });
    if (!state) throw new NotFound('modification state');
    await findSample(actor, (state as ModificationState & { sample: { publicId: string } }).sample.publicId);
    and.push({ stateId: state.id });
  }
  if (ids.runId) {
    const run = await findRun(actor, ids.runId);
    const changes = await RetestChange.findAll({ attributes: ['retestId'], where: { sweepId: run.id } });
    and.push({ [Op.or]: [{ sweepId: run.id }, { id: changes.map(({ retestId }) => retestId) }] });
  }
  return { where: { [Op.and]: and }, include: retestInclude(await jobScope(actor, ids)) };
}

async function stateIdsOf(actor: Actor, sampleId: string): Promise<number[]> {
  const sample = await findSample(actor, sampleId);
  const states = await ModificationState.findAll({ where: { sampleId: sample.id }, attributes: ['id'] });
  return states.map(({ id }) => id);
}

async function jobScope(
  actor: Actor,
  { productId, organisationId }: Pick<RetestFilters, 'productId' | 'organisationId'>,
): Promise<Record<string, number>> {
  const own = visibleOrganisation(actor);
  const asked = organisationId ? await Organisation.findOne({ where: { publicId: organisationId } }) : null;
  if (organisationId && (!asked || (own !== null && asked.id !== own))) throw new NotFound('organisation');
  const organisation = asked?.id ?? own;
  const product = productId ? await findProduct(actor, productId) : null;
  return { ...(organisation !== null && { organisationId: organisation }), ...(product && { productId: product.id }) };
}

/** A retest the actor may see, or NotFound. */
export async function findRetest(actor: Actor, publicId: string): Promise<WholeRetest> {
  const include = retestInclude(await jobScope(actor, {}));
  const row = await Retest.findOne({ where: { publicId }, include });
  if (!row) throw new NotFound('retest');
  return row as WholeRetest;
}

export function retestItemOf(row: Retest): RetestItem {
  const whole = row as WholeRetest;
  const { limitLine, sweep, origin, carried } = whole;
  const { sample } = whole.state;
  const { job } = sample;
  const { number, version, kind, reason, status, statusReason, port, position, waitsAt } = row;
  const { frequencyHz, fromHz, toHz, level, limit, marginDb, uncertaintyDb, verdict, because } = row;
  const { heightM, azimuthDeg, scheduledOn, note } = row;
  return {
    id: row.publicId,
    ...{ version, number, kind, reason, status, statusReason },
    organisation: { id: job.organisation.publicId, name: job.organisation.name },
    product: { id: job.product.publicId, code: job.product.code, name: job.product.name },
    job: { id: job.publicId, number: job.number },
    sample: { id: sample.publicId, code: sample.code, serial: sample.serial },
    state: { id: whole.state.publicId, label: stateLabel(whole.state.position) },
    port,
    position,
    waitsAt,
    line: limitLine && {
      id: limitLine.publicId,
      key: limitLine.lineKey,
      name: limitLine.name,
      detector: limitLine.detector,
      bandwidthHz: limitLine.bandwidthHz,
      unit: limitLine.unit as LineUnit,
    },
    ...{ frequencyHz, fromHz, toHz, level, limit, marginDb, uncertaintyDb, verdict, because, heightM, azimuthDeg },
    run: sweep && { id: sweep.publicId, number: sweep.number },
    carriedFrom: origin && { number: origin.number, state: stateLabel(origin.state.position) },
    carriedTo: carried && stateLabel(carried.position),
    ...{ scheduledOn, note },
    setAside: row.withdrawnBy !== null,
    since: row.openedAt.toISOString(),
  };
}

const REASONS = ['over', 'repeat-prescan', 'needs-final'] as const;
type Reason = (typeof REASONS)[number];
type Cursor = [reason: Reason, marginDb: number | null, id: number];

/** The order of the queue: over, prescans to repeat, then what needs a final; the smallest margin first. */
export const QUEUE_ORDER: OrderItem[] = [
  [fn('FIELD', col('Retest.reason'), ...REASONS), 'ASC'],
  ['marginDb', 'ASC'],
  ['id', 'ASC'],
];

/** What comes after a cursor in the order of the queue; nothing at all without one. */
export function queueAfter(after: string | undefined): WhereOptions {
  if (!after) return {};
  const [reason, marginDb, id] = cursorOf(after);
  const later = REASONS.slice(REASONS.indexOf(reason) + 1);
  const same =
    marginDb === null
      ? [{ reason, id: { [Op.gt]: id } }]
      : [
          { reason, marginDb: { [Op.gt]: marginDb } },
          { reason, marginDb, id: { [Op.gt]: id } },
        ];
  return { [Op.or]: [{ reason: later }, ...same] };
}

export function queueCursor({ reason, marginDb, id }: Retest): string {
  return Buffer.from(JSON.stringify([reason, marginDb, id]), 'utf8').toString('base64url');
}

function cursorOf(after: string): Cursor {
  try {
    const [reason, marginDb, id] = JSON.parse(Buffer.from(after, 'base64url').toString('utf8')) as unknown[];
    const known = REASONS.includes(reason as Reason) && (marginDb === null || Number.isFinite(marginDb));
    if (known && Number.isSafeInteger(id)) return [reason, marginDb, id] as Cursor;
  } catch {
    // Said below, as for any other cursor that is none.
  }
  throw new Invalid([{ pointer: '/query/after', message: 'is not a cursor of this list' }]);
}
