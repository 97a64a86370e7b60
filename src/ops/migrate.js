'use strict';

/*
 * Brings a schema up to this build: migrations by sequelize-cli as the owner, then the rights of the restricted account.
 *
 *   DATABASE_MIGRATE_URL=… DATABASE_URL=… node src/ops/migrate.js
 */

const { spawnSync } = require('node:child_process');
const fs = require('node:fs');
const path = require('node:path');
const { Refusal, run, say } = require('./say');

const ROOT = path.resolve(__dirname, '../..');

/** What a failed connection means, in one line that says how to mend it. Null when the error is something else. */
function connectionRefusal(error, name) {
  const code = error?.code ?? error?.cause?.code ?? '';
  if (
    ['ECONNREFUSED', 'ENOTFOUND', 'EHOSTUNREACH', 'ENETUNREACH', 'ETIMEDOUT', 'ER_GET_CONNECTION_TIMEOUT'].includes(
      code,
    )
  ) {
    return new Refusal(`The database server of ${name} is not reachable (${code}): start it, or correct ${name}.`);
  }
  if (/^ER_CONNECTION_TIMEOUT|^ER_SOCKET/.test(code)) {
    return new Refusal(`The database server of ${name} does not answer (${code}): start it, or correct ${name}.`);
  }
  if (/^ER_(ACCESS_DENIED|DBACCESS_DENIED)/.test(code)) {
    return new Refusal(`The database server refuses the account of ${name}: correct its user or password.`);
  }
  if (code === 'ER_BAD_DB_ERROR') {
    return new Refusal(
      `The schema of ${name} does not exist: create it once with CREATE DATABASE … CHARACTER SET utf8mb4.`,
    );
  }
  return null;
}

/** Opens a connection, turning an unreachable server or a wrong account into a Refusal that names the variable. */
async function open(url, name) {
  const { openConnection } = require('../config/database');
  try {
    return await openConnection(url);
  } catch (error) {
    throw connectionRefusal(error, name) ?? error;
  }
}

/** Runs sequelize-cli as a child on the given schema and returns what it printed. */
function sequelizeCli(migrateUrl, ...args) {
  const cli = path.join(ROOT, 'node_modules/sequelize-cli/lib/sequelize');
  const result = spawnSync(process.execPath, [cli, ...args], {
    cwd: ROOT,
    encoding: 'utf8',
    env: { ...process.env, DATABASE_MIGRATE_URL: migrateUrl, NODE_ENV: process.env.NODE_ENV || 'production' },
  });
  if (result.status !== 0) {
    const words = `${result.stdout}\n${result.stderr}`.split('\n').filter((line) => /ERROR|error/.test(line));
    throw new Error(`sequelize-cli ${args.join(' ')} failed: ${words.join('\n') || result.stderr}`);
  }
  return result.stdout;
}

/** Names of the migrations of this build that the schema has not seen. */
async function pending(connection) {
  const known = fs.readdirSync(path.join(ROOT, 'migrations')).filter((name) => name.endsWith('.js'));
  const applied = await connection.query('SELECT name FROM SequelizeMeta').catch((error) => {
    if (error.code === 'ER_NO_SUCH_TABLE') return [];
    throw error;
  });
  return known.filter((name) => !applied.some((row) => row.name === name));
}

/**
 * Migrates and applies the rights.
 *
 * @param {{ migrateUrl: string, databaseUrl: string, tell?: (text: string) => void, hosts?: string[] }} options
 *   hosts of the restricted account; when absent the host the server itself gives that account (CURRENT_USER())
 * @returns {Promise<{ migrated: number, tables: number }>} migrations run now, tables whose rights were applied
 * @throws {Refusal} in one line for a server that is not reachable or refuses the account
 */
async function migrate({ migrateUrl, databaseUrl, tell = say, hosts }) {
  const { parseDatabaseUrl } = require('../config/database');
  const { applyGrants } = require('../config/grants');
  const { user, database } = parseDatabaseUrl(databaseUrl);
  if (user === parseDatabaseUrl(migrateUrl).user) {
    throw new Refusal(
      'DATABASE_URL and DATABASE_MIGRATE_URL use one account: create a second, restricted one (README).',
    );
  }
  const owner = await open(migrateUrl, 'DATABASE_MIGRATE_URL');
  try {
    const migrated = (await pending(owner)).length;
    if (migrated) {
      sequelizeCli(migrateUrl, 'db:migrate');
      tell(`${migrated} migration${migrated === 1 ? '' : 's'} applied`);
    }
    const restricted = await inspect(databaseUrl);
    const tables = await applyGrants(owner, user, hosts ?? [restricted.host], database);
    const wide = (await inspect(databaseUrl)).wide;
    if (wide.length) {
      throw new Refusal(
        `The account of DATABASE_URL may do more than the application needs; revoke: ${wide.join('; ')}`,
      );
    }
    return { migrated, tables };
  } finally {
    await owner.end();
  }
}

/** What the server says of the account of DATABASE_URL: the host part it matched, and rights that are too wide. */
async function inspect(databaseUrl) {
  const { parseDatabaseUrl, openConnection } = require('../config/database');
  const { tooWide } = require('../config/grants');
  // without a schema: before the first grant the account cannot enter it
  const restricted = await openConnection(databaseUrl, { database: undefined }).catch((error) => {
    throw connectionRefusal(error, 'DATABASE_URL') ?? error;
  });
  try {
    const [row] = await restricted.query('SELECT CURRENT_USER() AS account');
    const host = row.account.slice(parseDatabaseUrl(databaseUrl).user.length + 1);
    return { host, wide: await tooWide(restricted) };
  } finally {
    await restricted.end();
  }
}

module.exports = { connectionRefusal, migrate, sequelizeCli };

if (require.main === module) {
  run(async () => {
    const { DATABASE_MIGRATE_URL: migrateUrl, DATABASE_URL: databaseUrl } = process.env;
    if (!migrateUrl || !databaseUrl) {
      throw new Refusal('Set DATABASE_MIGRATE_URL (owner of the schema) and DATABASE_URL (restricted account).');
    }
    const { migrated, tables } = await migrate({ migrateUrl, databaseUrl });
    say(`${migrated} migrated, rights applied to ${tables} tables`);
  });
}
