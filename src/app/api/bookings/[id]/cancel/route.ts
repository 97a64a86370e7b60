import { handle } from '@/http/handle';
import * as operations from '@/schemas/booking';
import { cancelBooking } from '@/services/changeBookings';

export const POST = handle(operations.cancelBooking, ({ actor, params, version, body }) =>
  cancelBooking(actor, params.id, version, body),
);
