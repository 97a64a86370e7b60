import { literal } from 'sequelize';
import { hashPassword, passwordIssues } from '@/auth/password';
import { resetKeys } from '@/auth/throttle';
import { Invalid } from '@/errors';
import type { Mail } from '@/mail/message';
import { resetMail } from '@/mail/resetMail';
import { unitOfWork } from '@/models/unitOfWork';
import { User } from '@/models/user';
import type { LinkKind } from '@/auth/oneTimeToken';
import type { LinkView } from '@/schemas/people';
import { recordChange } from './audit';
import { labSettings } from './lab';
import { endLinks, type LinkOwner, linkToSend, ownerOfLink, sendLink, spendLink } from './oneTimeLinks';
import { actorFrom } from './sessions';
import { countAttempt, forgetFailures } from './signInAttempts';
import { endSessionsOf } from './users';

/** Asking is answered after this long, whoever was asked for: many times what the work takes. */
export const ANSWER_MS = 500;

/**
 * Asks for a reset e-mail. Nothing in the answer or in its time says whether there is such a person: the throttle counts
 * every address alike, an e-mail is queued only for an enabled person, and the answer leaves at a fixed time.
 * @returns the person's public id for the security log, null when nobody was written to
 * @throws {Throttled} after too many requests for one e-mail or from one address
 */
export async function requestPasswordReset(email: string, address: string, now = new Date()): Promise<string | null> {
  const answerAt = performance.now() + ANSWER_MS;
  try {
    const typed = email.trim().toLowerCase();
    await countAttempt(resetKeys(typed, address), now, 'request');
    return await unitOfWork(async () => {
      const found = await User.findOne({ where: { email: typed } });
      // The column's collation takes é for e; whoever is meant by another address is not this person.
      if (!found || found.email !== typed || found.disabledAt) return null;
      await sendLink('reset', found.id, now);
      return found.publicId;
    });
  } finally {
    await new Promise((resolve) => setTimeout(resolve, Math.max(0, answerAt - performance.now())));
  }
}

/** Writes the e-mail of a reset link. @throws {Conflict} when there is nothing left to send */
export async function composeResetMail(payload: Record<string, unknown>): Promise<Mail> {
  return unitOfWork(async () => {
    const { link, url } = await linkToSend('reset', String(payload.link), new Date());
    const { name: lab, zone } = await labSettings();
    const to = { name: link.user.name, address: link.user.email };
    return resetMail({ lab, zone, to, url, expiresAt: link.expiresAt });
  });
}

/** Whose link a token is, for the page that asks for the password. @throws {Conflict} when it opens nothing */
export async function readLink(kind: LinkKind, token: string): Promise<LinkView> {
  return unitOfWork(async () => {
    const { user, expiresAt } = await ownerOfLink(kind, token, new Date());
    const { name, email, role, organisation } = user;
    return { name, email, role, organisation: organisation.name, expiresAt: expiresAt.toISOString() };
  });
}

/**
 * Sets the password a link allows to set, in one transaction with the link's end: the person's other links and sessions
 * end with it, and what strangers failed at the account is forgotten. `andThen` runs in the same transaction.
 * @throws {Conflict} for a spent link, {Invalid} for a password that may not be used; the link then still works
 */
export async function setPasswordByLink<T>(
  kind: LinkKind,
  token: string,
  password: string,
  andThen: (owner: LinkOwner, now: Date) => Promise<T>,
): Promise<T> {
  const { user } = await unitOfWork(() => ownerOfLink(kind, token, new Date()));
  const issues = passwordIssues(password, user.email);
  if (issues.length) throw new Invalid(issues);
  // Hashing takes a third of a second: never inside a transaction.
  const passwordHash = await hashPassword(password);
  return unitOfWork(async () => {
    const now = new Date();
    const owner = await spendLink(kind, token, now);
    await User.update({ passwordHash, version: literal('version + 1') }, { where: { id: owner.id } });
    await endLinks(owner.id, now);
    const sessionsEnded = await endSessionsOf(owner.id, now);
    await forgetFailures(owner.email);
    recordChange(actorFrom(owner, { kind: 'session', sessionId: 0, assuranceLevel: 1 }), {
      scope: 'lab',
      action: kind === 'reset' ? 'password set by e-mailed link' : 'invitation accepted',
      subjectType: 'user',
      subjectId: owner.publicId,
      before: null,
      after: { sessionsEnded },
    });
    return andThen(owner, now);
  });
}

/** Sets a new password with a reset link; the person then signs in with it. @returns their public id, for the log */
export async function resetPassword(token: string, password: string): Promise<string> {
  return setPasswordByLink('reset', token, password, async (owner) => owner.publicId);
}
