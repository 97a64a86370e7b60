import { handle } from '@/http/handle';
import * as operations from '@/schemas/people';
import { changePerson, readPerson } from '@/services/people';

export const GET = handle(operations.readPerson, ({ actor, params }) => readPerson(actor, params.id));
export const PATCH = handle(operations.changePerson, ({ actor, params, version, body }) =>
  changePerson(actor, params.id, version, body),
);
