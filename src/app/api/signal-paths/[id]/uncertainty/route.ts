import { handle } from '@/http/handle';
import * as operations from '@/schemas/paths';
import { reviseUncertainty } from '@/services/reviseUncertainty';

export const POST = handle(operations.reviseUncertainty, ({ actor, params, version, body }) =>
  reviseUncertainty(actor, params.id, version, body),
);
