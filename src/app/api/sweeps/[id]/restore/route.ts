import { handle } from '@/http/handle';
import * as operations from '@/schemas/runActs';
import { restoreSweep } from '@/services/runActs';

export const POST = handle(operations.restoreSweep, ({ actor, params, version, body }) =>
  restoreSweep(actor, params.id, version, body),
);
