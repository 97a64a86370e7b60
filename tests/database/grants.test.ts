import type { Connection } from 'mariadb';
import { openConnection, parseDatabaseUrl } from '@/config/database';
import { applyGrants, RIGHTS, tooWide } from '@/config/grants';
import { migrate } from '@/ops/migrate';
import { emptyDatabase, freshDatabase, type TestDatabase } from '../support/database';

const APP = 'stillfield_app';
const HOSTS = ['127.0.0.1'];

let world: TestDatabase;
let owner: Connection;
let restricted: Connection;
let schema: string;

beforeAll(async () => {
  world = await emptyDatabase();
  schema = parseDatabaseUrl(world.databaseUrl).database;
  owner = await openConnection(world.migrateUrl);
  await owner.query('CREATE TABLE facts (id INT PRIMARY KEY)');
  await owner.query('CREATE TABLE state (id INT PRIMARY KEY)');
  await owner.query('CREATE TABLE hidden (id INT PRIMARY KEY)');
  restricted = await openConnection(world.databaseUrl, { database: undefined });
});
afterAll(async () => {
  await owner.end();
  await restricted.end();
  await world.close();
});

const code = (sql: string) =>
  restricted.query(sql.replace(/\bT\./, `${schema}.`)).then(
    () => 'done',
    (error: { code: string }) => error.code,
  );
const DENIED = 'ER_TABLEACCESS_DENIED_ERROR';
const MAP = { facts: ['SELECT', 'INSERT'], state: ['SELECT', 'INSERT', 'UPDATE', 'DELETE'], hidden: [] };

test('a table that nobody gave rights for stops the migrate and is named', async () => {
  const { hidden: _, ...rest } = MAP;
  await expect(applyGrants(owner, APP, HOSTS, schema, rest)).rejects.toThrow(
    /hidden not named in src\/config\/grants\.js/,
  );
});

test('a right that is none of the four is refused', async () => {
  await expect(applyGrants(owner, APP, HOSTS, schema, { ...MAP, facts: ['DROP'] })).rejects.toThrow(/DROP on facts/);
});

test('the restricted account can do what the map says and nothing else', async () => {
  expect(await applyGrants(owner, APP, HOSTS, schema, MAP)).toBe(3);
  expect(await code('INSERT INTO T.facts VALUES (1)')).toBe('done');
  expect(await code('UPDATE T.facts SET id = 2')).toBe(DENIED);
  expect(await code('DELETE FROM T.facts')).toBe(DENIED);
  expect(await code('INSERT INTO T.state VALUES (1)')).toBe('done');
  expect(await code('UPDATE T.state SET id = 2')).toBe('done');
  expect(await code('SELECT * FROM T.hidden')).toBe(DENIED);
  expect(await code('TRUNCATE T.state')).toBe(DENIED);
  expect(await code('ALTER TABLE T.state ADD x INT')).toBe(DENIED);
  expect(await code('CREATE TABLE T.mine (id INT)')).toBe(DENIED);
});

test('a right taken out of the map is taken away', async () => {
  await applyGrants(owner, APP, HOSTS, schema, { ...MAP, state: ['SELECT'] });
  expect(await code('UPDATE T.state SET id = 3')).toBe(DENIED);
  expect(await code('SELECT * FROM T.state')).toBe('done');
});

test('rights beyond single tables are found', async () => {
  expect(await tooWide(restricted)).toEqual([]);
  const asRows = (grant: string) => ({ query: async () => [{ grants: grant }] }) as unknown as Connection;
  expect(await tooWide(asRows("GRANT ALL PRIVILEGES ON *.* TO `a`@`%` IDENTIFIED BY PASSWORD 'x'"))).toEqual([
    'GRANT ALL PRIVILEGES ON *.* TO `a`@`%`',
  ]);
  expect(await tooWide(asRows('GRANT SELECT ON `stillfield`.* TO `a`@`%`'))).toHaveLength(1);
  expect(await tooWide(asRows('GRANT SELECT ON `stillfield`.`jobs` TO `a`@`%`'))).toEqual([]);
});

test('one account for both is refused before it loses its own rights', async () => {
  const fresh = await freshDatabase();
  const both = { migrateUrl: fresh.migrateUrl, databaseUrl: fresh.migrateUrl };
  await expect(migrate(both)).rejects.toThrow(/use one account/);
  await fresh.close();
});

test('every table of this build has its rights, and audit, evaluations, blobs and revisions only grow', async () => {
  const fresh = await freshDatabase();
  const connection = await openConnection(fresh.migrateUrl);
  const rows: { name: string }[] = await connection.query(
    'SELECT table_name AS name FROM information_schema.tables WHERE table_schema = DATABASE()',
  );
  await connection.end();
  await fresh.close();
  const tables = rows.map(({ name }) => name);
  expect(Object.keys(RIGHTS).sort()).toEqual(tables.sort());
  const facts = tables.filter((name) => /^audit_entries$|^evaluation|_revisions$|_parts$|_segments$/.test(name));
  expect(facts.length).toBeGreaterThan(5);
  // parts of an upload nobody kept are removed by housekeeping
  const growing = facts.filter((name) => name !== 'upload_parts');
  expect(growing.filter((name) => RIGHTS[name]!.includes('UPDATE') || RIGHTS[name]!.includes('DELETE'))).toEqual([]);
});
