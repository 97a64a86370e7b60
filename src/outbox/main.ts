/* The second process: does what committed transactions asked for. As many may run as one likes. */

import { randomUUID } from 'node:crypto';
import { env, EnvError } from '@/config/env';
import { closeDatabase } from '@/models/database';
import { onStop } from '@/ops/drain';
import { errorDetails, logLine, outliveReader } from '@/ops/log';
import { scheduleRecurring } from './handlers';
import { workOnce } from './worker';

const IDLE_MS = 1000;
const LONGEST_PAUSE_MS = 30_000;
const RECURRING_MS = 60_000;

async function main(): Promise<void> {
  env();
  const owner = randomUUID();
  let stopping = false;
  let wake: () => void = () => {};
  outliveReader();
  onStop((reason) => {
    stopping = true;
    logLine('info', 'outbox draining', { reason });
    wake();
  });
  const pause = (milliseconds: number) =>
    new Promise<void>((resolve) => {
      const timer = setTimeout(resolve, milliseconds);
      wake = () => {
        clearTimeout(timer);
        resolve();
      };
    });

  logLine('info', 'outbox running', { owner });
  let failures = 0;
  let recurringAt = 0;
  while (!stopping) {
    try {
      if (Date.now() >= recurringAt) {
        await scheduleRecurring();
        recurringAt = Date.now() + RECURRING_MS;
      }
      const worked = await workOnce(owner);
      failures = 0;
      if (!worked && !stopping) await pause(IDLE_MS);
    } catch (error) {
      failures += 1;
      logLine('error', 'outbox cannot work', { failures, ...errorDetails(error) });
      if (!stopping) await pause(Math.min(IDLE_MS * 2 ** failures, LONGEST_PAUSE_MS));
    }
  }
  await closeDatabase();
  logLine('info', 'outbox stopped');
  process.exit(0);
}

main().catch((error: unknown) => {
  if (error instanceof EnvError) console.error(error.message);
  else logLine('error', 'outbox failed', errorDetails(error));
  process.exit(1);
});
