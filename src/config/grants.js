'use strict';

/*
 * The rights of the restricted account (DATABASE_URL), table by table. Applied after every migrate by the account that
 * owns the schema (DATABASE_MIGRATE_URL). There is no schema-wide grant: a table that is not named here cannot be
 * reached at all, and applying fails until somebody decides what the application may do with it.
 *
 * Rows that are facts (audit entries, evaluations, blobs, revisions) get SELECT and INSERT only.
 */

const ALLOWED = ['SELECT', 'INSERT', 'UPDATE', 'DELETE'];

/** Table privileges that are taken away when a table's row above does not name them. */
const TABLE_PRIVILEGES = [
  ...ALLOWED,
  'CREATE',
  'DROP',
  'REFERENCES',
  'INDEX',
  'ALTER',
  'CREATE VIEW',
  'SHOW VIEW',
  'TRIGGER',
  'DELETE HISTORY',
  'GRANT OPTION',
];

/** @type {Record<string, ReadonlyArray<'SELECT' | 'INSERT' | 'UPDATE' | 'DELETE'>>} */
const RIGHTS = {
  // read by /api/ready: is every migration this build knows applied?
  SequelizeMeta: ['SELECT'],

  // state that changes
  organisations: ['SELECT', 'INSERT', 'UPDATE'],
  users: ['SELECT', 'INSERT', 'UPDATE'],
  authenticators: ['SELECT', 'INSERT', 'UPDATE', 'DELETE'],
  sessions: ['SELECT', 'INSERT', 'UPDATE', 'DELETE'],
  throttles: ['SELECT', 'INSERT', 'UPDATE', 'DELETE'],
  api_tokens: ['SELECT', 'INSERT', 'UPDATE'],
  idempotency_keys: ['SELECT', 'INSERT', 'DELETE'],
  audit_chains: ['SELECT', 'INSERT', 'UPDATE'],
  outbox: ['SELECT', 'INSERT', 'UPDATE', 'DELETE'],
  one_time_links: ['SELECT', 'INSERT', 'UPDATE', 'DELETE'],
  // the demo's letters; housekeeping removes them
  caught_mails: ['SELECT', 'INSERT', 'DELETE'],
  counters: ['SELECT', 'INSERT', 'UPDATE'],
  settings: ['SELECT', 'INSERT', 'UPDATE'],
  products: ['SELECT', 'INSERT', 'UPDATE'],
  product_clocks: ['SELECT', 'INSERT', 'UPDATE'],
  jobs: ['SELECT', 'INSERT', 'UPDATE'],
  samples: ['SELECT', 'INSERT', 'UPDATE'],
  modification_states: ['SELECT', 'INSERT', 'UPDATE'],
  equipment: ['SELECT', 'INSERT', 'UPDATE'],
  signal_paths: ['SELECT', 'INSERT', 'UPDATE'],
  limit_sets: ['SELECT', 'INSERT', 'UPDATE'],
  // Housekeeping deletes runs that never became whole, and with them their segments and file parts (ON DELETE CASCADE).
  // A run that did has an evaluation and a file that a run names cannot go: their foreign keys refuse.
  sweeps: ['SELECT', 'INSERT', 'UPDATE', 'DELETE'],
  retests: ['SELECT', 'INSERT', 'UPDATE'],
  test_positions: ['SELECT', 'INSERT', 'UPDATE'],
  bookings: ['SELECT', 'INSERT', 'UPDATE'],
  booking_guards: ['SELECT', 'INSERT', 'UPDATE'],
  // captions are corrected and pictures withdrawn; their bytes are facts
  photos: ['SELECT', 'INSERT', 'UPDATE'],
  file_shapes: ['SELECT', 'INSERT', 'UPDATE'],
  sweep_files: ['SELECT', 'INSERT', 'DELETE'],
  import_turns: ['SELECT', 'INSERT', 'UPDATE'],
  // files that nobody has kept yet; housekeeping removes them
  uploads: ['SELECT', 'INSERT', 'DELETE'],
  upload_parts: ['SELECT', 'INSERT', 'DELETE'],

  // facts: written once
  audit_entries: ['SELECT', 'INSERT'],
  calibrations: ['SELECT', 'INSERT'],
  factor_table_revisions: ['SELECT', 'INSERT'],
  signal_path_revisions: ['SELECT', 'INSERT'],
  limit_line_revisions: ['SELECT', 'INSERT'],
  sweep_file_parts: ['SELECT', 'INSERT'],
  sweep_segments: ['SELECT', 'INSERT'],
  trace_segments: ['SELECT', 'INSERT'],
  setup_records: ['SELECT', 'INSERT'],
  photo_parts: ['SELECT', 'INSERT'],
  evaluations: ['SELECT', 'INSERT'],
  retest_changes: ['SELECT', 'INSERT'],
  custody_moves: ['SELECT', 'INSERT'],
  notes: ['SELECT', 'INSERT'],
  evaluation_candidates: ['SELECT', 'INSERT'],
  evaluation_layers: ['SELECT', 'INSERT'],
  result_mails: ['SELECT', 'INSERT'],
};

