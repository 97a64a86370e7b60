import { QueryTypes } from 'sequelize';
import { database } from '@/models/database';
import { unitOfWork } from '@/models/unitOfWork';
import { FinalFailure, NotYet } from '@/outbox/failures';
import { purgeExpired, scheduleHousekeeping } from '@/outbox/housekeeping';
import { delaySeconds, LARGEST_ATTEMPTS, leaseNext, markSent } from '@/outbox/queue';
import { workOnce } from '@/outbox/worker';
import { freshDatabase, type TestDatabase } from '../support/database';

let world: TestDatabase;
beforeAll(async () => (world = await freshDatabase()));
afterAll(() => world.close());
beforeEach(() => run("UPDATE outbox SET state = 'sent', lease_owner = NULL, leased_until = NULL"));
beforeEach(() => jest.spyOn(process.stdout, 'write').mockReturnValue(true));
afterEach(() => jest.restoreAllMocks());

const run = (sql: string) => unitOfWork(() => database().query(sql, { type: QueryTypes.RAW }));

interface Row {
  id: number;
  state: string;
  attempts: number;
  last_error: string | null;
  lease_owner: string | null;
  waits: number;
}

async function queue(kind: string, extra = "'queued', UTC_TIMESTAMP(3), NULL, 0"): Promise<string> {
  return unitOfWork(async () => {
    const [id] = await database().query(
      `INSERT INTO outbox (kind, payload, state, available_at, leased_until, attempts, message_id, created_at)
        SELECT :kind, '{"a":1}', columns.* , 'stable-id', UTC_TIMESTAMP(3) FROM (SELECT ${extra}) AS columns`,
      { replacements: { kind }, type: QueryTypes.INSERT },
    );
    return String(id);
  });
}

async function row(id: string): Promise<Row> {
  const [found] = await unitOfWork(() =>
    database().query<Row>(
      'SELECT *, TIMESTAMPDIFF(SECOND, UTC_TIMESTAMP(3), available_at) AS waits FROM outbox WHERE id = :id',
      { replacements: { id }, type: QueryTypes.SELECT },
    ),
  );
  return found!;
}

test('a due message is leased once, however many ask at the same time', async () => {
  const ids = new Set([await queue('note'), await queue('note')]);
  const taken = await Promise.all(['a', 'b', 'c', 'd', 'e', 'f'].map((owner) => leaseNext(owner)));
  const held = taken.filter((message) => message !== null);
  const again = [await leaseNext('g'), await leaseNext('h'), await leaseNext('i')].filter(
    (message) => message !== null,
  );
  const all = [...held, ...again].map((message) => message.id);
  expect(all).toHaveLength(2);
  expect(new Set(all)).toEqual(ids);
});

test('a message carries its payload and its stable message id', async () => {
  await queue('note');
  expect(await leaseNext('a')).toMatchObject({ kind: 'note', payload: { a: 1 }, attempts: 1, messageId: 'stable-id' });
});

test('a message whose time has not come is left alone', async () => {
  await queue('note', "'queued', UTC_TIMESTAMP(3) + INTERVAL 1 MINUTE, NULL, 0");
  expect(await leaseNext('a')).toBeNull();
});

test('a lease that has run out is taken over, and the first holder can no longer settle it', async () => {
  const id = await queue('note', "'sending', UTC_TIMESTAMP(3), UTC_TIMESTAMP(3) - INTERVAL 1 SECOND, 1");
  const message = await leaseNext('second');
  expect(message).toMatchObject({ id, attempts: 2 });
  expect(await markSent(message!, 'first')).toBe(false);
  expect(await markSent(message!, 'second')).toBe(true);
  expect(await row(id)).toMatchObject({ state: 'sent', lease_owner: null });
});

test('the effect happens after the lease is committed', async () => {
  const id = await queue('note');
  let seen: Row | undefined;
  await workOnce('a', {
    note: async () => {
      seen = await row(id);
    },
  });
  expect(seen).toMatchObject({ state: 'sending', lease_owner: 'a', attempts: 1 });
  expect(await row(id)).toMatchObject({ state: 'sent' });
});

test('a failure waits and is tried again; the reason is kept', async () => {
  const id = await queue('note');
  const handlers = { note: () => Promise.reject(new Error('the mail server is away')) };
  expect(await workOnce('a', handlers)).toBe(true);
  const failed = await row(id);
  expect(failed).toMatchObject({ state: 'queued', attempts: 1, last_error: 'the mail server is away' });
  expect(failed.waits).toBeGreaterThanOrEqual(3);
  expect(await workOnce('a', handlers)).toBe(false);
});

