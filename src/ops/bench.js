'use strict';

/*
 * npm run bench: runs src/ops/bench.ts with a migrated database of its own (.stillfield-test/bench, commits flushed as
 * in production), so that its numbers include what a lab pays. Arguments are handed on.
 */

const path = require('node:path');
const { runTypescript } = require('./children');
const { checkNode, ensurePackages } = require('./nodePackages');
const { run } = require('./say');
const { PREFIX, STATE, freshSchema, startTestDatabase } = require('./testDatabase');

run(async () => {
  checkNode();
  ensurePackages();
  const database = await startTestDatabase({ state: path.join(STATE, 'bench'), durable: true, tell: console.error });
  let code = 1;
  try {
    const schema = await freshSchema(database, `${PREFIX}_p${process.pid}_bench`);
    code = await runTypescript('src/ops/bench.ts', process.argv.slice(2), {
      ...process.env,
      DATABASE_URL: schema.databaseUrl,
      DATABASE_MIGRATE_URL: schema.migrateUrl,
      SESSION_SECRET: 'a session secret that only the bench uses',
      APP_ORIGIN: 'http://127.0.0.1:3999',
      STILLFIELD_DEMO: '0',
      NODE_ENV: 'production',
    });
    await schema.drop();
  } finally {
    await database.stop();
  }
  process.exit(code ?? 1);
});
