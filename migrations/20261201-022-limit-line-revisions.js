'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`CREATE TABLE \`limit_line_revisions\` (
      \`id\` BIGINT UNSIGNED NOT NULL AUTO_INCREMENT,
      \`public_id\` CHAR(16) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`line_key\` VARCHAR(60) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`revision\` INT UNSIGNED NOT NULL,
      \`name\` VARCHAR(200) NOT NULL,
      \`document\` VARCHAR(160) NOT NULL,
      \`class\` VARCHAR(120) NOT NULL,
      \`port\` VARCHAR(120) NOT NULL,
      \`detector\` ENUM('quasi-peak','average','peak') NOT NULL,
      \`bandwidth_hz\` DOUBLE NOT NULL,
      \`unit\` VARCHAR(10) NOT NULL,
      \`distance_m\` DOUBLE NULL,
      \`segments\` JSON NOT NULL,
      \`source\` VARCHAR(300) NOT NULL,
      \`basis\` VARCHAR(80) NOT NULL,
      \`created_at\` DATETIME(3) NOT NULL,
      PRIMARY KEY (\`id\`),
      UNIQUE KEY \`uq_limit_line_revisions_public\` (\`public_id\`),
      UNIQUE KEY \`uq_limit_line_revisions_line_key_revision\` (\`line_key\`, \`revision\`)
    ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`);
  },
  async down(queryInterface) {
    await queryInterface.dropTable('limit_line_revisions');
  },
};
