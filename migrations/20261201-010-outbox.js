'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`CREATE TABLE \`outbox\` (
      \`id\` BIGINT UNSIGNED NOT NULL AUTO_INCREMENT,
      \`kind\` VARCHAR(40) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`payload\` JSON NOT NULL,
      \`state\` ENUM('queued','sending','sent','refused') NOT NULL DEFAULT 'queued',
      \`available_at\` DATETIME(3) NOT NULL,
      \`leased_until\` DATETIME(3) NULL,
      \`lease_owner\` VARCHAR(40) NULL,
      \`attempts\` INT UNSIGNED NOT NULL DEFAULT 0,
      \`message_id\` VARCHAR(160) NULL,
      \`last_error\` VARCHAR(500) NULL,
      \`created_at\` DATETIME(3) NOT NULL,
      \`done_at\` DATETIME(3) NULL,
      PRIMARY KEY (\`id\`),
      KEY \`ix_outbox_state_available_at\` (\`state\`, \`available_at\`)
    ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`);
  },
  async down(queryInterface) {
    await queryInterface.dropTable('outbox');
  },
};
