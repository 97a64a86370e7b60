import type { z } from 'zod';
import { authorise, type Actor } from '@/auth/actor';
import { Conflict, StaleVersion } from '@/errors';
import { Booking } from '@/models/booking';
import { currentTransaction, unitOfWork } from '@/models/unitOfWork';
import type { BookingView, changeBookingBody } from '@/schemas/booking';
import { recordChange } from './audit';
import { bookable, type Wanted } from './bookingChecks';
import { bookingView, findBooking, type WholeBooking } from './bookingViews';
import { labSettings } from './lab';
import { recorded, takeSlot } from './takeSlot';
import { changeVersioned } from './versions';

function wantedOf(row: WholeBooking): Wanted {
  return {
    positionId: row.position.publicId,
    technicianId: row.technician.publicId,
    sampleId: row.sample.publicId,
    stateId: row.modification?.publicId ?? null,
    startsAt: row.startsAt,
    endsAt: row.endsAt,
  };
}

/** A booking that stands, held until the unit commits and still at the version that was read. */
async function heldAt(row: Booking, version: number): Promise<Booking> {
  const held = await Booking.findByPk(row.id, { lock: currentTransaction().LOCK.UPDATE, rejectOnEmpty: true });
  if (held.version !== version) throw new StaleVersion(held.version, 'booking');
  if (held.state === 'cancelled') throw new Conflict('This booking is cancelled. Book anew.');
  return held;
}

/** Moves a booking. Guards are taken before its own row, as every booking does, so that two moves do not lock crosswise. */
export async function changeBooking(
  actor: Actor | null,
  publicId: string,
  version: number,
  body: z.infer<typeof changeBookingBody>,
  at = new Date(),
): Promise<BookingView> {
  authorise(actor, 'booking.write');
  return unitOfWork(async () => {
    const row = await findBooking(publicId);
    const { zone } = await labSettings();
    const before = wantedOf(row);
    const wanted: Wanted = {
      ...before,
      ...(body.positionId && { positionId: body.positionId }),
      ...(body.technicianId && { technicianId: body.technicianId }),
      ...(body.stateId !== undefined && { stateId: body.stateId }),
      ...(body.startsAt && { startsAt: new Date(body.startsAt) }),
      ...(body.endsAt && { endsAt: new Date(body.endsAt) }),
    };
    if (row.version !== version) throw new StaleVersion(row.version, 'booking');
    const { jobId, ...booked } = await bookable(wanted, zone, at);
    await takeSlot({ ...booked, jobId }, zone, row.id);
    const held = await heldAt(row, version);
    const work = body.work ?? held.work;
    const { positionId, technicianId, stateId, startsAt, endsAt } = booked;
    await changeVersioned(
      Booking,
      held,
      version,
      { positionId, technicianId, stateId, startsAt, endsAt, work },
      'booking',
    );
    recordChange(actor, {
      scope: `job-${jobId}`,
      action: moved(before, wanted) ? 'booking moved' : 'booking changed',
      subjectType: 'booking',
      subjectId: publicId,
      before: recorded(before, held.work),
      after: recorded(wanted, work),
      at,
    });
    return bookingView(await findBooking(publicId));
  });
}

const moved = (before: Wanted, after: Wanted) =>
  before.startsAt.getTime() !== after.startsAt.getTime() ||
  before.endsAt.getTime() !== after.endsAt.getTime() ||
  before.positionId !== after.positionId;

/** Takes a booking out of the day with its reason; it stays on record. */
export async function cancelBooking(
  actor: Actor | null,
  publicId: string,
  version: number,
  { reason }: { reason: string },
  at = new Date(),
): Promise<BookingView> {
  authorise(actor, 'booking.write');
  return unitOfWork(async () => {
    const row = await findBooking(publicId);
    const held = await heldAt(row, version);
    await changeVersioned(Booking, held, version, { state: 'cancelled', cancelReason: reason }, 'booking');
    recordChange(actor, {
      scope: `job-${row.sample.job.publicId}`,
      action: 'booking cancelled',
      subjectType: 'booking',
      subjectId: publicId,
      before: { state: 'booked' },
      after: { state: 'cancelled', reason },
      at,
    });
    return bookingView(await findBooking(publicId));
  });
}
