'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`CREATE TABLE \`test_positions\` (
      \`id\` BIGINT UNSIGNED NOT NULL AUTO_INCREMENT,
      \`public_id\` CHAR(16) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`code\` VARCHAR(8) NOT NULL,
      \`name\` VARCHAR(80) NOT NULL,
      \`description\` VARCHAR(500) NOT NULL,
      \`capabilities\` JSON NOT NULL,
      \`state\` ENUM('in-use','retired') NOT NULL DEFAULT 'in-use',
      \`version\` INT UNSIGNED NOT NULL DEFAULT 1,
      \`created_at\` DATETIME(3) NOT NULL,
      \`updated_at\` DATETIME(3) NOT NULL,
      PRIMARY KEY (\`id\`),
      UNIQUE KEY \`uq_test_positions_public\` (\`public_id\`),
      UNIQUE KEY \`uq_test_positions_code\` (\`code\`)
    ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`);
  },
  async down(queryInterface) {
    await queryInterface.dropTable('test_positions');
  },
};