test('a message whose means are missing waits a minute with its reason, and no try is counted', async () => {
  const id = await queue('note');
  const handlers = { note: () => Promise.reject(new NotYet('no mail server is configured')) };
  for (let round = 0; round < 3; round += 1) {
    expect(await workOnce('a', handlers)).toBe(true);
    await run(`UPDATE outbox SET available_at = UTC_TIMESTAMP(3) WHERE id = ${id}`);
  }
  await workOnce('a', handlers);
  const waiting = await row(id);
  expect(waiting).toMatchObject({ state: 'queued', attempts: 0, last_error: 'no mail server is configured' });
  expect(waiting.waits).toBeGreaterThanOrEqual(55);
});

test.each([
  ['a final failure', 'note', "'queued', UTC_TIMESTAMP(3), NULL, 0", 1],
  ['a kind nobody handles', 'unheard', "'queued', UTC_TIMESTAMP(3), NULL, 0", 1],
  ['the last attempt', 'flaky', `'queued', UTC_TIMESTAMP(3), NULL, ${LARGEST_ATTEMPTS - 1}`, LARGEST_ATTEMPTS],
])('%s is refused with its reason', async (_, kind, extra, attempts) => {
  const id = await queue(kind, extra);
  await workOnce('a', {
    note: () => Promise.reject(new FinalFailure('no such address')),
    flaky: () => Promise.reject(new Error('still away')),
  });
  expect(await row(id)).toMatchObject({ state: 'refused', attempts, last_error: expect.any(String) });
});

test('the pause doubles from 5 s to an hour', () => {
  expect([1, 2, 3, 10, 11, 30].map(delaySeconds)).toEqual([5, 10, 20, 2560, 3600, 3600]);
});

test('housekeeping is in the queue once', async () => {
  await scheduleHousekeeping();
  await scheduleHousekeeping();
  const rows = await unitOfWork(() =>
    database().query<Row>(
      `SELECT *, TIMESTAMPDIFF(SECOND, UTC_TIMESTAMP(3), available_at) AS waits FROM outbox
        WHERE kind = 'housekeeping' AND state = 'queued'`,
      { type: QueryTypes.SELECT },
    ),
  );
  expect(rows).toHaveLength(1);
  expect(rows[0]!.waits).toBeGreaterThanOrEqual(0);
  expect(rows[0]!.waits).toBeLessThanOrEqual(3600);
});

test('housekeeping deletes what has expired and nothing else', async () => {
  const ages = ['- INTERVAL 1 SECOND', '- INTERVAL 1 YEAR', '+ INTERVAL 1 MINUTE'];
  await unitOfWork(async () => {
    const write = (sql: string) => database().query(sql, { type: QueryTypes.RAW });
    // rows without their user: only their expiry matters here
    await write('SET foreign_key_checks = 0');
    for (const [index, age] of ages.entries()) {
      const [now, at] = ['UTC_TIMESTAMP(3)', `UTC_TIMESTAMP(3) ${age}`];
      const hash = `LPAD(${index}, 64, '0')`;
      await write(`INSERT INTO sessions (public_id, token_hash, user_id, authenticated_at, last_seen_at, expires_at,
        address, agent, created_at) VALUES ('session-${index}', ${hash}, 1, ${now}, ${now}, ${at}, '', '', ${now})`);
      await write(`INSERT INTO uploads (public_id, sha256, name, bytes, recognition, user_id, expires_at, created_at)
        VALUES ('upload-${index}', ${hash}, '', 0, '{}', 1, ${at}, ${now})`);
      await write(`INSERT INTO idempotency_keys (user_id, \`key\`, operation, request_hash, status, reply, expires_at,
        created_at) VALUES (1, 'key-${index}', '', ${hash}, 200, '', ${at}, ${now})`);
    }
    for (const [index, age] of ages.entries()) {
      const at = `UTC_TIMESTAMP(3) ${age}`;
      await write(`INSERT INTO caught_mails (public_id, message_id, sender, recipient, subject, text, expires_at,
        created_at) VALUES ('mail-${index}', '', '', '', '', '', ${at}, ${at})`);
      // kept 90 days beyond its end
      await write(`INSERT INTO one_time_links (public_id, kind, user_id, token_hash, expires_at, created_at)
        VALUES ('link-${index}', 'reset', 1, LPAD(${index}, 64, '0'), ${at}, ${at})`);
    }
    await write('SET foreign_key_checks = 1');
  });
  const two = { sessions: 2, uploads: 2, idempotency_keys: 2, caught_mails: 2, one_time_links: 1 };
  expect(await purgeExpired()).toEqual(two);
  expect(Object.values(await purgeExpired()).every((gone) => gone === 0)).toBe(true);
});
