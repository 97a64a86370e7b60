import { Op } from 'sequelize';
import { type LinkKind, oneTimeToken, oneTimeTokenHash } from '@/auth/oneTimeToken';
import { env } from '@/config/env';
import { Conflict } from '@/errors';
import { newPublicId } from '@/models/publicId';
import { OneTimeLink } from '@/models/oneTimeLink';
import type { Organisation } from '@/models/organisation';
import { currentTransaction } from '@/models/unitOfWork';
import { User } from '@/models/user';
import { queueMail } from './mailQueue';

/** How long each kind works. */
export const LINK_MS: Record<LinkKind, number> = { reset: 30 * 60_000, invitation: 7 * 24 * 3600_000 };

const PATHS: Record<LinkKind, string> = { reset: '/reset', invitation: '/invitation' };

const SPENT: Record<LinkKind, string> = {
  reset: 'This link was used, was replaced by a later one, or has run out. Ask for a new one.',
  invitation:
    'This link was used, was replaced by a later one, or has run out. Ask a manager of the lab for a new one.',
};

export type LinkOwner = User & { organisation: Organisation };
export type OwnedLink = OneTimeLink & { user: LinkOwner };

/** Neither used, ended nor run out at `now`. */
const open = (now: Date) => ({ usedAt: null, endedAt: null, expiresAt: { [Op.gt]: now } });

/** Ends every open link of a person: after a new password, and when they are disabled. Call inside a unit of work. */
export async function endLinks(userId: number, now: Date, kind?: LinkKind): Promise<void> {
  const where = { userId, usedAt: null, endedAt: null, ...(kind && { kind }) };
  await OneTimeLink.update({ endedAt: now }, { where });
}

/**
 * Ends the earlier links of this kind, makes a new one and asks for the e-mail that carries it; call inside a unit of
 * work. The e-mail's payload names the link, never its token.
 */
export async function sendLink(kind: LinkKind, userId: number, now: Date): Promise<OneTimeLink> {
  await endLinks(userId, now, kind);
  const publicId = newPublicId();
  const outboxId = await queueMail(kind === 'reset' ? 'mail-reset' : 'mail-invitation', { link: publicId }, now);
  return OneTimeLink.create({
    publicId,
    kind,
    userId,
    tokenHash: oneTimeTokenHash(oneTimeToken(kind, publicId)),
    outboxId,
    expiresAt: new Date(now.getTime() + LINK_MS[kind]),
    createdAt: now,
  });
}

/**
 * The link an e-mail is to carry, as an address: its token stands behind #, which browsers send to no server and in no
 * Referer. Call inside a unit of work.
 * @throws {Conflict} when there is nothing left to send: the link is spent, or SESSION_SECRET has changed since
 */
export async function linkToSend(
  kind: LinkKind,
  publicId: string,
  now: Date,
): Promise<{ link: OwnedLink; url: string }> {
  const link = await OneTimeLink.findOne({
    where: { kind, publicId, ...open(now) },
    include: [{ association: 'user', include: ['organisation'] }],
  });
  if (!link || (link as OwnedLink).user.disabledAt) {
    throw new Conflict('Not sent: the link was replaced, used or ended, or ran out before it could leave.');
  }
  const token = oneTimeToken(kind, publicId);
  if (link.tokenHash !== oneTimeTokenHash(token)) {
    throw new Conflict('Not sent: SESSION_SECRET has changed since this link was made. Make a new one.');
  }
  return { link: link as OwnedLink, url: `${env().APP_ORIGIN}${PATHS[kind]}#${token}` };
}

/** Whose link a token opens; call inside a unit of work. @throws {Conflict} when it opens nothing */
export async function ownerOfLink(kind: LinkKind, token: string, now: Date): Promise<OwnedLink> {
  const link = await OneTimeLink.findOne({
    where: { kind, tokenHash: oneTimeTokenHash(token), ...open(now) },
    include: [{ association: 'user', include: ['organisation'] }],
  });
  if (!link || (link as OwnedLink).user.disabledAt) throw new Conflict(SPENT[kind]);
  return link as OwnedLink;
}

/**
 * Marks a link as used, in the unit of work that does what it is for: of two at once one wins, because the UPDATE
 * itself asks whether it is still open. The person is locked, so that a disabling that commits meanwhile wins too.
 * @throws {Conflict} for the other
 */
export async function spendLink(kind: LinkKind, token: string, now: Date): Promise<LinkOwner> {
  const { id, user } = await ownerOfLink(kind, token, now);
  const owner = (await User.findByPk(user.id, {
    include: ['organisation'],
    lock: { level: currentTransaction().LOCK.UPDATE, of: User },
    rejectOnEmpty: true,
  })) as LinkOwner;
  const [used] = await OneTimeLink.update({ usedAt: now }, { where: { id, ...open(now) } });
  if (used !== 1 || owner.disabledAt) throw new Conflict(SPENT[kind]);
  return owner;
}
