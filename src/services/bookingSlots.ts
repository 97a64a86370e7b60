import { Op, QueryTypes } from 'sequelize';
import { Booking } from '@/models/booking';
import { database } from '@/models/database';
import { currentTransaction } from '@/models/unitOfWork';
import { utcDays } from '@/schemas/labTime';

/** A position and a person over a span; ids are row ids. */
export interface Slot {
  positionId: number;
  technicianId: number;
  startsAt: Date;
  /** The first instant after it, so that touching slots share nothing. */
  endsAt: Date;
}

const DAY_MS = 86_400_000;
/** Counted on the lab's wall; summer time may add an hour to it. */
export const LONGEST_DAYS = 10;
const LONGEST_MS = LONGEST_DAYS * DAY_MS + 2 * 3_600_000;
/** How far ahead a free time is looked for. */
export const SEARCHED_DAYS = 90;

/**
 * Takes the guards of a slot until the unit commits: one row per resource and UTC day, updated (and created where it is
 * missing) in one statement, in sorted order, so that two units cannot wait for each other and a cluster certifies the
 * same row. Two slots that overlap share an instant, so they share a UTC day and one of its rows.
 */
export async function holdSlot(slot: Slot): Promise<void> {
  const resources = [`person-${slot.technicianId}`, `position-${slot.positionId}`];
  const days = utcDays(slot.startsAt, slot.endsAt);
  const rows = resources.sort().flatMap((resource) => days.map((day) => [resource, day, 1]));
  await database().query(
    'INSERT INTO booking_guards (resource, day, touched) VALUES :rows ON DUPLICATE KEY UPDATE touched = touched + 1',
    { replacements: { rows }, type: QueryTypes.INSERT },
  );
}

export interface Clash {
  shared: 'position' | 'technician';
  /** Row id of the booking that is there already. */
  bookingId: number;
}

/**
 * What lies in the way of a slot whose guards are held: the first booking that overlaps it at its position, and the
 * first with its person. Locking reads, so they see what others have committed and not this unit's snapshot.
 */
export async function clashesWith(slot: Slot, exceptId: number | null): Promise<Clash[]> {
  const found: Clash[] = [];
  for (const shared of ['position', 'technician'] as const) {
    const row = await Booking.findOne({
      attributes: ['id'],
      where: { ...resourceOf(slot, shared), ...overlapping(slot, exceptId) },
      order: [['startsAt', 'ASC']],
      lock: currentTransaction().LOCK.UPDATE,
    });
    if (row) found.push({ shared, bookingId: row.id });
  }
  return found;
}

/** When position and person are next free together for as long as the slot; null within `SEARCHED_DAYS`. */
export async function nextFreeStart(slot: Slot, exceptId: number | null): Promise<Date | null> {
  const ahead = { startsAt: slot.startsAt, endsAt: new Date(slot.startsAt.getTime() + SEARCHED_DAYS * DAY_MS) };
  const rows = await Booking.findAll({
    attributes: ['startsAt', 'endsAt'],
    where: {
      ...overlapping(ahead, exceptId),
      [Op.or]: [resourceOf(slot, 'position'), resourceOf(slot, 'technician')],
    },
    order: [['startsAt', 'ASC']],
  });
  return firstGap(rows, slot.startsAt, slot.endsAt.getTime() - slot.startsAt.getTime(), ahead.endsAt);
}

/** The first start from `from` on at which `lengthMs` fit between the spans (in the order they begin); null beyond `until`. */
export function firstGap(
  spans: readonly { startsAt: Date; endsAt: Date }[],
  from: Date,
  lengthMs: number,
  until: Date,
): Date | null {
  let start = from.getTime();
  for (const span of spans) {
    if (span.startsAt.getTime() >= start + lengthMs) break;
    start = Math.max(start, span.endsAt.getTime());
  }
  return start + lengthMs <= until.getTime() ? new Date(start) : null;
}

function resourceOf(slot: Slot, shared: Clash['shared']) {
  return shared === 'position' ? { positionId: slot.positionId } : { technicianId: slot.technicianId };
}

/** Nothing is longer than the longest, so the index on the beginning bounds the search on both sides. */
export function overlapping({ startsAt, endsAt }: { startsAt: Date; endsAt: Date }, exceptId: number | null = null) {
  return {
    state: 'booked' as const,
    startsAt: { [Op.lt]: endsAt, [Op.gt]: new Date(startsAt.getTime() - LONGEST_MS) },
    endsAt: { [Op.gt]: startsAt },
    ...(exceptId !== null && { id: { [Op.ne]: exceptId } }),
  };
}
