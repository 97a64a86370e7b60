import { handle } from '@/http/handle';
import * as operations from '@/schemas/clock';
import { changeProductClock, readProductClock } from '@/services/clocks';

export const GET = handle(operations.readProductClock, ({ actor, params }) => readProductClock(actor, params.id));
export const PATCH = handle(operations.changeProductClock, ({ actor, params, version, body }) =>
  changeProductClock(actor, params.id, version, body),
);
