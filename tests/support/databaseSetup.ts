import { dropLeftovers, startTestDatabase, template } from '../../src/ops/testDatabase';

/**
 * Before the tests that need a database: `npm test` has started the tests' server and says so in STILLFIELD_TEST_*.
 * Run alone (`npx jest tests/services`) this starts it, and leaves it running for the next time.
 */
export default async function setup(): Promise<void> {
  if (!process.env.STILLFIELD_TEST_MIGRATE_URL) {
    const running = await startTestDatabase({ keepRunning: true });
    process.env.STILLFIELD_TEST_DATABASE_URL = running.databaseUrl;
    process.env.STILLFIELD_TEST_MIGRATE_URL = running.migrateUrl;
  }
  await dropLeftovers(process.env.STILLFIELD_TEST_MIGRATE_URL!);
  await template(process.env.STILLFIELD_TEST_MIGRATE_URL!);
}
