'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`CREATE TABLE \`limit_sets\` (
      \`id\` BIGINT UNSIGNED NOT NULL AUTO_INCREMENT,
      \`public_id\` CHAR(16) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`name\` VARCHAR(160) NOT NULL,
      \`port\` ENUM('enclosure','ac-mains','wired-network') NOT NULL,
      \`distance_m\` DOUBLE NULL,
      \`revision\` INT UNSIGNED NOT NULL,
      \`line_revision_ids\` JSON NOT NULL,
      \`withdrawn_at\` DATETIME(3) NULL,
      \`created_at\` DATETIME(3) NOT NULL,
      PRIMARY KEY (\`id\`),
      UNIQUE KEY \`uq_limit_sets_public\` (\`public_id\`),
      UNIQUE KEY \`uq_limit_sets_name_revision\` (\`name\`, \`revision\`)
    ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`);
  },
  async down(queryInterface) {
    await queryInterface.dropTable('limit_sets');
  },
};
