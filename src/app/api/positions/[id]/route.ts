import { handle } from '@/http/handle';
import * as operations from '@/schemas/booking';
import { changePosition, readPosition } from '@/services/positions';

export const GET = handle(operations.readPosition, ({ actor, params }) => readPosition(actor, params.id));
export const PATCH = handle(operations.changePosition, ({ actor, params, version, body }) =>
  changePosition(actor, params.id, version, body),
);
