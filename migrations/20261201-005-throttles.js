'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`CREATE TABLE \`throttles\` (
      \`key_hash\` CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`failures\` INT UNSIGNED NOT NULL,
      \`last_failure_at\` DATETIME(3) NOT NULL,
      \`blocked_until\` DATETIME(3) NULL,
      PRIMARY KEY (\`key_hash\`)
    ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`);
  },
  async down(queryInterface) {
    await queryInterface.dropTable('throttles');
  },
};
