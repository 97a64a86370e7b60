import { handle } from '@/http/handle';
import * as operations from '@/schemas/bench';
import { createLimitSet } from '@/services/enterLimitFile';
import { listLimitSets } from '@/services/limitSets';

export const GET = handle(operations.listLimitSets, ({ actor, query }) => listLimitSets(actor, query));
export const POST = handle(operations.createLimitSet, ({ actor, body }) => createLimitSet(actor, body));
