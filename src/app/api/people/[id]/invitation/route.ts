import { handle } from '@/http/handle';
import * as operations from '@/schemas/people';
import { inviteAgain } from '@/services/people';

export const POST = handle(operations.inviteAgain, ({ actor, params }) => inviteAgain(actor, params.id));
