'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`CREATE TABLE \`counters\` (
      \`scope\` VARCHAR(40) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`value\` BIGINT UNSIGNED NOT NULL,
      PRIMARY KEY (\`scope\`)
    ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`);
  },
  async down(queryInterface) {
    await queryInterface.dropTable('counters');
  },
};
