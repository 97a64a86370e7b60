'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`CREATE TABLE \`custody_moves\` (
      \`id\` BIGINT UNSIGNED NOT NULL AUTO_INCREMENT,
      \`public_id\` CHAR(16) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`sample_id\` BIGINT UNSIGNED NOT NULL,
      \`place\` VARCHAR(160) NOT NULL,
      \`note\` VARCHAR(400) NOT NULL,
      \`user_id\` BIGINT UNSIGNED NOT NULL,
      \`created_at\` DATETIME(3) NOT NULL,
      PRIMARY KEY (\`id\`),
      UNIQUE KEY \`uq_custody_moves_public\` (\`public_id\`),
      KEY \`ix_custody_moves_sample\` (\`sample_id\`, \`id\`),
      CONSTRAINT \`fk_custody_moves_sample\` FOREIGN KEY (\`sample_id\`) REFERENCES \`samples\` (\`id\`),
      CONSTRAINT \`fk_custody_moves_user\` FOREIGN KEY (\`user_id\`) REFERENCES \`users\` (\`id\`)
    ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`);
  },
  async down(queryInterface) {
    await queryInterface.dropTable('custody_moves');
  },
};
