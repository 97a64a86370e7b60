import { handle } from '@/http/handle';
import * as operations from '@/schemas/job';
import { changeProduct, readProduct } from '@/services/products';

export const GET = handle(operations.readProduct, ({ actor, params }) => readProduct(actor, params.id));
export const PATCH = handle(operations.changeProduct, ({ actor, params, version, body }) =>
  changeProduct(actor, params.id, version, body),
);
