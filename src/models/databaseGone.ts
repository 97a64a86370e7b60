interface DriverError {
  name?: string;
  errno?: number;
  sqlState?: string | null;
  fatal?: boolean;
  original?: DriverError;
  parent?: DriverError;
}

/** No connection was to be had: refused, timed out, unknown host, or none free in time. */
const NO_CONNECTION = /^Sequelize(Connection|HostNot|AccessDenied|InvalidConnection)/;
/**
 * The server's own words for going: shutdown (1053, 1077, 1079), packets that do not come (1158 to 1161), connection
 * killed (1927), gone away and lost (2006, 2013), a node that is no part of its cluster (1047).
 */
const GOING = new Set([1047, 1053, 1077, 1079, 1158, 1159, 1160, 1161, 1927, 2006, 2013]);

/** Whether an error means that the database went or is not there, rather than that it refused what was asked. */
function meansGone(error: unknown): boolean {
  if (typeof error !== 'object' || error === null) return false;
  const { name = '', original, parent } = error as DriverError;
  if (NO_CONNECTION.test(name)) return true;
  const { errno, sqlState, fatal } = original ?? parent ?? (error as DriverError);
  if (errno !== undefined && GOING.has(errno)) return true;
  // A fatal error of the system's own (ECONNRESET is -104) is the socket's. SQLSTATE class 08 is a connection exception
  // (ISO/IEC 9075-2, table 38), 70100 an interrupted query.
  const socket = errno !== undefined && errno < 0;
  return fatal === true && (socket || sqlState?.startsWith('08') === true || sqlState === '70100');
}

/**
 * The database does not answer. Programs tell it by `digest`, which reaches the page that shows an error as well and is
 * the same in every bundle's copy of this class.
 */
export class DatabaseGone extends Error {
  override readonly name = 'DatabaseGone';
  readonly digest = 'database-gone';

  constructor(
    cause: unknown,
    /** COMMIT was sent and its answer did not come: the unit is there whole, or not at all. */
    readonly uncertain: boolean,
  ) {
    super(`The database does not answer: ${cause instanceof Error ? cause.message : String(cause)}`, { cause });
  }
}

/** The error itself, or DatabaseGone where that is what it means. */
export function asGone(error: unknown, uncertain: boolean): unknown {
  return meansGone(error) && !isGone(error) ? new DatabaseGone(error, uncertain) : error;
}

export function isGone(error: unknown): error is DatabaseGone {
  return (error as Partial<DatabaseGone> | null)?.digest === 'database-gone';
}
