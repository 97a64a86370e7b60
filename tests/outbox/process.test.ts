import { QueryTypes } from 'sequelize';
import { database } from '@/models/database';
import { unitOfWork } from '@/models/unitOfWork';
import { freshDatabase, type TestDatabase } from '../support/database';
import { startEntry, testEnvironment } from '../support/server';

const MESSAGES = 24;

let world: TestDatabase;
beforeAll(async () => (world = await freshDatabase()));
afterAll(() => world.close());

async function counts(): Promise<{ sent: number; attempts: number }> {
  const [row] = await unitOfWork(() =>
    database().query<{ sent: string; attempts: string }>(
      "SELECT COALESCE(SUM(state = 'sent'), 0) AS sent, SUM(attempts) AS attempts FROM outbox WHERE message_id LIKE 'm-%'",
      { type: QueryTypes.SELECT },
    ),
  );
  return { sent: Number(row?.sent), attempts: Number(row?.attempts) };
}

test('two outbox processes on one database do every message once and drain on SIGTERM', async () => {
  await unitOfWork(async () => {
    for (let index = 0; index < MESSAGES; index += 1) {
      await database().query(
        `INSERT INTO outbox (kind, payload, state, available_at, attempts, message_id, created_at)
          VALUES ('housekeeping', '{}', 'queued', UTC_TIMESTAMP(3), 0, 'm-${index}', UTC_TIMESTAMP(3))`,
        { type: QueryTypes.RAW },
      );
    }
  });
  const environment = testEnvironment(world, 3000);
  const processes = [1, 2].map(() => startEntry('src/outbox/main.ts', [], environment));
  for (const until = Date.now() + 60_000; (await counts()).sent < MESSAGES && Date.now() < until;) {
    await new Promise((resolve) => setTimeout(resolve, 100));
  }
  expect(await counts()).toEqual({ sent: MESSAGES, attempts: MESSAGES });
  for (const each of processes) each.process.kill('SIGTERM');
  expect(await Promise.all(processes.map((each) => each.ended))).toEqual([0, 0]);
  const done = processes.map((each) => each.words().split('"message done"').length - 1);
  expect(done[0]! + done[1]!).toBe(MESSAGES);
}, 90_000);
