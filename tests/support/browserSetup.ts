import path from 'node:path';
import { freshSchema, PREFIX } from '../../src/ops/testDatabase';
import setupDatabase from './databaseSetup';
import { runEntry, testEnvironment } from './server';

/**
 * Before the browser tests: one schema with the demo lab, which nothing changes; every test file gets a copy of it and a
 * server of its own (browserLab.ts). STILLFIELD_TEST_ORIGIN, set beforehand, names a demo lab that runs already
 * (`npm run dev`), and that one is used as it is.
 */
export default async function setup(): Promise<void> {
  if (process.env.STILLFIELD_TEST_ORIGIN) return;
  await setupDatabase();
  const server = {
    databaseUrl: process.env.STILLFIELD_TEST_DATABASE_URL!,
    migrateUrl: process.env.STILLFIELD_TEST_MIGRATE_URL!,
  };
  const name = `${PREFIX}_p${process.pid}_browser`;
  const schema = await freshSchema(server, name);
  const state = path.resolve(__dirname, '../../.stillfield-test');
  const environment = { ...testEnvironment(schema, 3000), DATABASE_MIGRATE_URL: schema.migrateUrl };
  await runEntry('src/ops/seed.ts', [], { ...environment, STILLFIELD_DEMO: '1', STILLFIELD_STATE: state });
  process.env.STILLFIELD_TEST_SEEDED = name;
  Object.assign(globalThis, { stillfieldSeeded: schema });
}
