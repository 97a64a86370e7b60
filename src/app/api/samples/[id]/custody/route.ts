import { handle } from '@/http/handle';
import * as operations from '@/schemas/custody';
import { listCustody, moveSample } from '@/services/custody';

export const GET = handle(operations.listCustody, ({ actor, params, query }) => listCustody(actor, params.id, query));
export const POST = handle(operations.moveSample, ({ actor, params, body }) => moveSample(actor, params.id, body));
