import { handle } from '@/http/handle';
import * as operations from '@/schemas/clock';
import { withdrawProductClock } from '@/services/clocks';

export const POST = handle(operations.withdrawProductClock, ({ actor, params, version, body }) =>
  withdrawProductClock(actor, params.id, version, body),
);
