import { formatDayTime } from './dates';

interface Stands {
  state: 'queued' | 'sending' | 'sent' | 'refused';
  attempts: number;
  doneAt: string | null;
  nextTryAt: string | null;
  reason: string | null;
}

const tries = (count: number) => (count === 1 ? 'tried once' : `tried ${count} times`);

/** What became of an e-mail, as a phrase: `sent 3 Dec 2026 14:02`, `refused: 550 no such mailbox`. */
export function mailStateWords({ state, attempts, doneAt, nextTryAt, reason }: Stands, zone: string): string {
  const when = (instant: string | null) => (instant ? ` ${formatDayTime(instant, zone)}` : '');
  if (state === 'sent') return `sent${when(doneAt)}`;
  if (state === 'refused') return `refused${when(doneAt)}${reason ? `: ${reason}` : ''}`;
  if (state === 'sending') return attempts > 1 ? `sending, ${tries(attempts - 1)} before` : 'sending';
  if (!reason) return 'queued';
  const tried = attempts > 0 ? `, ${tries(attempts)}, next try${when(nextTryAt)}` : '';
  return `queued${tried}: ${reason}`;
}
