import { QueryTypes } from 'sequelize';
import { database } from '@/models/database';
import { unitOfWork } from '@/models/unitOfWork';

/** Tables whose rows are worthless once `expires_at` has passed, and how many days they are kept after it. */
const EXPIRING = {
  sessions: 0,
  uploads: 0,
  idempotency_keys: 0,
  caught_mails: 0,
  // the people sheet shows for a while what became of an invitation
  one_time_links: 90,
} as const;
const ROWS_AT_ONCE = 200;
/** A held file goes with its parts, up to 100 MB of them. */
const FILES_AT_ONCE = 5;

/**
 * Deletes expired rows in small transactions, so that no request waits for a long one.
 * @returns rows deleted per table
 */
export async function purgeExpired(): Promise<Record<keyof typeof EXPIRING, number>> {
  const purged = { sessions: 0, uploads: 0, idempotency_keys: 0, caught_mails: 0, one_time_links: 0 };
  for (const [table, days] of Object.entries(EXPIRING) as [keyof typeof EXPIRING, number][]) {
    const past = `expires_at < UTC_TIMESTAMP(3) - INTERVAL ${days} DAY`;
    const atOnce = table === 'uploads' ? FILES_AT_ONCE : ROWS_AT_ONCE;
    for (let gone = atOnce; gone === atOnce; purged[table] += gone) {
      gone = await unitOfWork(() =>
        database().query(`DELETE FROM ${table} WHERE ${past} LIMIT ${atOnce}`, {
          type: QueryTypes.BULKDELETE,
        }),
      );
    }
  }
  return purged;
}

/**
 * Keeps one housekeeping message in the queue, due at the next full hour. Its message id is that hour; the row is
 * written only when no row of that hour exists, and running twice would delete nothing twice.
 */
export async function scheduleHousekeeping(): Promise<void> {
  await unitOfWork(() =>
    database().query(
      `INSERT INTO outbox (kind, payload, state, available_at, attempts, message_id, created_at)
        SELECT 'housekeeping', '{}', 'queued', due.at, 0, due.name, UTC_TIMESTAMP(3)
        FROM (SELECT hour.at, CONCAT('housekeeping-', DATE_FORMAT(hour.at, '%Y%m%d%H')) AS name
          FROM (SELECT DATE_FORMAT(UTC_TIMESTAMP() + INTERVAL 1 HOUR, '%Y-%m-%d %H:00:00') AS at) AS hour) AS due
        WHERE NOT EXISTS (SELECT 1 FROM outbox WHERE kind = 'housekeeping' AND state IN ('queued', 'sending'))`,
      { type: QueryTypes.RAW },
    ),
  );
}
