import { freshSchema, PREFIX, type SchemaUrls, withSchema } from '../../src/ops/testDatabase';
import { openConnection } from '@/config/database';

export interface TestDatabase extends SchemaUrls {
  /** Ends the models' pool and drops the schema. */
  close(): Promise<void>;
}

let count = 0;

function serverUrls(): SchemaUrls {
  const databaseUrl = process.env.STILLFIELD_TEST_DATABASE_URL;
  const migrateUrl = process.env.STILLFIELD_TEST_MIGRATE_URL;
  if (!databaseUrl || !migrateUrl)
    throw new Error('this test belongs to the http or browser project: see jest.config.js');
  return { databaseUrl, migrateUrl };
}

/** The name carries the process, so that a later run can tell what an interrupted one left behind. */
function schemaName(): string {
  count += 1;
  return `${PREFIX}_p${process.pid}_${count}_${Math.random().toString(36).slice(2, 6)}`;
}

function pointAt(urls: SchemaUrls): void {
  Object.assign(process.env, {
    DATABASE_URL: urls.databaseUrl,
    SESSION_SECRET: 'a session secret that only the tests use',
    APP_ORIGIN: 'http://localhost:3000',
  });
}

/**
 * A migrated schema of this test file's own, reached with the restricted account's real rights. Call it in `beforeAll`
 * before anything asks `env()` or `database()`, and `close` in `afterAll`.
 */
export async function freshDatabase(): Promise<TestDatabase> {
  const made = await freshSchema(serverUrls(), schemaName());
  pointAt(made);
  return {
    databaseUrl: made.databaseUrl,
    migrateUrl: made.migrateUrl,
    close: async () => {
      const { closeDatabase } = await import('@/models/database');
      await closeDatabase();
      await made.drop();
    },
  };
}

/** A schema without any table, for the tests of the migrations themselves. */
export async function emptyDatabase(): Promise<TestDatabase> {
  const server = serverUrls();
  const schema = schemaName();
  const run = async (sql: string) => {
    const owner = await openConnection(server.migrateUrl, { database: undefined });
    await owner.query(sql).finally(() => owner.end());
  };
  await run(`CREATE DATABASE \`${schema}\` CHARACTER SET utf8mb4 COLLATE utf8mb4_unicode_ci`);
  return {
    databaseUrl: withSchema(server.databaseUrl, schema),
    migrateUrl: withSchema(server.migrateUrl, schema),
    close: () => run(`DROP DATABASE IF EXISTS \`${schema}\``),
  };
}
