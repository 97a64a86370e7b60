'use strict';

const BEFORE = `'antenna-factor','loss','gain'`;
const NOW = `${BEFORE},'amn-voltage-division','aan-voltage-division','transfer-impedance','magnetic-antenna-factor','clamp-factor'`;

const quantityOf = (queryInterface, quantities) =>
  queryInterface.sequelize.query(
    `ALTER TABLE \`factor_table_revisions\` MODIFY \`quantity\` ENUM(${quantities}) NOT NULL`,
  );

module.exports = {
  up: (queryInterface) => quantityOf(queryInterface, NOW),
  /** Refused by the database while a table holds one of the added quantities. */
  down: (queryInterface) => quantityOf(queryInterface, BEFORE),
};
