import { handle } from '@/http/handle';
import * as operations from '@/schemas/people';
import { enablePerson } from '@/services/people';

export const POST = handle(operations.enablePerson, ({ actor, params, version, body }) =>
  enablePerson(actor, params.id, version, body.reason),
);
