import { existsSync } from 'node:fs';
import path from 'node:path';
import { freshSchema, PREFIX } from '../../src/ops/testDatabase';
import setupDatabase from './databaseSetup';
import {
  freePort,
  type RunningEntry,
  type RunningServer,
  runEntry,
  startEntry,
  startServer,
  testEnvironment,
} from './server';

export interface BrowserWorld {
  server: RunningServer;
  /** What npm start runs beside it: the outbox and the demo's mail catcher. */
  beside: RunningEntry[];
  drop(): Promise<void>;
}

/**
 * Before the browser tests: one schema with the demo lab, one built server, outbox and mail catcher on it;
 * STILLFIELD_TEST_ORIGIN names it. Set
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
  const environment = {
    ...testEnvironment(schema, Number(new URL(running.origin).port)),
    STILLFIELD_DEMO: '1',
    MAIL_CATCHER_PORT: String(await freePort()),
  };
  const beside = ['src/ops/mailCatcher.ts', 'src/outbox/main.ts'].map((file) => startEntry(file, [], environment));
  const world: BrowserWorld = { server: running, beside, drop: schema.drop };
  Object.assign(globalThis, { stillfieldBrowserWorld: world });
}
