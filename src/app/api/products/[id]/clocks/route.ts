import { handle } from '@/http/handle';
import * as operations from '@/schemas/clock';
import { addProductClock, listProductClocks } from '@/services/clocks';

export const GET = handle(operations.listProductClocks, ({ actor, params, query }) =>
  listProductClocks(actor, params.id, query),
);
export const POST = handle(operations.addProductClock, ({ actor, params, body }) =>
  addProductClock(actor, params.id, body),
);
