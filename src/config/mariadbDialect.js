'use strict';

/*
 * The mariadb driver as Sequelize 6 expects it.
 *
 * From version 3.1 the driver defines `meta` on a result array as a property that cannot be deleted, and Sequelize's
 * raw query path deletes it ("Cannot delete property 'meta'"). This module is handed to Sequelize as `dialectModule`:
 * every connection it opens answers with a copy of the array on which `meta` can be deleted.
 */

const mariadb = require('mariadb');

/**
 * @param {unknown} result what the driver answered: an array of rows, or an object for writes (returned as it is)
 * @returns {unknown} for an array that carries `meta`: a copy with `meta` as a deletable, non-enumerable property
 */
function withDeletableMeta(result) {
  if (!Array.isArray(result) || !Object.prototype.hasOwnProperty.call(result, 'meta')) return result;
  const copy = result.slice();
  Object.defineProperty(copy, 'meta', { value: result.meta, configurable: true, writable: true, enumerable: false });
  return copy;
}

/** Opens a connection like `mariadb.createConnection`; its `query` answers through `withDeletableMeta`. */
async function createConnection(options) {
  const connection = await mariadb.createConnection(options);
  const query = connection.query.bind(connection);
  connection.query = async (sql, values) => withDeletableMeta(await query(sql, values));
  return connection;
}

module.exports = { ...mariadb, createConnection, withDeletableMeta };
