import { createHmac } from 'node:crypto';
import type { Issue } from '@/errors';
import { isCommonPassword } from './commonPasswords';
import { runBcrypt } from './passwordWorker';

/** bcrypt's cost: 2^12 rounds, about 0.3 s of one core. */
export const COST = 12;
export const MIN_LENGTH = 12;
export const MAX_LENGTH = 1000;

/** Scheme 1: bcrypt of base64(HMAC-SHA-384(label, NFKC(password))). */
const SCHEME = 's1$';
const LABEL = 'stillfield password s1';

/** A hash of a random password nobody kept: what a sign-in with an unknown e-mail is checked against. */
const NOBODY = 's1$$2b$12$AHo/fbhECB2cdJtfB6FQSeSFSKya2Q722zQ0C5eSWcHRIvSm.Xs0W';

/**
 * What bcrypt is given in place of the password: 64 base64 characters whatever its length, because bcrypt reads 72
 * bytes and stops at a NUL. NFKC first (NIST SP 800-63B 5.1.1.2, from memory), so that é typed in two ways is one
 * password. The label is no secret; it keeps these digests apart from plain SHA-384 lists.
 */
export function bcryptInput(password: string): string {
  return createHmac('sha384', LABEL).update(password.normalize('NFKC'), 'utf8').digest('base64');
}

/** The string to store for a new password. @throws {Throttled} when too many are waiting */
export async function hashPassword(password: string): Promise<string> {
  return SCHEME + String(await runBcrypt({ hash: bcryptInput(password), cost: COST }));
}

/**
 * Checks a password against what is stored; with null (no such person, or no password yet) it takes as long and says
 * no. `needsRehash`: it is right, but was stored at another cost than today's.
 * @throws {Throttled} when too many are waiting
 */
export async function verifyPassword(
  password: string,
  stored: string | null,
): Promise<{ ok: boolean; needsRehash: boolean }> {
  const known = stored?.startsWith(SCHEME) ? stored : null;
  const bcrypt = (known ?? NOBODY).slice(SCHEME.length);
  const right = (await runBcrypt({ verify: bcryptInput(password), against: bcrypt })) === true;
  const ok = right && known !== null;
  return { ok, needsRehash: ok && Number(/^\$2[aby]\$(\d\d)\$/.exec(bcrypt)?.[1]) !== COST };
}

/** What is wrong with a new password, each as an issue at `/password`; empty when it may be used. */
export function passwordIssues(password: string, email: string): Issue[] {
  const text = password.normalize('NFKC');
  const length = [...text].length;
  const refuse = (message: string): Issue[] => [{ pointer: '/password', message }];
  if (length < MIN_LENGTH) return refuse(`takes at least ${MIN_LENGTH} characters; several words are easiest`);
  if (length > MAX_LENGTH) return refuse(`takes at most ${MAX_LENGTH} characters`);
  if (isCommonPassword(text))
    return refuse('is among the passwords that are guessed first; use several unrelated words');
  const letters = (value: string) => value.toLowerCase().replace(/[^\p{L}\p{N}]/gu, '');
  const local = letters(email.normalize('NFKC').split('@')[0] ?? '');
  if (local.length >= 3 && letters(text).includes(local)) return refuse('contains the name in the e-mail address');
  return [];
}
