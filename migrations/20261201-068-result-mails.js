'use strict';

/* What was sent, as it was sent: one row per message, so one per recipient; one press of the button is one `sending_id`. */

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`CREATE TABLE \`result_mails\` (
      \`id\` BIGINT UNSIGNED NOT NULL AUTO_INCREMENT,
      \`public_id\` CHAR(16) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`sending_id\` CHAR(16) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`sample_id\` BIGINT UNSIGNED NOT NULL,
      \`state_id\` BIGINT UNSIGNED NOT NULL,
      \`recipient_id\` BIGINT UNSIGNED NOT NULL,
      \`subject\` VARCHAR(300) NOT NULL,
      \`text\` MEDIUMTEXT NOT NULL,
      \`html\` MEDIUMTEXT NOT NULL,
      \`evaluation_ids\` JSON NOT NULL,
      \`outbox_id\` BIGINT UNSIGNED NOT NULL,
      \`sender_id\` BIGINT UNSIGNED NOT NULL,
      \`created_at\` DATETIME(3) NOT NULL,
      PRIMARY KEY (\`id\`),
      UNIQUE KEY \`uq_result_mails_public\` (\`public_id\`),
      UNIQUE KEY \`uq_result_mails_sending_recipient\` (\`sending_id\`, \`recipient_id\`),
      KEY \`ix_result_mails_state_id\` (\`state_id\`, \`id\`),
      KEY \`ix_result_mails_sample_id\` (\`sample_id\`, \`id\`),
      CONSTRAINT \`fk_result_mails_sample\` FOREIGN KEY (\`sample_id\`) REFERENCES \`samples\` (\`id\`),
      CONSTRAINT \`fk_result_mails_state\` FOREIGN KEY (\`state_id\`) REFERENCES \`modification_states\` (\`id\`),
      CONSTRAINT \`fk_result_mails_recipient\` FOREIGN KEY (\`recipient_id\`) REFERENCES \`users\` (\`id\`),
      CONSTRAINT \`fk_result_mails_sender\` FOREIGN KEY (\`sender_id\`) REFERENCES \`users\` (\`id\`)
    ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`);
  },
  async down(queryInterface) {
    await queryInterface.dropTable('result_mails');
  },
};
