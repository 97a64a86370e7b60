export const APPLICATION: string;
export const OWNER: string;
export const HOSTS: readonly string[];

export interface PrivateDatabase {
  port: number;
  pid: number;
  databaseUrl: string;
  migrateUrl: string;
  stop(): Promise<void>;
}

/** Starts the private database of a state directory, or finds it running. */
export function startDatabase(options: {
  state: string;
  database?: string;
  manySchemas?: boolean;
  port?: number;
  wantedPort?: number;
  durable?: boolean;
  keepRunning?: boolean;
  tell?: (text: string) => void;
}): Promise<PrivateDatabase>;

/** Stops the private database of a state directory and waits until it has ended. */
export function stopDatabase(state: string): Promise<void>;
