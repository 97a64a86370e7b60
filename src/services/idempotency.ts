import { createHash } from 'node:crypto';
import type { Actor } from '@/auth/actor';
import { Conflict } from '@/errors';
import { isGone } from '@/models/databaseGone';
import { IdempotencyKey } from '@/models/idempotencyKey';
import { unitOfWork } from '@/models/unitOfWork';

const KEPT_MS = 24 * 3600 * 1000;

/** Work that comes before the unit in small transactions of its own, and what undoes it when the unit fails. */
export interface Stage<S> {
  prepare: () => Promise<S>;
  drop: (prepared: S) => Promise<void>;
}

/** `work` on what was prepared; what it does not take over is dropped. What fails is said, not that dropping failed. */
export async function staged<S, T>({ prepare, drop }: Stage<S>, work: (prepared: S) => Promise<T>): Promise<T> {
  const prepared = await prepare();
  try {
    return await work(prepared);
  } catch (error) {
    await drop(prepared).catch(() => undefined);
    throw error;
  }
}

/**
 * Does `work` once for a key of this user and stores its reply in the same transaction. A repeat answers the stored
 * reply; the same key with another request is a Conflict. Two at once: one works, the other answers what it stored
 * and drops what it had prepared.
 */
export async function once<S, T>(
  actor: Actor,
  key: string,
  operationId: string,
  request: unknown,
  status: number,
  stage: Stage<S>,
  work: (prepared: S) => Promise<T>,
): Promise<{ reply: T; repeated: boolean }> {
  const requestHash = createHash('sha256')
    .update(operationId)
    .update('\n')
    .update(JSON.stringify(request ?? null))
    .digest('hex');
  const stored = () => recall<T>(actor, key, requestHash);
  const earlier = await stored();
  if (earlier) return earlier;
  try {
    return await staged(stage, (prepared) =>
      unitOfWork(async () => {
        const reply = await work(prepared);
        await IdempotencyKey.create({
          userId: actor.userId,
          key,
          operation: operationId,
          requestHash,
          status,
          reply: JSON.stringify(reply ?? null),
          expiresAt: new Date(Date.now() + KEPT_MS),
        });
        return { reply, repeated: false };
      }),
    );
  } catch (error) {
    // A database that is gone cannot tell who won; what happened first is what is said.
    const winner = await stored().catch((later: unknown) => {
      if (isGone(later)) throw error;
      throw later;
    });
    if (winner) return winner;
    throw error;
  }
}

async function recall<T>(actor: Actor, key: string, requestHash: string): Promise<{ reply: T; repeated: true } | null> {
  const row = await unitOfWork(() => IdempotencyKey.findOne({ where: { userId: actor.userId, key } }));
  if (!row) return null;
  if (row.requestHash !== requestHash) {
    throw new Conflict('This Idempotency-Key was used for another request. Send a new key with a new request.');
  }
  return { reply: JSON.parse(row.reply) as T, repeated: true };
}
