import { handle } from '@/http/handle';
import * as operations from '@/schemas/bench';
import { listLimitSets } from '@/services/limitSets';

export const GET = handle(operations.listLimitSets, ({ actor, query }) => listLimitSets(actor, query));
