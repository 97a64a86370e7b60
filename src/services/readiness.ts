import { readdir } from 'node:fs/promises';
import path from 'node:path';
import { QueryTypes } from 'sequelize';
import { database } from '@/models/database';
import { unitOfWork } from '@/models/unitOfWork';

let known: Promise<string[]> | undefined;

/** Migrations that ship with this build, by file name. */
function knownMigrations(): Promise<string[]> {
  known ??= readdir(path.join(process.cwd(), 'migrations')).then((names) =>
    names.filter((name) => name.endsWith('.js')),
  );
  return known;
}

/** Ready means: the database answers and every migration this build knows is applied. Answers what is missing. */
export async function missingMigrations(): Promise<string[]> {
  const names = await knownMigrations();
  const rows = await unitOfWork(() =>
    database().query<{ name: string }>('SELECT name FROM SequelizeMeta', { type: QueryTypes.SELECT }),
  );
  const applied = new Set(rows.map((row) => row.name));
  return names.filter((name) => !applied.has(name)).sort();
}
