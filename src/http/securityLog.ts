/** One JSON line on standard output per event that matters to whoever watches the lab's server. Never a secret in it. */
export interface SecurityEvent {
  event:
    | 'reset-asked'
    | 'password-set'
    | 'sign-in'
    | 'sign-in-refused'
    | 'sign-out'
    | 'denied'
    | 'throttled'
    | 'error'
    | 'token-refused';
  userId?: string | null;
  operation?: string;
  address?: string;
  status?: number;
  detail?: string;
}

export function securityLog(entry: SecurityEvent): void {
  if (process.env.NODE_ENV === 'test' && !process.env.STILLFIELD_LOG) return;
  process.stdout.write(`${JSON.stringify({ at: new Date().toISOString(), log: 'security', ...entry })}\n`);
}
