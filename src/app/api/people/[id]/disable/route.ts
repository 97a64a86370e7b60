import { handle } from '@/http/handle';
import * as operations from '@/schemas/people';
import { disablePerson } from '@/services/people';

export const POST = handle(operations.disablePerson, ({ actor, params, version, body }) =>
  disablePerson(actor, params.id, version, body.reason),
);
