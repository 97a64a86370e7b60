'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`CREATE TABLE \`authenticators\` (
      \`id\` BIGINT UNSIGNED NOT NULL AUTO_INCREMENT,
      \`public_id\` CHAR(16) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`user_id\` BIGINT UNSIGNED NOT NULL,
      \`kind\` ENUM('totp','webauthn','recovery') NOT NULL,
      \`label\` VARCHAR(80) NOT NULL,
      \`secret\` VARBINARY(1024) NOT NULL,
      \`last_used_at\` DATETIME(3) NULL,
      \`created_at\` DATETIME(3) NOT NULL,
      PRIMARY KEY (\`id\`),
      UNIQUE KEY \`uq_authenticators_public\` (\`public_id\`),
      KEY \`ix_authenticators_user\` (\`user_id\`),
      CONSTRAINT \`fk_authenticators_user\` FOREIGN KEY (\`user_id\`) REFERENCES \`users\` (\`id\`)
    ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`);
  },
  async down(queryInterface) {
    await queryInterface.dropTable('authenticators');
  },
};
