import { existsSync } from 'node:fs';
import path from 'node:path';
import { freshSchema, PREFIX } from '../../src/ops/testDatabase';
import setupDatabase from './databaseSetup';
import { type RunningServer, runEntry, startServer, testEnvironment } from './server';

export interface BrowserWorld {
  server: RunningServer;
  drop(): Promise<void>;
}

/**
 * Before the browser tests: one schema with the demo lab, one built server on it; STILLFIELD_TEST_ORIGIN names it. Set
 * beforehand, it names a demo lab that runs already (`npm run dev`), and that one is used as it is.
 */
export default async function setup(): Promise<void> {
  if (process.env.STILLFIELD_TEST_ORIGIN) return;
  await setupDatabase();
  const server = {
    databaseUrl: process.env.STILLFIELD_TEST_DATABASE_URL!,
    migrateUrl: process.env.STILLFIELD_TEST_MIGRATE_URL!,
  };
  const schema = await freshSchema(server, `${PREFIX}_p${process.pid}_browser`);
  const state = path.resolve(__dirname, '../../.stillfield-test');
  if (existsSync(path.resolve(__dirname, '../../src/ops/seed.ts'))) {
    const environment = { ...testEnvironment(schema, 3000), DATABASE_MIGRATE_URL: schema.migrateUrl };
    await runEntry('src/ops/seed.ts', [], { ...environment, STILLFIELD_DEMO: '1', STILLFIELD_STATE: state });
  }
  const running = await startServer(schema, { STILLFIELD_DEMO: '1' });
  process.env.STILLFIELD_TEST_ORIGIN = running.origin;
  process.env.STILLFIELD_TEST_SIGN_INS = path.join(state, 'demo-sign-ins.txt');
  const world: BrowserWorld = { server: running, drop: schema.drop };
  Object.assign(globalThis, { stillfieldBrowserWorld: world });
}
