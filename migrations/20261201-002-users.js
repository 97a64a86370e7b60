'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`CREATE TABLE \`users\` (
      \`id\` BIGINT UNSIGNED NOT NULL AUTO_INCREMENT,
      \`public_id\` CHAR(16) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`organisation_id\` BIGINT UNSIGNED NOT NULL,
      \`role\` ENUM('manager','technician','designer') NOT NULL,
      \`name\` VARCHAR(120) NOT NULL,
      \`email\` VARCHAR(254) NOT NULL,
      \`password_hash\` VARCHAR(200) CHARACTER SET ascii COLLATE ascii_bin NULL,
      \`disabled_at\` DATETIME(3) NULL,
      \`version\` INT UNSIGNED NOT NULL DEFAULT 1,
      \`created_at\` DATETIME(3) NOT NULL,
      \`updated_at\` DATETIME(3) NOT NULL,
      PRIMARY KEY (\`id\`),
      UNIQUE KEY \`uq_users_public\` (\`public_id\`),
      UNIQUE KEY \`uq_users_email\` (\`email\`),
      KEY \`ix_users_organisation_id\` (\`organisation_id\`, \`id\`),
      CONSTRAINT \`fk_users_organisation\` FOREIGN KEY (\`organisation_id\`) REFERENCES \`organisations\` (\`id\`)
    ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`);
  },
  async down(queryInterface) {
    await queryInterface.dropTable('users');
  },
};
