import { mkdtempSync, rmSync } from 'node:fs';
import path from 'node:path';
import { startDatabase } from '../../src/ops/privateDatabase';
import { freshSchema, PREFIX, type SchemaUrls } from '../../src/ops/testDatabase';

export interface GoneDatabase extends SchemaUrls {
  /** Ends it at once, as a power cut does. */
  kill(): void;
  /** Ends it in order and waits. */
  stop(): Promise<void>;
  /** The same data on the same port. */
  startAgain(): Promise<void>;
  /** Ends it and removes its data. */
  remove(): Promise<void>;
}

/** A MariaDB of one test file's own, which flushes each commit to the disk, so that it may go and come back. */
export async function goneDatabase(wantedPort: number): Promise<GoneDatabase> {
  const state = mkdtempSync(path.join(path.resolve(__dirname, '../../.stillfield-test'), 'gone-'));
  const options = { state, database: PREFIX, tell: () => {} };
  let running = await startDatabase({ ...options, wantedPort });
  const { databaseUrl, migrateUrl } = await freshSchema(running, PREFIX);
  return {
    databaseUrl,
    migrateUrl,
    kill: () => void process.kill(running.pid, 'SIGKILL'),
    stop: () => running.stop(),
    startAgain: async () => {
      running = await startDatabase({ ...options, port: running.port });
    },
    remove: async () => {
      await running.stop();
      rmSync(state, { recursive: true, force: true });
    },
  };
}
