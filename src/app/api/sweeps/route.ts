import { handle } from '@/http/handle';
import * as operations from '@/schemas/sweep';
import { publishSweep } from '@/services/keepSweep';
import { dropSweep, stageSweep } from '@/services/stageSweep';
import { listSweeps } from '@/services/sweeps';

export const GET = handle(operations.listSweeps, ({ actor, query }) => listSweeps(actor, query));
export const POST = handle(operations.keepSweepOperation, {
  stage: ({ actor, body }) => stageSweep(actor, body),
  publish: ({ actor, body }, pending) => publishSweep(actor, body, pending),
  drop: dropSweep,
});
