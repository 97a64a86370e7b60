import { handle } from '@/http/handle';
import * as operations from '@/schemas/resultMail';
import { previewResultMail } from '@/services/resultMails';

export const POST = handle(operations.previewResultMail, ({ actor, body }) => previewResultMail(actor, body));