/** No such grant (1141, 1147); or the owner may not revoke on the whole schema (1044), which `tooWide` then finds. */
const NOTHING_TO_REVOKE = [1141, 1147, 1044];

/** Runs a REVOKE; that there was nothing to revoke is fine. */
async function revoke(connection, sql) {
  try {
    await connection.query(sql);
  } catch (error) {
    if (!NOTHING_TO_REVOKE.includes(error.errno)) throw error;
  }
}

/** `'user'@'host'` with both parts quoted. */
function accountName(user, host) {
  const quote = (text) => `'${text.replace(/[\\']/g, (c) => `\\${c}`)}'`;
  return `${quote(user)}@${quote(host)}`;
}

/**
 * Gives the restricted account exactly the rights of `rights`, on tables that exist. Grants first and revokes the rest
 * afterwards, so that a running application never loses a right it keeps.
 *
 * @param {{ query(sql: string, values?: unknown[]): Promise<any> }} connection open, as the owner of the schema
 * @param {string} user name of the restricted account
 * @param {string[]} hosts host parts of that account, e.g. ['127.0.0.1', 'localhost']
 * @param {string} database name of the schema
 * @param {Record<string, readonly string[]>} [rights] the map above unless a test passes its own
 * @returns {Promise<number>} how many tables were granted
 * @throws {Error} when a table of the schema is not named in `rights`, or a right is not one of the four allowed
 */
async function applyGrants(connection, user, hosts, database, rights = RIGHTS) {
  for (const [table, list] of Object.entries(rights)) {
    const odd = list.filter((right) => !ALLOWED.includes(right));
    if (odd.length) throw new Error(`grants: ${odd.join(', ')} on ${table} is not one of ${ALLOWED.join(', ')}`);
  }
  const rows = await connection.query(
    'SELECT table_name AS name FROM information_schema.tables WHERE table_schema = ?',
    [database],
  );
  const tables = rows.map((row) => row.name).sort();
  const unnamed = tables.filter((table) => !Object.prototype.hasOwnProperty.call(rights, table));
  if (unnamed.length) {
    throw new Error(
      `grants: ${unnamed.join(', ')} not named in src/config/grants.js; add a row with the rights the application needs`,
    );
  }
  for (const host of hosts) {
    const account = accountName(user, host);
    for (const table of tables) {
      const granted = rights[table];
      const target = `\`${database}\`.\`${table}\``;
      if (granted.length) await connection.query(`GRANT ${granted.join(', ')} ON ${target} TO ${account}`);
      const rest = TABLE_PRIVILEGES.filter((right) => !granted.includes(right));
      await revoke(connection, `REVOKE ${rest.join(', ')} ON ${target} FROM ${account}`);
    }
    await revoke(connection, `REVOKE ALL PRIVILEGES ON \`${database}\`.* FROM ${account}`);
    await revoke(connection, `REVOKE GRANT OPTION ON \`${database}\`.* FROM ${account}`);
  }
  return tables.length;
}

/**
 * Rights of the account of this connection that reach beyond single tables, which would make the map above worthless.
 * @param {{ query(sql: string): Promise<any> }} connection open, as the restricted account
 * @returns {Promise<string[]>} the GRANT statements without passwords; empty when all is well
 */
async function tooWide(connection) {
  const rows = await connection.query('SHOW GRANTS');
  return rows
    .map((row) => String(Object.values(row)[0]).replace(/ IDENTIFIED .*$/, ''))
    .filter((grant) => / ON (\*|`[^`]*`)\.\* TO /.test(grant) && !grant.startsWith('GRANT USAGE ON'));
}

module.exports = { RIGHTS, applyGrants, tooWide };
