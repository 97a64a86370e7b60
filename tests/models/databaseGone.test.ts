import { ConnectionAcquireTimeoutError, ConnectionRefusedError, DatabaseError, UniqueConstraintError } from 'sequelize';
import { asGone, DatabaseGone, isGone } from '@/models/databaseGone';

/** What the driver throws, as seen when a server was killed, stopped and restarted under it. */
const driver = (more: object) => Object.assign(new Error('from the driver'), { sql: 'SELECT 1', ...more });
const fromQuery = (more: object) => new DatabaseError(driver(more) as never);

test.each([
  ['no connection: refused', new ConnectionRefusedError(new Error('x'))],
  ['no connection: none free in time', new ConnectionAcquireTimeoutError(new Error('x'))],
  ['the socket was reset', fromQuery({ errno: -104, code: 'ECONNRESET', sqlState: 'HY000', fatal: true })],
  [
    'the socket was closed',
    fromQuery({ errno: 45009, code: 'ER_SOCKET_UNEXPECTED_CLOSE', sqlState: '08S01', fatal: true }),
  ],
  ['nothing came for too long', fromQuery({ errno: 45026, code: 'ER_SOCKET_TIMEOUT', sqlState: '08S01', fatal: true })],
  ['the server is shutting down', fromQuery({ errno: 1053, sqlState: '08S01', fatal: false })],
  ['the connection was killed', fromQuery({ errno: 1927, sqlState: '70100', fatal: true })],
])('%s: the database is gone', (_what, error) => {
  const gone = asGone(error, true);
  expect(gone).toBeInstanceOf(DatabaseGone);
  expect([isGone(gone), (gone as DatabaseGone).uncertain, (gone as DatabaseGone).digest]).toEqual([
    true,
    true,
    'database-gone',
  ]);
  expect(asGone(gone, false)).toBe(gone);
});

test.each([
  ['a deadlock', fromQuery({ errno: 1213, sqlState: '40001', fatal: false })],
  ['a right that is missing', fromQuery({ errno: 1142, sqlState: '42000', fatal: false })],
  ['a value twice', new UniqueConstraintError({ errors: [] })],
  ['a fault of ours', new TypeError('x')],
  ['nothing', null],
])('%s: it is there, and refused', (_what, error) => {
  expect(asGone(error, false)).toBe(error);
  expect(isGone(error)).toBe(false);
});
