import type { Connection } from 'mariadb';

export type Right = 'SELECT' | 'INSERT' | 'UPDATE' | 'DELETE';

/** The rights of the restricted account, table by table. */
export const RIGHTS: Readonly<Record<string, readonly Right[]>>;

/** Gives the restricted account exactly the rights of the map; throws for a table the map does not name. */
export function applyGrants(
  connection: Pick<Connection, 'query'>,
  user: string,
  hosts: readonly string[],
  database: string,
  rights?: Readonly<Record<string, readonly string[]>>,
): Promise<number>;

/** Rights of the account of this connection that reach beyond single tables. */
export function tooWide(connection: Pick<Connection, 'query'>): Promise<string[]>;
