import { createHash, randomBytes } from 'node:crypto';
import { sealData, unsealData } from 'iron-session';
import { env } from '@/config/env';

/** A session dies this long after its last request … */
export const IDLE_MS = 12 * 3600 * 1000;
/** … and at the latest this long after signing in. */
export const ABSOLUTE_MS = 7 * 24 * 3600 * 1000;

const TOKEN = /^[A-Za-z0-9_-]{43}$/;

/** A new opaque session token: 32 random bytes as base64url. Only its hash is stored. */
export function newSessionToken(): string {
  return randomBytes(32).toString('base64url');
}

/** What the sessions table holds of a token: SHA-256 in hex. The token is random, so no salt is needed. */
export function sessionTokenHash(token: string): string {
  return createHash('sha256').update(token).digest('hex');
}

function secure(): boolean {
  return env().APP_ORIGIN.startsWith('https:');
}

/** Under TLS the `__Host-` prefix makes browsers refuse the cookie from a subdomain, another path or plain HTTP. */
export function sessionCookieName(): string {
  return secure() ? '__Host-stillfield' : 'stillfield';
}

function cookie(value: string, maxAgeS: number): string {
  const flags = ['Path=/', `Max-Age=${maxAgeS}`, 'HttpOnly', 'SameSite=Lax', ...(secure() ? ['Secure'] : [])];
  return `${sessionCookieName()}=${value}; ${flags.join('; ')}`;
}

/** The Set-Cookie value for a token, sealed (encrypted and authenticated) with SESSION_SECRET. */
export async function sessionCookie(token: string): Promise<string> {
  const maxAgeS = ABSOLUTE_MS / 1000;
  return cookie(await sealData({ token }, { password: env().SESSION_SECRET, ttl: maxAgeS }), maxAgeS);
}

/** The Set-Cookie value that removes the session cookie. */
export function clearedCookie(): string {
  return cookie('', 0);
}

/**
 * The session token in a Cookie header; null when there is none, or it was not sealed by this lab, or its seal has
 * run out. Whether the session still stands is for the sessions table to say.
 */
export async function readSessionCookie(cookieHeader: string | null): Promise<string | null> {
  const prefix = `${sessionCookieName()}=`;
  const pair = (cookieHeader ?? '').split(';').find((part) => part.trim().startsWith(prefix));
  const sealed = pair?.trim().slice(prefix.length);
  if (!sealed || sealed.length > 2000) return null;
  try {
    const { token } = await unsealData<{ token?: unknown }>(sealed, {
      password: env().SESSION_SECRET,
      ttl: ABSOLUTE_MS / 1000,
    });
    return typeof token === 'string' && TOKEN.test(token) ? token : null;
  } catch {
    // What a stranger made up instead of a seal.
    return null;
  }
}
