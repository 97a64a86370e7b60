import { dayOf, formatDay, formatTime } from '@/format/dates';
import type { MailState } from '@/schemas/mailState';
import type { Verdict } from '../worstRun';

/** The same three positions as a verdict: arrived hangs under the line, waiting lies across it, refused stands above. */
export const MAIL_POSITIONS: Record<MailState['state'], Verdict> = {
  queued: 'inconclusive',
  sending: 'inconclusive',
  sent: 'under',
  refused: 'over',
};

/** `sent 14:02`, with its day unless that is `today`; `refused: ` and the mail server's own words. */
export function mailWords(mail: MailState | null, zone: string, now = new Date()): string {
  if (!mail) return 'no longer known';
  const { state, attempts, doneAt, reason } = mail;
  if (state === 'sent' && doneAt) {
    const day = dayOf(doneAt, zone) === dayOf(now, zone) ? '' : `${formatDay(doneAt, zone)}, `;
    return `sent ${day}${formatTime(doneAt, zone)}`;
  }
  if (state === 'refused') return `refused: ${reason ?? 'the mail server said no more'}`;
  if (state === 'queued' && reason) return `queued, tried ${attempts === 1 ? 'once' : `${attempts} times`}: ${reason}`;
  return state;
}
