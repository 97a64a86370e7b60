import { createHash, randomBytes } from 'node:crypto';
import { Op } from 'sequelize';
import type { TokenScope } from '@/auth/permissions';
import { Conflict, Invalid, type Issue, NotFound, Unauthenticated } from '@/errors';
import { ApiToken } from '@/models/apiToken';
import { newPublicId } from '@/models/publicId';
import { unitOfWork } from '@/models/unitOfWork';
import { type User } from '@/models/user';
import { recordChange } from './audit';
import { findUser } from './users';

const SCOPES: readonly TokenScope[] = ['read', 'upload'];
const ALPHABET = '0123456789ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz';
const SHAPE = /^sfd_[0-9A-Za-z]{40}$/;
/** `last_used_at` is written at most this often. */
const TOUCH_MS = 60_000;
const DAY_MS = 24 * 3600 * 1000;

/** A bearer token that is unknown, revoked, run out, or whose owner is disabled: which of these is not told. */
export class TokenRefused extends Unauthenticated {
  constructor() {
    super('This token does not hold here. Ask the lab for a new one.');
  }
}

/** What follows `Bearer` in an Authorization header; null when the header is absent or of another scheme. */
export function bearerToken(authorization: string | null): string | null {
  const match = /^bearer\b(.*)$/is.exec(authorization?.trim() ?? '');
  return match ? match[1]!.trim() : null;
}

function hashOf(token: string): string {
  return createHash('sha256').update(token).digest('hex');
}

/** `sfd_` and 40 characters of base 62, about 238 random bits; bytes that would bias them are dropped. */
function newToken(): string {
  let token = 'sfd_';
  while (token.length < 44) {
    for (const byte of randomBytes(48)) if (byte < 248 && token.length < 44) token += ALPHABET[byte % 62];
  }
  return token;
}

/**
 * Issues a token to a person, named by public id or e-mail. The answer holds the only copy of it: the table has its
 * hash. Runs for whoever may run commands on the lab's server; there is no operation for it.
 * @throws {NotFound} for an unknown person, {Conflict} for a disabled one, {Invalid} for a name or scope that is none
 */
export async function issueToken(
  userPublicIdOrEmail: string,
  name: string,
  scopes: readonly string[],
  expiresInDays: number | null = null,
): Promise<{ id: string; token: string; expiresAt: Date | null }> {
  const issues: Issue[] = [];
  const wanted = SCOPES.filter((scope) => scopes.includes(scope));
  if (!/^\S(.{0,78}\S)?$/u.test(name)) issues.push({ pointer: '/name', message: 'takes 1 to 80 characters' });
  if (wanted.length === 0 || wanted.length !== new Set(scopes).size) {
    issues.push({ pointer: '/scopes', message: `are one or more of ${SCOPES.join(', ')}` });
  }
  if (expiresInDays !== null && !(Number.isInteger(expiresInDays) && expiresInDays >= 1 && expiresInDays <= 3650)) {
    issues.push({ pointer: '/days', message: 'is a whole number from 1 to 3650' });
  }
  if (issues.length) throw new Invalid(issues);
  const token = newToken();
  const expiresAt = expiresInDays === null ? null : new Date(Date.now() + expiresInDays * DAY_MS);
  return unitOfWork(async () => {
    const user = await findUser(userPublicIdOrEmail);
    if (user.disabledAt) throw new Conflict('This person is disabled; a token would open nothing.');
    const row = await ApiToken.create({
      publicId: newPublicId(),
      userId: user.id,
      name,
      tokenHash: hashOf(token),
      scopes: wanted,
      expiresAt,
    });
    recordChange(null, {
      scope: 'lab',
      action: 'token issued',
      subjectType: 'token',
      subjectId: row.publicId,
      before: null,
      after: { user: user.publicId, name, scopes: wanted, expiresAt },
    });
    return { id: row.publicId, token, expiresAt };
  });
}

/** Takes a token back; from then on it opens nothing. Repeating is harmless. @throws {NotFound} */
export async function revokeToken(publicId: string): Promise<void> {
  await unitOfWork(async () => {
    const row = await ApiToken.findOne({ where: { publicId } });
    if (!row) throw new NotFound('token');
    const [revoked] = await ApiToken.update({ revokedAt: new Date() }, { where: { id: row.id, revokedAt: null } });
    if (revoked === 0) return;
    recordChange(null, {
      scope: 'lab',
      action: 'token revoked',
      subjectType: 'token',
      subjectId: publicId,
      before: { revoked: false },
      after: { revoked: true },
    });
  });
}

/** The owner and scopes of a token, with the owner's organisation read along. @throws {TokenRefused} */
export async function ownerOfToken(token: string): Promise<{ user: User; scopes: readonly TokenScope[] }> {
  if (!SHAPE.test(token)) throw new TokenRefused();
  const now = new Date();
  return unitOfWork(async () => {
    const row = await ApiToken.findOne({
      where: {
        tokenHash: hashOf(token),
        revokedAt: null,
        expiresAt: { [Op.or]: [{ [Op.is]: null }, { [Op.gt]: now }] },
      },
      include: [{ association: 'user', include: ['organisation'] }],
    });
    const user = (row as (ApiToken & { user: User }) | null)?.user;
    if (!row || !user || user.disabledAt) throw new TokenRefused();
    const touchBefore = new Date(now.getTime() - TOUCH_MS);
    if (!row.lastUsedAt || row.lastUsedAt <= touchBefore) {
      await ApiToken.update({ lastUsedAt: now }, { where: { id: row.id } });
    }
    return { user, scopes: row.scopes };
  });
}
