import { Conflict } from '@/errors';
import { Booking } from '@/models/booking';
import type { Booked, Wanted } from './bookingChecks';
import { clashWords } from './bookingClash';
import { clashesWith, holdSlot, nextFreeStart } from './bookingSlots';
import { BOOKING_INCLUDE, type WholeBooking } from './bookingViews';

/** Takes the slot or says what lies in the way: guards first, then locking reads. @throws {Conflict} in words */
export async function takeSlot(booked: Booked, zone: string, exceptId: number | null): Promise<void> {
  await holdSlot(booked);
  const clashes = await clashesWith(booked, exceptId);
  if (clashes.length === 0) return;
  const there = await Booking.findAll({ where: { id: clashes.map((one) => one.bookingId) }, include: BOOKING_INCLUDE });
  const found = clashes.map(({ shared, bookingId }) => ({
    shared,
    booking: there.find(({ id }) => id === bookingId) as WholeBooking,
  }));
  throw new Conflict(clashWords(found, await nextFreeStart(booked, exceptId), zone));
}

/** A booking as its audit entries name it. */
export const recorded = ({ startsAt, endsAt, positionId, technicianId, sampleId, stateId }: Wanted, work: string) => ({
  position: positionId,
  technician: technicianId,
  sample: sampleId,
  state: stateId,
  work,
  startsAt,
  endsAt,
});
