'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`CREATE TABLE \`sessions\` (
      \`id\` BIGINT UNSIGNED NOT NULL AUTO_INCREMENT,
      \`public_id\` CHAR(16) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`token_hash\` CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`user_id\` BIGINT UNSIGNED NOT NULL,
      \`assurance_level\` TINYINT UNSIGNED NOT NULL DEFAULT 1,
      \`authenticated_at\` DATETIME(3) NOT NULL,
      \`last_seen_at\` DATETIME(3) NOT NULL,
      \`expires_at\` DATETIME(3) NOT NULL,
      \`address\` VARCHAR(45) NOT NULL,
      \`agent\` VARCHAR(200) NOT NULL,
      \`ended_at\` DATETIME(3) NULL,
      \`created_at\` DATETIME(3) NOT NULL,
      PRIMARY KEY (\`id\`),
      UNIQUE KEY \`uq_sessions_public\` (\`public_id\`),
      UNIQUE KEY \`uq_sessions_token_hash\` (\`token_hash\`),
      KEY \`ix_sessions_user_id\` (\`user_id\`, \`id\`),
      KEY \`ix_sessions_expires_at\` (\`expires_at\`),
      CONSTRAINT \`fk_sessions_user\` FOREIGN KEY (\`user_id\`) REFERENCES \`users\` (\`id\`)
    ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`);
  },
  async down(queryInterface) {
    await queryInterface.dropTable('sessions');
  },
};
