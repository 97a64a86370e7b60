'use strict';

/* What sequelize-cli connects with: the account that owns the schema. */

const { connectionOptions } = require('./database');

const url = process.env.DATABASE_MIGRATE_URL || process.env.DATABASE_URL;
if (!url) throw new Error('set DATABASE_MIGRATE_URL to the account that owns the schema');

module.exports = { ...connectionOptions(url), seederStorage: 'sequelize' };
