import { createHash } from 'node:crypto';

/**
 * How often one may fail. The first `free` failures cost nothing, each further one doubles the wait up to CAP_S, and
 * one failure is forgotten for every `leakS` seconds without another, so that nobody is shut out for ever.
 */
export interface ThrottleRule {
  free: number;
  leakS: number;
}

export interface ThrottleState {
  failures: number;
  lastFailureAt: Date;
  blockedUntil: Date | null;
}

export type ThrottleKind = 'pair' | 'familiar' | 'account' | 'address' | 'reset-account' | 'reset-address';

/** The longest wait, in seconds. */
export const CAP_S = 15 * 60;

/** Chosen here, not taken from a standard: after the free tries a stranger gets about four guesses an hour. */
export const RULES: Record<ThrottleKind, ThrottleRule> = {
  // One account from one address.
  pair: { free: 5, leakS: CAP_S },
  // The same from an address where this person has signed in before: nobody elsewhere can use these tries up.
  familiar: { free: 8, leakS: CAP_S },
  // One account from all unfamiliar addresses together.
  account: { free: 20, leakS: CAP_S },
  // One address for all accounts together; a whole lab may share it.
  address: { free: 40, leakS: 120 },
  // Reset e-mails asked for one account, by whomever: its mailbox is not to be flooded.
  'reset-account': { free: 3, leakS: CAP_S },
  // Reset e-mails asked for from one address, for whatever account; a whole lab may share it.
  'reset-address': { free: 20, leakS: 120 },
};

/** The row of a throttle: a hash, so that the table tells nobody who failed from where. */
export function throttleKey(kind: ThrottleKind, ...parts: string[]): string {
  return createHash('sha256')
    .update(JSON.stringify([kind, ...parts]))
    .digest('hex');
}

/** An address stays familiar to an account for so long after a sign-in or a failed one. */
export const FAMILIAR_MS = 30 * 24 * 3600 * 1000;

/**
 * The keys of one attempt, each with its rule. A familiar address (this person has signed in from there) is counted
 * apart from strangers, so failures elsewhere never keep the owner out.
 */
export function throttleKeys(
  email: string,
  address: string,
  familiar: boolean,
): { kind: ThrottleKind; key: string; rule: ThrottleRule }[] {
  const one = (kind: ThrottleKind, ...parts: string[]) => ({
    kind,
    key: throttleKey(kind, ...parts),
    rule: RULES[kind],
  });
  if (familiar) return [one('familiar', email, address), one('address', address)];
  return [one('pair', email, address), one('account', email), one('address', address)];
}

/** The keys of one request for a reset e-mail. */
export function resetKeys(email: string, address: string): { kind: ThrottleKind; key: string; rule: ThrottleRule }[] {
  const one = (kind: ThrottleKind, part: string) => ({ kind, key: throttleKey(kind, part), rule: RULES[kind] });
  return [one('reset-account', email), one('reset-address', address)];
}

/** How long the failure number `failures` blocks, in seconds: 0 while free, then 1, 2, 4 … up to CAP_S. */
export function waitAfter(failures: number, rule: ThrottleRule): number {
  if (failures <= rule.free) return 0;
  return Math.min(CAP_S, 2 ** Math.min(30, failures - rule.free - 1));
}

/** Failures that are not yet forgotten at `now`. */
export function remembered(state: ThrottleState, rule: ThrottleRule, now: Date): number {
  const sinceS = Math.max(0, now.getTime() - state.lastFailureAt.getTime()) / 1000;
  return Math.max(0, state.failures - Math.floor(sinceS / rule.leakS));
}

/** Seconds until the next attempt is let in; 0 when it may come now. Never more than CAP_S, even if a clock jumped. */
export function secondsBlocked(state: ThrottleState, now: Date): number {
  if (!state.blockedUntil) return 0;
  return Math.min(CAP_S, Math.max(0, (state.blockedUntil.getTime() - now.getTime()) / 1000));
}

/** The state after one more failure at `now`. */
export function withFailure(state: ThrottleState, rule: ThrottleRule, now: Date): ThrottleState {
  const failures = remembered(state, rule, now) + 1;
  const waitS = waitAfter(failures, rule);
  return { failures, lastFailureAt: now, blockedUntil: waitS > 0 ? new Date(now.getTime() + waitS * 1000) : null };
}
