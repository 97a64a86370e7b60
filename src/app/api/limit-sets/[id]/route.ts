import { handle } from '@/http/handle';
import * as operations from '@/schemas/bench';
import { readLimitSet } from '@/services/limitSets';

export const GET = handle(operations.readLimitSet, ({ actor, params }) => readLimitSet(actor, params.id));
