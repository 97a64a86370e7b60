'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`CREATE TABLE \`idempotency_keys\` (
      \`id\` BIGINT UNSIGNED NOT NULL AUTO_INCREMENT,
      \`user_id\` BIGINT UNSIGNED NOT NULL,
      \`key\` VARCHAR(80) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`operation\` VARCHAR(80) NOT NULL,
      \`request_hash\` CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`status\` SMALLINT UNSIGNED NOT NULL,
      \`reply\` LONGTEXT NOT NULL,
      \`expires_at\` DATETIME(3) NOT NULL,
      \`created_at\` DATETIME(3) NOT NULL,
      PRIMARY KEY (\`id\`),
      UNIQUE KEY \`uq_idempotency_keys_user_key\` (\`user_id\`, \`key\`),
      KEY \`ix_idempotency_keys_expires_at\` (\`expires_at\`),
      CONSTRAINT \`fk_idempotency_keys_user\` FOREIGN KEY (\`user_id\`) REFERENCES \`users\` (\`id\`)
    ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`);
  },
  async down(queryInterface) {
    await queryInterface.dropTable('idempotency_keys');
  },
};
