import { handle } from '@/http/handle';
import * as operations from '@/schemas/job';
import { changeState } from '@/services/samples';

export const PATCH = handle(operations.changeState, ({ actor, params, version, body }) =>
  changeState(actor, params.id, version, body),
);
