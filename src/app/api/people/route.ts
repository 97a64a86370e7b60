import { handle } from '@/http/handle';
import * as operations from '@/schemas/people';
import { invitePerson, listPeople } from '@/services/people';

export const GET = handle(operations.listPeople, ({ actor, query }) => listPeople(actor, query));
export const POST = handle(operations.invitePerson, ({ actor, body }) => invitePerson(actor, body));
