import { env } from '@/config/env';
import { DomainError } from '@/errors';
import type { Mail } from '@/mail/message';
import { deliver, MailRefused, NoMailServer } from '@/mail/transport';
import { aboutLab } from '@/services/aboutLab';
import { composeInvitationMail } from '@/services/invitations';
import type { MailKind } from '@/services/mailQueue';
import { composeResetMail } from '@/services/passwordReset';
import { composeResultMail } from '@/services/resultMail';
import { FinalFailure, NotYet } from './failures';
import type { LeasedMessage } from './queue';

/** Writes one e-mail from records that the payload names. A DomainError means that there is nothing to send any more. */
export type Compose = (payload: Record<string, unknown>) => Promise<Mail>;

export const MAILS: Readonly<Partial<Record<MailKind, Compose>>> = {
  'mail-reset': composeResetMail,
  'mail-invitation': composeInvitationMail,
  'mail-result': composeResultMail,
};

/** Writes an e-mail anew and hands it to the mail server. It is at least once, always with the same Message-ID. */
export async function sendMail(compose: Compose, message: LeasedMessage): Promise<void> {
  try {
    const mail = await compose(message.payload);
    const { name } = await aboutLab();
    const { hostname } = new URL(env().APP_ORIGIN);
    await deliver(mail, message.messageId ?? `<outbox-${message.id}@${hostname}>`, name);
  } catch (error) {
    if (error instanceof DomainError || error instanceof MailRefused) throw new FinalFailure(error.message);
    if (error instanceof NoMailServer) throw new NotYet(error.message);
    throw error;
  }
}
