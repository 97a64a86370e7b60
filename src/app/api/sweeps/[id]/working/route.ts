import { handle } from '@/http/handle';
import * as operations from '@/schemas/sweep';
import { readWorking } from '@/services/sweepWorking';

export const GET = handle(operations.readWorking, ({ actor, params, query }) => readWorking(actor, params.id, query));
