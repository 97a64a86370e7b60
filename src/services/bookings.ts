import { Op, type WhereOptions } from 'sequelize';
import type { z } from 'zod';
import { authorise, type Actor } from '@/auth/actor';
import { Invalid } from '@/errors';
import { Booking } from '@/models/booking';
import { newPublicId } from '@/models/publicId';
import { Sample } from '@/models/sample';
import { TestPosition } from '@/models/testPosition';
import { unitOfWork } from '@/models/unitOfWork';
import { User } from '@/models/user';
import type { BookingView, createBookingBody, listBookings as listOperation } from '@/schemas/booking';
import { recordChange } from './audit';
import { bookable } from './bookingChecks';
import { BOOKING_INCLUDE, bookingView, findBooking } from './bookingViews';
import { labSettings } from './lab';
import { recorded, takeSlot } from './takeSlot';

type Listed = z.output<NonNullable<(typeof listOperation)['query']>>;

/** Bookings in the order they begin. `from` and `to` name a span that they touch. */
export async function listBookings(actor: Actor | null, query: Listed) {
  authorise(actor, 'booking.list');
  return unitOfWork(async () => {
    const { id: positionId = null } = await named(TestPosition, query.positionId);
    const { id: technicianId = null } = await named(User, query.technicianId);
    const { id: sampleId = null } = await named(Sample, query.sampleId);
    const rows = await Booking.findAll({
      where: {
        [Op.and]: [afterCursor(query.after)],
        ...(query.from && { endsAt: { [Op.gt]: new Date(query.from) } }),
        ...(query.to && { startsAt: { [Op.lt]: new Date(query.to) } }),
        ...(query.cancelled === undefined && { state: 'booked' as const }),
        ...(positionId !== null && { positionId }),
        ...(technicianId !== null && { technicianId }),
        ...(sampleId !== null && { sampleId }),
      },
      include: BOOKING_INCLUDE,
      order: [
        ['startsAt', 'ASC'],
        ['id', 'ASC'],
      ],
      limit: query.limit + 1,
    });
    const shown = rows.slice(0, query.limit);
    const last = shown.at(-1);
    const next = rows.length > query.limit && last ? cursorOf(last) : null;
    return { items: shown.map(bookingView), next };
  });
}

/** Row id of a filter's record; none of that name finds nothing (0). */
async function named(
  model: { findOne(options: object): Promise<{ id: number } | null> },
  publicId: string | undefined,
): Promise<{ id?: number }> {
  if (publicId === undefined) return {};
  return { id: (await model.findOne({ where: { publicId }, attributes: ['id'] }))?.id ?? 0 };
}

const cursorOf = ({ startsAt, id }: Booking) =>
  Buffer.from(`${startsAt.getTime()}.${id}`, 'latin1').toString('base64url');

function afterCursor(after: string | undefined): WhereOptions {
  if (after === undefined) return {};
  const [, ms, id] = /^(\d{1,15})\.(\d{1,15})$/.exec(Buffer.from(after, 'base64url').toString('latin1')) ?? [];
  if (ms === undefined) throw new Invalid([{ pointer: '/query/after', message: 'is not a cursor of this list' }]);
  const startsAt = new Date(Number(ms));
  return { [Op.or]: [{ startsAt: { [Op.gt]: startsAt } }, { startsAt, id: { [Op.gt]: Number(id) } }] };
}

export async function readBooking(actor: Actor | null, publicId: string): Promise<BookingView> {
  authorise(actor, 'booking.list');
  return unitOfWork(async () => bookingView(await findBooking(publicId)));
}

/** Books a position and a person for a sample. Two at once for the same time: the database lets one through. */
export async function createBooking(
  actor: Actor | null,
  body: z.infer<typeof createBookingBody>,
  at = new Date(),
): Promise<BookingView> {
  authorise(actor, 'booking.write');
  return unitOfWork(async () => {
    const { zone } = await labSettings();
    const wanted = { ...body, startsAt: new Date(body.startsAt), endsAt: new Date(body.endsAt) };
    const { jobId, ...booked } = await bookable(wanted, zone, at);
    await takeSlot({ ...booked, jobId }, zone, null);
    const row = await Booking.create({
      publicId: newPublicId(),
      ...booked,
      work: body.work,
      createdBy: actor.userId,
      createdAt: at,
    });
    recordChange(actor, {
      scope: `job-${jobId}`,
      action: 'booked',
      subjectType: 'booking',
      subjectId: row.publicId,
      before: null,
      after: recorded(wanted, body.work),
      at,
    });
    return bookingView(await findBooking(row.publicId));
  });
}
