import { copiedSchema, PREFIX } from '../../src/ops/testDatabase';
import { freePort, type RunningEntry, type RunningServer, startEntry, startServer, testEnvironment } from './server';

/*
 * Run before each browser test file: a copy of the seeded demo lab, with what `npm start` runs on it: the built server,
 * the outbox and the demo's mail catcher. No file sees what another one did. STILLFIELD_TEST_ORIGIN names the server.
 */

let server: RunningServer;
let beside: RunningEntry[] = [];
let drop: (() => Promise<void>) | undefined;

beforeAll(async () => {
  const from = process.env.STILLFIELD_TEST_SEEDED;
  if (!from) return;
  const urls = {
    databaseUrl: process.env.STILLFIELD_TEST_DATABASE_URL!,
    migrateUrl: process.env.STILLFIELD_TEST_MIGRATE_URL!,
  };
  const schema = await copiedSchema(urls, `${PREFIX}_p${process.pid}_lab`, from);
  drop = schema.drop;
  server = await startServer(schema, { STILLFIELD_DEMO: '1' });
  process.env.STILLFIELD_TEST_ORIGIN = server.origin;
  const environment = {
    ...testEnvironment(schema, Number(new URL(server.origin).port)),
    STILLFIELD_DEMO: '1',
    MAIL_CATCHER_PORT: String(await freePort()),
  };
  beside = ['src/ops/mailCatcher.ts', 'src/outbox/main.ts'].map((file) => startEntry(file, [], environment));
}, 120_000);

afterAll(async () => {
  if (!drop) return;
  delete process.env.STILLFIELD_TEST_ORIGIN;
  for (const { process: child } of beside) child.kill('SIGTERM');
  await Promise.all([server?.stop(), ...beside.map(({ ended }) => ended)]);
  await drop();
}, 60_000);
