import { readdirSync } from 'node:fs';
import path from 'node:path';
import { DataTypes, QueryTypes, Sequelize, type AbstractDataType, type ModelAttributeColumnOptions } from 'sequelize';
import { connectionOptions } from '@/config/database';
import { associate } from '@/models/associations';
import { defineModels } from '@/models/define';
import { emptyDatabase, type TestDatabase } from '../support/database';

const MIGRATIONS = path.resolve(__dirname, '../../migrations');

interface Migration {
  up(queryInterface: unknown, sequelize: unknown): Promise<void>;
  down(queryInterface: unknown, sequelize: unknown): Promise<void>;
}

const names = readdirSync(MIGRATIONS).filter((name) => name.endsWith('.js'));
const migrations = names.sort().map((name) => jest.requireActual<Migration>(path.join(MIGRATIONS, name)));

let schema: TestDatabase;
let owner: Sequelize;

beforeAll(async () => {
  schema = await emptyDatabase();
  owner = new Sequelize(connectionOptions(schema.migrateUrl));
  defineModels(owner);
  associate();
});
afterAll(async () => {
  await owner.close();
  await schema.close();
});

const run = async (way: 'up' | 'down') => {
  for (const migration of way === 'up' ? migrations : [...migrations].reverse()) {
    await migration[way](owner.getQueryInterface(), Sequelize);
  }
};

interface Column {
  tableName: string;
  columnName: string;
  columnType: string;
  nullable: 'YES' | 'NO';
}

const columns = () =>
  owner.query<Column>(
    `SELECT table_name AS tableName, column_name AS columnName, column_type AS columnType, is_nullable AS nullable
     FROM information_schema.columns WHERE table_schema = DATABASE() ORDER BY table_name, column_name`,
    { type: QueryTypes.SELECT },
  );

/** The column type a model asks for, in MariaDB's own spelling. */
function typeOf(attribute: ModelAttributeColumnOptions): string {
  if (attribute.type instanceof DataTypes.JSON) return 'longtext';
  const sql = (attribute.type as unknown as AbstractDataType).toSql().toLowerCase();
  const plain: [RegExp, string][] = [
    [/^bigint unsigned$/, 'bigint(20) unsigned'],
    [/^integer unsigned$/, 'int(10) unsigned'],
    [/^smallint unsigned$/, 'smallint(5) unsigned'],
    [/^tinyint unsigned$/, 'tinyint(3) unsigned'],
    [/^double precision$|^double$/, 'double'],
    [/^varchar\((\d+)\) binary$/, 'varbinary($1)'],
    [/^boolean$/, 'tinyint(1)'],
  ];
  const known = plain.find(([pattern]) => pattern.test(sql));
  return known ? sql.replace(known[0], known[1]) : sql;
}

test('an empty database can be migrated, undone to nothing, and migrated again to the same', async () => {
  await run('up');
  const first = await columns();
  await run('down');
  expect(await columns()).toEqual([]);
  await run('up');
  expect(await columns()).toEqual(first);
}, 120_000);

test('every model has exactly the columns of its table, of the same type and the same nullability', async () => {
  const models = Object.values(owner.models).flatMap((model) =>
    Object.values(model.getAttributes()).map((attribute) => ({
      tableName: model.getTableName() as string,
      columnName: attribute.field!,
      columnType: attribute.type instanceof DataTypes.ENUM ? enumOf(attribute) : typeOf(attribute),
      nullable: attribute.allowNull === false ? 'NO' : 'YES',
    })),
  );
  const order = (a: Column, b: Column) =>
    `${a.tableName} ${a.columnName}`.localeCompare(`${b.tableName} ${b.columnName}`);
  expect((models as Column[]).sort(order)).toEqual((await columns()).sort(order));
});

function enumOf(attribute: ModelAttributeColumnOptions): string {
  return `enum(${(attribute.type as unknown as { values: string[] }).values.map((value) => `'${value}'`).join(',')})`;
}

test('every key and constraint has a name of its own', async () => {
  const rows = await owner.query<{ name: string }>(
    `SELECT constraint_name AS name FROM information_schema.table_constraints
     WHERE table_schema = DATABASE() AND constraint_type <> 'PRIMARY KEY' AND constraint_type <> 'CHECK'`,
    { type: QueryTypes.SELECT },
  );
  expect(rows.map(({ name }) => name).filter((name) => !/^(fk|uq)_/.test(name))).toEqual([]);
});
