import { handle } from '@/http/handle';
import * as operations from '@/schemas/runActs';
import { refileSweep } from '@/services/runActs';

export const POST = handle(operations.refileSweep, ({ actor, params, version, body }) =>
  refileSweep(actor, params.id, version, body),
);
