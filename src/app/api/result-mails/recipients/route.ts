import { handle } from '@/http/handle';
import * as operations from '@/schemas/resultMail';
import { listResultMailRecipients } from '@/services/resultMails';

export const GET = handle(operations.listResultMailRecipients, ({ actor, query }) =>
  listResultMailRecipients(actor, query),
);
