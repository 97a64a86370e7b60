'use strict';

/*
 * The database the tests and the bench use: a private server of its own under .stillfield-test, and a template of the
 * migrated schema, written once per set of migrations, from which a schema is made in a moment.
 */

const crypto = require('node:crypto');
const fs = require('node:fs');
const path = require('node:path');
const { ROOT } = require('./nodePackages');
const { HOSTS, startDatabase } = require('./privateDatabase');

const STATE = path.join(ROOT, '.stillfield-test');
const PREFIX = 'stillfield_test';
const FIRST_PORT = 3417;

/** Starts the tests' server or finds it running. Same answer as `startDatabase`. */
function startTestDatabase({ keepRunning = false, tell = () => {}, state = STATE, durable = false } = {}) {
  return startDatabase({
    state,
    database: PREFIX,
    manySchemas: true,
    wantedPort: FIRST_PORT,
    durable,
    keepRunning,
    tell,
  });
}

/** A URL with another schema name. */
function withSchema(url, schema) {
  const changed = new URL(url);
  changed.pathname = `/${schema}`;
  return changed.href;
}

/** Eight hexadecimal digits over all migrations: another set of migrations is another template. */
function migrationsHash() {
  const hash = crypto.createHash('sha256');
  const directory = path.join(ROOT, 'migrations');
  for (const name of fs.readdirSync(directory).sort())
    hash.update(name).update(fs.readFileSync(path.join(directory, name)));
  return hash.digest('hex').slice(0, 8);
}

/** Creates an empty schema, replacing one of that name. */
async function createSchema(owner, schema) {
  await owner.query(`DROP DATABASE IF EXISTS \`${schema}\``);
  await owner.query(`CREATE DATABASE \`${schema}\` CHARACTER SET utf8mb4 COLLATE utf8mb4_unicode_ci`);
}

/** CREATE TABLE statements of a schema and the rows its migrations wrote, as plain data. */
async function dumpSchema(owner, schema) {
  const tables = await owner.query(
    'SELECT table_name AS name FROM information_schema.tables WHERE table_schema = ? ORDER BY table_name',
    [schema],
  );
  const dumped = [];
  for (const { name } of tables) {
    const [row] = await owner.query(`SHOW CREATE TABLE \`${schema}\`.\`${name}\``);
    const rows = await owner.query(`SELECT * FROM \`${schema}\`.\`${name}\``);
    const inserts = [];
    for (const values of rows) {
      const columns = Object.keys(values);
      const list = columns.map((column) => owner.escape(values[column])).join(', ');
      inserts.push(`INSERT INTO \`${name}\` (${columns.map((column) => `\`${column}\``).join(', ')}) VALUES (${list})`);
    }
    dumped.push({ name, create: row['Create Table'], inserts });
  }
  return dumped;
}

/**
 * The migrated schema as data; made by running the migrations once and kept in a file until they change.
 * @param {string} migrateUrl the owner's URL
 * @returns {Promise<Array<{ name: string, create: string, inserts: string[] }>>}
 */
async function template(migrateUrl) {
  const hash = migrationsHash();
  const file = path.join(STATE, `template-${hash}.json`);
  if (fs.existsSync(file)) return JSON.parse(fs.readFileSync(file, 'utf8'));
  const { openConnection } = require('../config/database');
  const { sequelizeCli } = require('./migrate');
  const owner = await openConnection(migrateUrl, { database: undefined, dateStrings: true, jsonStrings: true });
  try {
    // several test runs may come here at once; one of them makes the template
    await owner.query('SELECT GET_LOCK(?, 120)', [`${PREFIX}_template`]);
    if (fs.existsSync(file)) return JSON.parse(fs.readFileSync(file, 'utf8'));
    const schema = `${PREFIX}_template_${hash}`;
    await createSchema(owner, schema);
    sequelizeCli(withSchema(migrateUrl, schema), 'db:migrate');
    const dumped = await dumpSchema(owner, schema);
    await owner.query(`DROP DATABASE \`${schema}\``);
    fs.writeFileSync(`${file}.${process.pid}`, JSON.stringify(dumped));
    fs.renameSync(`${file}.${process.pid}`, file);
    return dumped;
  } finally {
    await owner.end();
  }
}

/**
 * Makes a schema as the migrations leave it, with the restricted account's rights as in production.
 *
 * @param {{ migrateUrl: string, databaseUrl: string }} urls of the tests' server, any schema
 * @param {string} schema name, must begin with stillfield_test
 * @returns {Promise<{ databaseUrl: string, migrateUrl: string, drop: () => Promise<void> }>}
 */
async function freshSchema({ migrateUrl, databaseUrl }, schema) {
  const { openConnection, parseDatabaseUrl } = require('../config/database');
  const { applyGrants } = require('../config/grants');
  const tables = await template(migrateUrl);
  const owner = await openConnection(migrateUrl, { database: undefined });
  try {
    await createSchema(owner, schema);
    await owner.query(`USE \`${schema}\``);
    await owner.query('SET foreign_key_checks = 0');
    for (const { create } of tables) await owner.query(create);
    for (const { inserts } of tables) for (const insert of inserts) await owner.query(insert);
    await owner.query('SET foreign_key_checks = 1');
    await applyGrants(owner, parseDatabaseUrl(databaseUrl).user, [HOSTS[0]], schema);
  } finally {
    await owner.end();
  }
  return {
    databaseUrl: withSchema(databaseUrl, schema),
    migrateUrl: withSchema(migrateUrl, schema),
    drop: async () => {
      const again = await openConnection(migrateUrl, { database: undefined });
      await again.query(`DROP DATABASE IF EXISTS \`${schema}\``).finally(() => again.end());
    },
  };
}

/**
 * Makes a schema that holds what another one of the same migrations holds, row for row.
 * Same arguments and answer as `freshSchema`; `from` is the name of the schema to copy.
 */
async function copiedSchema(urls, schema, from) {
  const { openConnection } = require('../config/database');
  const made = await freshSchema(urls, schema);
  const owner = await openConnection(urls.migrateUrl, { database: undefined });
  try {
    await owner.query('SET foreign_key_checks = 0');
    for (const { name } of await template(urls.migrateUrl)) {
      await owner.query(`DELETE FROM \`${schema}\`.\`${name}\``);
      await owner.query(`INSERT INTO \`${schema}\`.\`${name}\` SELECT * FROM \`${from}\`.\`${name}\``);
    }
  } finally {
    await owner.end();
  }
  return made;
}

/** Drops schemas that an interrupted run left behind: those whose process (third part of the name) is gone. */
async function dropLeftovers(migrateUrl) {
  const { openConnection } = require('../config/database');
  const owner = await openConnection(migrateUrl, { database: undefined });
  try {
    const rows = await owner.query(
      "SELECT schema_name AS name FROM information_schema.schemata WHERE schema_name LIKE 'stillfield\\_test\\_p%'",
    );
    for (const { name } of rows) {
      const pid = Number(/^stillfield_test_p(\d+)_/.exec(name)?.[1]);
      if (pid && !fs.existsSync(`/proc/${pid}`)) await owner.query(`DROP DATABASE \`${name}\``);
    }
  } finally {
    await owner.end();
  }
}

module.exports = {
  PREFIX,
  STATE,
  copiedSchema,
  createSchema,
  dropLeftovers,
  freshSchema,
  startTestDatabase,
  template,
  withSchema,
};
