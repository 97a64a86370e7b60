'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`CREATE TABLE \`caught_mails\` (
      \`id\` BIGINT UNSIGNED NOT NULL AUTO_INCREMENT,
      \`public_id\` CHAR(16) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`message_id\` VARCHAR(200) NOT NULL,
      \`sender\` VARCHAR(400) NOT NULL,
      \`recipient\` VARCHAR(400) NOT NULL,
      \`subject\` VARCHAR(500) NOT NULL,
      \`text\` MEDIUMTEXT NOT NULL,
      \`expires_at\` DATETIME(3) NOT NULL,
      \`created_at\` DATETIME(3) NOT NULL,
      PRIMARY KEY (\`id\`),
      UNIQUE KEY \`uq_caught_mails_public\` (\`public_id\`),
      KEY \`ix_caught_mails_expires_at\` (\`expires_at\`)
    ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`);
  },
  async down(queryInterface) {
    await queryInterface.dropTable('caught_mails');
  },
};
