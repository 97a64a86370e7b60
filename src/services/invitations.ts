import { sessionCookie } from '@/auth/session';
import type { Actor } from '@/auth/actor';
import { invitationMail } from '@/mail/invitationMail';
import type { Mail } from '@/mail/message';
import { unitOfWork } from '@/models/unitOfWork';
import { labSettings } from './lab';
import { linkToSend } from './oneTimeLinks';
import { setPasswordByLink } from './passwordReset';
import { openSession } from './sessions';

/** Writes the e-mail of an invitation. @throws {Conflict} when there is nothing left to send */
export async function composeInvitationMail(payload: Record<string, unknown>): Promise<Mail> {
  return unitOfWork(async () => {
    const { link, url } = await linkToSend('invitation', String(payload.link), new Date());
    const { name, email, role, organisation } = link.user;
    const { name: lab, zone } = await labSettings();
    const to = { name, address: email };
    return invitationMail({ lab, zone, to, url, expiresAt: link.expiresAt, role, organisation: organisation.name });
  });
}

/**
 * Sets the first password with an invitation and opens a session. `cookie` is a Set-Cookie value.
 * @throws {Conflict} for a spent link, {Invalid} for a password that may not be used
 */
export async function acceptInvitation(
  { token, password }: { token: string; password: string },
  from: { address: string; agent: string },
): Promise<{ actor: Actor; cookie: string }> {
  const opened = await setPasswordByLink('invitation', token, password, (owner, now) => openSession(owner, from, now));
  return { actor: opened.actor, cookie: await sessionCookie(opened.token) };
}
