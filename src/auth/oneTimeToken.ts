import { createHash, createHmac } from 'node:crypto';
import { env } from '@/config/env';

/** What a link that works once is for; part of what its token is made from. */
export type LinkKind = 'reset' | 'invitation';

const LABEL = 'stillfield one-time link 1';

/**
 * The token of a link: HMAC-SHA-256 of its kind and public id under SESSION_SECRET, as 43 base64url characters. It is
 * made again for each try to send it, so that no table, queue or log ever holds it; the links table keeps its hash.
 */
export function oneTimeToken(kind: LinkKind, publicId: string): string {
  return createHmac('sha256', env().SESSION_SECRET).update(`${LABEL}\n${kind}\n${publicId}`).digest('base64url');
}

/** What the links table holds of a token: SHA-256 in hex. The token cannot be guessed, so no salt is needed. */
export function oneTimeTokenHash(token: string): string {
  return createHash('sha256').update(token).digest('hex');
}
