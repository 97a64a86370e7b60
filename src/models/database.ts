import { AsyncLocalStorage } from 'node:async_hooks';
import { type Options, Sequelize } from 'sequelize';
import { connectionOptions } from '@/config/database';
import { env } from '@/config/env';
import { associate } from './associations';
import { defineModels } from './define';

type Scope = AsyncLocalStorage<Map<string, unknown>>;

/** One pool and one scope for the whole process: Next bundles pages and routes apart, each with its own copy of this file. */
const holder = globalThis as typeof globalThis & { stillfieldDatabase?: Sequelize; stillfieldScope?: Scope };

/** What one unit of work carries along: its transaction (for Sequelize) and what is written just before it commits. */
const scope: Scope = (holder.stillfieldScope ??= new AsyncLocalStorage());

/** Lets every query inside a unit of work find its transaction without passing it by hand. */
const namespace = {
  get: (key: string) => scope.getStore()?.get(key),
  set: (key: string, value: unknown) => scope.getStore()?.set(key, value),
  run: (work: () => unknown) => scope.run(new Map(), work),
  bind: <F>(work: F): F => work,
};

/** A person waits this long for a free connection, and no longer than that to hear that there is none. */
const ACQUIRE_MS = 10_000;
/** A database that is gone refuses at once; a busy process may need seconds to see that its connection stands. */
const CONNECT_MS = 8000;
/** A line that went without a word; longer than the 50 s a query may wait for a row lock. */
const SILENCE_MS = 90_000;
/** The pool looks for idle connections this often; one that died is found when it is taken as well. */
const EVICT_MS = 2000;

/** For processes that serve: they hear soon that the database is gone, and use no connection that died. */
function servingOptions(url: string): Options {
  const options = connectionOptions(url);
  return {
    ...options,
    pool: { ...options.pool, acquire: ACQUIRE_MS, evict: EVICT_MS },
    dialectOptions: { ...options.dialectOptions, connectTimeout: CONNECT_MS, socketTimeout: SILENCE_MS },
  };
}

let defined = false;

/** The one pool of this process; the models of this bundle are ready to use once it has been called. */
export function database(): Sequelize {
  if (!holder.stillfieldDatabase) {
    Sequelize.useCLS(namespace);
    const sequelize = new Sequelize(servingOptions(env().DATABASE_URL));
    sequelize.addHook('beforeQuery', (options: { transaction?: unknown }) => {
      if (!options.transaction) throw new Error('A query ran outside a unit of work');
    });
    holder.stillfieldDatabase = sequelize;
  }
  if (!defined) {
    defineModels(holder.stillfieldDatabase);
    associate();
    defined = true;
  }
  return holder.stillfieldDatabase;
}

export function unitScope(): Map<string, unknown> | undefined {
  return scope.getStore();
}

/** Ends the pool; tests and short-lived commands call it last. */
export async function closeDatabase(): Promise<void> {
  const open = holder.stillfieldDatabase;
  holder.stillfieldDatabase = undefined;
  defined = false;
  if (open) await open.close();
}
