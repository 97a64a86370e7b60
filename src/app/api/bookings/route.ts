import { handle } from '@/http/handle';
import * as operations from '@/schemas/booking';
import { createBooking, listBookings } from '@/services/bookings';

export const GET = handle(operations.listBookings, ({ actor, query }) => listBookings(actor, query));
export const POST = handle(operations.createBooking, ({ actor, body }) => createBooking(actor, body));
