import { handle } from '@/http/handle';
import * as operations from '@/schemas/retest';
import { changeRetest, readRetest } from '@/services/retests';

export const GET = handle(operations.readRetest, ({ actor, params }) => readRetest(actor, params.id));
export const PATCH = handle(operations.changeRetest, ({ actor, params, version, body }) =>
  changeRetest(actor, params.id, version, body),
);
