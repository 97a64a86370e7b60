import { z } from 'zod';
import { instant } from './common';

/** What became of an e-mail that was asked for. */
export const mailStateView = z.strictObject({
  state: z.enum(['queued', 'sending', 'sent', 'refused']),
  /** how often it was handed to the mail server, this time included */
  attempts: z.int(),
  /** when it was accepted or refused for good */
  doneAt: instant.nullable(),
  /** queued only: not before this */
  nextTryAt: instant.nullable(),
  /** why the last try failed, in the mail server's words where it had any */
  reason: z.string().nullable(),
});
export type MailState = z.infer<typeof mailStateView>;
