export const PREFIX: string;
export const STATE: string;

export interface SchemaUrls {
  databaseUrl: string;
  migrateUrl: string;
}

export interface RunningTestDatabase extends SchemaUrls {
  port: number;
  pid: number;
  stop(): Promise<void>;
}

/** Starts the tests' private server or finds it running. */
export function startTestDatabase(options?: {
  keepRunning?: boolean;
  tell?: (text: string) => void;
  state?: string;
  durable?: boolean;
}): Promise<RunningTestDatabase>;

/** A schema as the migrations leave it, with the restricted account's rights. */
export function freshSchema(urls: SchemaUrls, schema: string): Promise<SchemaUrls & { drop(): Promise<void> }>;

/** A schema that holds what `from`, another one of the same migrations, holds. */
export function copiedSchema(
  urls: SchemaUrls,
  schema: string,
  from: string,
): Promise<SchemaUrls & { drop(): Promise<void> }>;

/** The migrated schema as data. */
export function template(migrateUrl: string): Promise<{ name: string; create: string; inserts: string[] }[]>;

/** Drops schemas that an interrupted run left behind. */
export function dropLeftovers(migrateUrl: string): Promise<void>;

/** A URL with another schema name. */
export function withSchema(url: string, schema: string): string;
