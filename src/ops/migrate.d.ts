/** Migrates as the owner, then applies the rights of the restricted account and checks that they are not wider. */
export function migrate(options: {
  migrateUrl: string;
  databaseUrl: string;
  tell?: (text: string) => void;
  hosts?: string[];
}): Promise<{ migrated: number; tables: number }>;

/** Runs sequelize-cli as a child on the given schema and returns what it printed. */
export function sequelizeCli(migrateUrl: string, ...args: string[]): string;
