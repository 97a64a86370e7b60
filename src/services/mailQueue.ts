import { env } from '@/config/env';
import { OutboxMessage } from '@/models/outboxMessage';
import { newPublicId } from '@/models/publicId';

/** What the outbox knows how to write; each payload names records, never a secret. */
export type MailKind = 'mail-reset' | 'mail-invitation' | 'mail-result';

/**
 * Asks for an e-mail in the current unit of work; the outbox process writes and sends it after the commit. Its
 * Message-ID stays the same over all tries.
 * @returns row id of the outbox message, whose state says what became of it
 */
export async function queueMail(kind: MailKind, payload: Record<string, unknown>, at = new Date()): Promise<number> {
  const messageId = `<${newPublicId()}@${new URL(env().APP_ORIGIN).hostname}>`;
  const row = await OutboxMessage.create({ kind, payload, availableAt: at, messageId });
  return row.id;
}
