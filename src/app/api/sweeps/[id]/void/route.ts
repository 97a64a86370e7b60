import { handle } from '@/http/handle';
import * as operations from '@/schemas/runActs';
import { voidSweep } from '@/services/runActs';

export const POST = handle(operations.voidSweep, ({ actor, params, version, body }) =>
  voidSweep(actor, params.id, version, body),
);
