import { handle } from '@/http/handle';
import * as operations from '@/schemas/people';
import { readLink } from '@/services/passwordReset';

export const POST = handle(operations.readLink, ({ body }) => readLink(body.kind, body.token));
