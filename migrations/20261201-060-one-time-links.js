'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`CREATE TABLE \`one_time_links\` (
      \`id\` BIGINT UNSIGNED NOT NULL AUTO_INCREMENT,
      \`public_id\` CHAR(16) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`kind\` ENUM('reset','invitation') NOT NULL,
      \`user_id\` BIGINT UNSIGNED NOT NULL,
      \`token_hash\` CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`outbox_id\` BIGINT UNSIGNED NULL,
      \`expires_at\` DATETIME(3) NOT NULL,
      \`used_at\` DATETIME(3) NULL,
      \`ended_at\` DATETIME(3) NULL,
      \`created_at\` DATETIME(3) NOT NULL,
      PRIMARY KEY (\`id\`),
      UNIQUE KEY \`uq_one_time_links_public\` (\`public_id\`),
      UNIQUE KEY \`uq_one_time_links_token_hash\` (\`token_hash\`),
      KEY \`ix_one_time_links_user_id\` (\`user_id\`, \`id\`),
      KEY \`ix_one_time_links_expires_at\` (\`expires_at\`),
      CONSTRAINT \`fk_one_time_links_user\` FOREIGN KEY (\`user_id\`) REFERENCES \`users\` (\`id\`)
    ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`);
  },
  async down(queryInterface) {
    await queryInterface.dropTable('one_time_links');
  },
};
