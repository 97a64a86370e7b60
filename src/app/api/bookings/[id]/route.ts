import { handle } from '@/http/handle';
import * as operations from '@/schemas/booking';
import { readBooking } from '@/services/bookings';
import { changeBooking } from '@/services/changeBookings';

export const GET = handle(operations.readBooking, ({ actor, params }) => readBooking(actor, params.id));
export const PATCH = handle(operations.changeBooking, ({ actor, params, version, body }) =>
  changeBooking(actor, params.id, version, body),
);
