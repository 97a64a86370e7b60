'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`CREATE TABLE \`signal_paths\` (
      \`id\` BIGINT UNSIGNED NOT NULL AUTO_INCREMENT,
      \`public_id\` CHAR(16) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`code\` VARCHAR(20) NOT NULL,
      \`name\` VARCHAR(160) NOT NULL,
      \`port\` ENUM('enclosure','ac-mains','wired-network') NOT NULL,
      \`position\` VARCHAR(60) NOT NULL,
      \`version\` INT UNSIGNED NOT NULL DEFAULT 1,
      \`created_at\` DATETIME(3) NOT NULL,
      \`updated_at\` DATETIME(3) NOT NULL,
      PRIMARY KEY (\`id\`),
      UNIQUE KEY \`uq_signal_paths_public\` (\`public_id\`),
      UNIQUE KEY \`uq_signal_paths_code\` (\`code\`)
    ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`);
  },
  async down(queryInterface) {
    await queryInterface.dropTable('signal_paths');
  },
};
