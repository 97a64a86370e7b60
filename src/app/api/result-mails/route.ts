import { handle } from '@/http/handle';
import * as operations from '@/schemas/resultMail';
import { listResultMails, sendResultMail } from '@/services/resultMails';

export const GET = handle(operations.listResultMails, ({ actor, query }) => listResultMails(actor, query));
export const POST = handle(operations.sendResultMail, ({ actor, body }) => sendResultMail(actor, body));
