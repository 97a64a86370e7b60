import { handle } from '@/http/handle';
import * as operations from '@/schemas/sweep';
import { keepSweep } from '@/services/keepSweep';
import { listSweeps } from '@/services/sweeps';

export const GET = handle(operations.listSweeps, ({ actor, query }) => listSweeps(actor, query));
export const POST = handle(operations.keepSweepOperation, ({ actor, body }) => keepSweep(actor, body));
