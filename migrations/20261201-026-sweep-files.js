'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`CREATE TABLE \`sweep_files\` (
      \`id\` BIGINT UNSIGNED NOT NULL AUTO_INCREMENT,
      \`public_id\` CHAR(16) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`sha256\` CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`name\` VARCHAR(200) NOT NULL,
      \`bytes\` INT UNSIGNED NOT NULL,
      \`recognition\` JSON NOT NULL,
      \`user_id\` BIGINT UNSIGNED NOT NULL,
      \`created_at\` DATETIME(3) NOT NULL,
      PRIMARY KEY (\`id\`),
      UNIQUE KEY \`uq_sweep_files_public\` (\`public_id\`),
      KEY \`ix_sweep_files_sha256\` (\`sha256\`),
      CONSTRAINT \`fk_sweep_files_user\` FOREIGN KEY (\`user_id\`) REFERENCES \`users\` (\`id\`)
    ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`);
  },
  async down(queryInterface) {
    await queryInterface.dropTable('sweep_files');
  },
};
