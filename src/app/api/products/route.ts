import { handle } from '@/http/handle';
import * as operations from '@/schemas/job';
import { createProduct, listProducts } from '@/services/products';

export const GET = handle(operations.listProducts, ({ actor, query }) => listProducts(actor, query));
export const POST = handle(operations.createProduct, ({ actor, body }) => createProduct(actor, body));
