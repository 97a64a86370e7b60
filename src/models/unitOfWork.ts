import type { Transaction } from 'sequelize';
import { database, unitScope } from './database';
import { asGone } from './databaseGone';

/** Deadlock, lock wait, record changed since last read, node not ready: the whole unit may be tried again. */
const RETRIED = new Set([1213, 1205, 1020, 1047]);
const TRIES = 5;

function errno(error: unknown): number | undefined {
  const e = error as { original?: { errno?: number }; parent?: { errno?: number }; errno?: number };
  return e?.original?.errno ?? e?.parent?.errno ?? e?.errno;
}

/**
 * Runs `work` in one READ COMMITTED transaction and commits it; on a lost race the whole of it runs again, up to five
 * times, so `work` keeps nothing outside the database between tries. Inside another unit it joins that one.
 * `beforeCommit` hooks registered with `lastly` run at the end, in the order of their sort keys.
 * @throws {DatabaseGone} when the database does not answer
 */
export async function unitOfWork<T>(work: () => Promise<T>): Promise<T> {
  if (unitScope()?.get('transaction')) return work();
  for (let attempt = 1; ; attempt++) {
    let committing = false;
    try {
      return await database().transaction(async () => {
        const result = await work();
        await runLast();
        committing = true;
        return result;
      });
    } catch (error) {
      if (attempt >= TRIES || !RETRIED.has(errno(error) ?? 0)) throw asGone(error, committing);
      await new Promise((resolve) => setTimeout(resolve, 10 * 2 ** attempt * (0.5 + Math.random())));
    }
  }
}

interface Last {
  key: string;
  run: () => Promise<void>;
}

/** Registers work for the end of the current unit: locks that everybody wants are taken last, in sorted order. */
export function lastly(key: string, run: () => Promise<void>): void {
  const scope = unitScope();
  if (!scope) throw new Error('lastly() was called outside a unit of work');
  const list = (scope.get('lastly') as Last[] | undefined) ?? [];
  list.push({ key, run });
  scope.set('lastly', list);
}

async function runLast(): Promise<void> {
  const list = (unitScope()?.get('lastly') as Last[] | undefined) ?? [];
  unitScope()?.set('lastly', []);
  list.sort((a, b) => (a.key < b.key ? -1 : a.key > b.key ? 1 : 0));
  for (const { run } of list) await run();
}

/** The current transaction, for the rare call that needs a lock mode. */
export function currentTransaction(): Transaction {
  const transaction = unitScope()?.get('transaction');
  if (!transaction) throw new Error('There is no unit of work here');
  return transaction as Transaction;
}
