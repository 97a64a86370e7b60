import { QueryTypes } from 'sequelize';
import { database } from '@/models/database';
import { unitOfWork } from '@/models/unitOfWork';

/** A message this process holds: nobody else takes it before `LEASE_SECONDS` have passed on the database's clock. */
export interface LeasedMessage {
  id: string;
  kind: string;
  payload: Record<string, unknown>;
  /** counts this attempt, from 1 */
  attempts: number;
  /** stable over all attempts, so that a mail sent twice can be recognised */
  messageId: string | null;
}

export const LEASE_SECONDS = 120;
const LONGEST_DELAY_SECONDS = 3600;
/** How long a message waits for something that is missing. */
const WAIT_SECONDS = 60;
/** With the delays below this is about a day of trying. */
export const LARGEST_ATTEMPTS = 30;

/** Seconds until the next attempt: 5, 10, 20 … one hour. */
export function delaySeconds(attempts: number): number {
  return Math.min(5 * 2 ** (attempts - 1), LONGEST_DELAY_SECONDS);
}

/**
 * Takes one message that is due, or one whose lease has run out because its holder died. The conditional UPDATE decides
 * alone; its times are the database's. Null when nothing is due or another process was faster.
 */
export async function leaseNext(owner: string): Promise<LeasedMessage | null> {
  return unitOfWork(async () => {
    const sequelize = database();
    const due = `((state = 'queued' AND available_at <= UTC_TIMESTAMP(3))
      OR (state = 'sending' AND leased_until < UTC_TIMESTAMP(3)))`;
    const [candidate] = await sequelize.query<{ id: string }>(
      `SELECT id FROM outbox WHERE ${due} ORDER BY available_at, id LIMIT 1`,
      { type: QueryTypes.SELECT },
    );
    if (!candidate) return null;
    const [, taken] = await sequelize.query(
      `UPDATE outbox SET state = 'sending', lease_owner = :owner, attempts = attempts + 1,
        leased_until = UTC_TIMESTAMP(3) + INTERVAL ${LEASE_SECONDS} SECOND WHERE id = :id AND ${due}`,
      { replacements: { owner, id: candidate.id }, type: QueryTypes.UPDATE },
    );
    if (taken !== 1) return null;
    const [row] = await sequelize.query<{
      id: string;
      kind: string;
      payload: string | Record<string, unknown>;
      attempts: number;
      messageId: string | null;
    }>('SELECT id, kind, payload, attempts, message_id AS messageId FROM outbox WHERE id = :id', {
      replacements: { id: candidate.id },
      type: QueryTypes.SELECT,
    });
    if (!row) return null;
    const payload =
      typeof row.payload === 'string' ? (JSON.parse(row.payload) as Record<string, unknown>) : row.payload;
    return { ...row, id: String(row.id), payload };
  });
}

/** Runs an UPDATE that only the holder of the lease may make; false when the lease has gone to somebody else. */
async function settle(message: LeasedMessage, owner: string, set: string, values: object): Promise<boolean> {
  return unitOfWork(async () => {
    const [, changed] = await database().query(
      `UPDATE outbox SET ${set}, leased_until = NULL, lease_owner = NULL
        WHERE id = :id AND state = 'sending' AND lease_owner = :owner`,
      { replacements: { id: message.id, owner, ...values }, type: QueryTypes.UPDATE },
    );
    return changed === 1;
  });
}

/** The effect has happened. */
export function markSent(message: LeasedMessage, owner: string): Promise<boolean> {
  return settle(message, owner, "state = 'sent', done_at = UTC_TIMESTAMP(3), last_error = NULL", {});
}

/** What the effect needs is not there yet: the message waits a minute, and the try does not count. */
export function markWaiting(message: LeasedMessage, owner: string, reason: string): Promise<boolean> {
  const set = `state = 'queued', last_error = :lastError, attempts = GREATEST(attempts, 1) - 1,
    available_at = UTC_TIMESTAMP(3) + INTERVAL ${WAIT_SECONDS} SECOND`;
  return settle(message, owner, set, { lastError: reason.slice(0, 500) });
}

/** The effect did not happen: tried again later, or given up with the reason kept. */
export function markFailed(message: LeasedMessage, owner: string, reason: string, final: boolean): Promise<boolean> {
  const lastError = reason.slice(0, 500);
  if (final || message.attempts >= LARGEST_ATTEMPTS) {
    return settle(message, owner, "state = 'refused', done_at = UTC_TIMESTAMP(3), last_error = :lastError", {
      lastError,
    });
  }
  const set = `state = 'queued', last_error = :lastError, available_at = UTC_TIMESTAMP(3) + INTERVAL :delay SECOND`;
  return settle(message, owner, set, { lastError, delay: delaySeconds(message.attempts) });
}
