'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`CREATE TABLE \`api_tokens\` (
      \`id\` BIGINT UNSIGNED NOT NULL AUTO_INCREMENT,
      \`public_id\` CHAR(16) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`user_id\` BIGINT UNSIGNED NOT NULL,
      \`name\` VARCHAR(80) NOT NULL,
      \`token_hash\` CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`scopes\` JSON NOT NULL,
      \`last_used_at\` DATETIME(3) NULL,
      \`expires_at\` DATETIME(3) NULL,
      \`revoked_at\` DATETIME(3) NULL,
      \`created_at\` DATETIME(3) NOT NULL,
      PRIMARY KEY (\`id\`),
      UNIQUE KEY \`uq_api_tokens_public\` (\`public_id\`),
      UNIQUE KEY \`uq_api_tokens_token_hash\` (\`token_hash\`),
      KEY \`ix_api_tokens_user\` (\`user_id\`),
      CONSTRAINT \`fk_api_tokens_user\` FOREIGN KEY (\`user_id\`) REFERENCES \`users\` (\`id\`)
    ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`);
  },
  async down(queryInterface) {
    await queryInterface.dropTable('api_tokens');
  },
};
