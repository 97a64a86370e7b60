import { QueryTypes } from 'sequelize';
import type { Actor } from '@/auth/actor';
import { env } from '@/config/env';
import { Throttled } from '@/errors';
import { database } from '@/models/database';
import { newPublicId } from '@/models/publicId';
import { unitOfWork } from '@/models/unitOfWork';

/*
 * How much of the lab one person may take: so many imports at once, so much within an hour, so much held. All of it is
 * decided in the database on its clock, so that it holds across web processes; a turn is a row that is updated, which
 * is what a cluster certifies.
 */

/** A process that dies gives its turns back after this long; one that lives says so three times as often. */
const HELD_FOR_S = 60;
const RENEW_MS = 20_000;
/** Somebody who sends one file after another should not notice that the last reply was a moment ago. */
const PATIENCE_MS = 10_000;
const LOOK_AGAIN_MS = 200;
/** Held files beyond twice an hour's worth: the oldest go, at most this many with each new one. */
const LET_GO_AT_ONCE = 50;

const pause = (ms: number) => new Promise((resolve) => setTimeout(resolve, ms));

/** Runs `work` in one of the person's turns. @throws {Throttled} when none becomes free within a few seconds */
export async function inImportTurn<T>(actor: Actor, work: () => Promise<T>, patienceMs = PATIENCE_MS): Promise<T> {
  const turn = await takeImportTurn(actor, patienceMs);
  try {
    return await work();
  } finally {
    await turn.giveBack();
  }
}

export interface ImportTurn {
  giveBack(): Promise<void>;
}

/** A turn that is the caller's until it is given back. @throws {Throttled} */
export async function takeImportTurn({ userId }: Actor, patienceMs = PATIENCE_MS): Promise<ImportTurn> {
  const holder = newPublicId();
  const until = Date.now() + patienceMs;
  while (!(await unitOfWork(() => claim(userId, holder)))) {
    if (Date.now() >= until) {
      const most = env().IMPORTS_AT_ONCE;
      const are = most === 1 ? 'One file of yours is' : `${most} files of yours are`;
      throw new Throttled(5, `${are} being taken in at this moment. Send the next when one is done.`);
    }
    await pause(LOOK_AGAIN_MS);
  }
  const renewing = setInterval(() => void hold(holder, HELD_FOR_S).catch(() => undefined), RENEW_MS).unref();
  return {
    async giveBack() {
      clearInterval(renewing);
      // A turn that cannot be given back ends by itself.
      await hold(holder, 0).catch(() => undefined);
    },
  };

  function hold(mine: string, seconds: number): Promise<unknown> {
    return unitOfWork(() =>
      database().query(
        `UPDATE import_turns SET held_until = UTC_TIMESTAMP(3) + INTERVAL ? SECOND WHERE user_id = ? AND holder = ?`,
        { replacements: [seconds, userId, mine], type: QueryTypes.UPDATE },
      ),
    );
  }
}

async function claim(userId: number, holder: string): Promise<boolean> {
  for (let turn = 1; turn <= env().IMPORTS_AT_ONCE; turn++) {
    // `holder` is set first: MariaDB assigns from left to right, and what follows asks who it is now.
    await database().query(
      `INSERT INTO import_turns (user_id, turn, holder, held_until)
        VALUES (:userId, :turn, :holder, UTC_TIMESTAMP(3) + INTERVAL ${HELD_FOR_S} SECOND)
        ON DUPLICATE KEY UPDATE holder = IF(held_until <= UTC_TIMESTAMP(3), VALUES(holder), holder),
          held_until = IF(holder = VALUES(holder), VALUES(held_until), held_until)`,
      { replacements: { userId, turn, holder }, type: QueryTypes.INSERT },
    );
    const [row] = await database().query<{ holder: string }>(
      'SELECT holder FROM import_turns WHERE user_id = :userId AND turn = :turn',
      { replacements: { userId, turn }, type: QueryTypes.SELECT },
    );
    if (row?.holder === holder) return true;
  }
  return false;
}

/** @param bytes of the file that is about to come, as far as it says. @throws {Throttled} beyond an hour's worth */
export async function checkHour({ userId }: Actor, bytes: number): Promise<void> {
  const { IMPORT_FILES_PER_HOUR: mostFiles, IMPORT_MB_PER_HOUR: mostMb } = env();
  const [sent] = await unitOfWork(() =>
    database().query<{ files: number; bytes: string | number; eldestS: number | null }>(
      `SELECT COUNT(*) AS files, COALESCE(SUM(bytes), 0) AS bytes,
          TIMESTAMPDIFF(SECOND, MIN(created_at), UTC_TIMESTAMP()) AS eldestS
        FROM uploads WHERE user_id = ? AND created_at > UTC_TIMESTAMP(3) - INTERVAL 1 HOUR`,
      { replacements: [userId], type: QueryTypes.SELECT },
    ),
  );
  const { files, bytes: before, eldestS } = sent!;
  const overFiles = Number(files) >= mostFiles;
  if (!overFiles && Number(before) + bytes <= mostMb * 1e6) return;
  const what = overFiles ? `${mostFiles} files` : `${mostMb} MB`;
  const waitS = Math.max(10, 3600 - Number(eldestS ?? 0));
  throw new Throttled(
    waitS,
    `You sent ${what} within an hour, which is as much as the lab takes from one person. Send the rest in ${Math.ceil(waitS / 60)} min.`,
  );
}

/**
 * Lets the oldest held files of a person go that lie beyond twice an hour's worth; call it in the unit that holds
 * another. What was kept of them is kept.
 */
export async function letOldestGo(userId: number): Promise<void> {
  const { IMPORT_FILES_PER_HOUR: files, IMPORT_MB_PER_HOUR: mb } = env();
  const gone = await database().query<{ id: number }>(
    `SELECT id FROM (
        SELECT id, ROW_NUMBER() OVER newest AS place, SUM(bytes) OVER newest AS together FROM uploads
        WHERE user_id = :userId WINDOW newest AS (ORDER BY id DESC)) AS held
      WHERE place >= :files OR together > :bytes ORDER BY id LIMIT ${LET_GO_AT_ONCE}`,
    { replacements: { userId, files: 2 * files, bytes: 2e6 * mb }, type: QueryTypes.SELECT },
  );
  if (gone.length === 0) return;
  await database().query('DELETE FROM uploads WHERE id IN (:ids)', {
    replacements: { ids: gone.map(({ id }) => id) },
    type: QueryTypes.BULKDELETE,
  });
}
