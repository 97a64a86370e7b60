'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`CREATE TABLE \`retest_changes\` (
      \`id\` BIGINT UNSIGNED NOT NULL AUTO_INCREMENT,
      \`retest_id\` BIGINT UNSIGNED NOT NULL,
      \`at\` DATETIME(3) NOT NULL,
      \`user_id\` BIGINT UNSIGNED NOT NULL,
      \`action\` ENUM('opened','updated','scheduled','measured','cleared','withdrawn','reopened') NOT NULL,
      \`from_status\` ENUM('waiting','scheduled','measured','cleared','withdrawn') NULL,
      \`to_status\` ENUM('waiting','scheduled','measured','cleared','withdrawn') NOT NULL,
      \`reason\` VARCHAR(400) NOT NULL,
      \`sweep_id\` BIGINT UNSIGNED NULL,
      \`margin_from_db\` DOUBLE NULL,
      \`margin_to_db\` DOUBLE NULL,
      \`scheduled_on\` DATE NULL,
      \`note\` VARCHAR(300) NULL,
      PRIMARY KEY (\`id\`),
      KEY \`ix_retest_changes_retest\` (\`retest_id\`, \`id\`),
      KEY \`ix_retest_changes_sweep\` (\`sweep_id\`),
      CONSTRAINT \`fk_retest_changes_retest\` FOREIGN KEY (\`retest_id\`) REFERENCES \`retests\` (\`id\`),
      CONSTRAINT \`fk_retest_changes_user\` FOREIGN KEY (\`user_id\`) REFERENCES \`users\` (\`id\`),
      CONSTRAINT \`fk_retest_changes_sweep\` FOREIGN KEY (\`sweep_id\`) REFERENCES \`sweeps\` (\`id\`)
    ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`);
  },
  async down(queryInterface) {
    await queryInterface.dropTable('retest_changes');
  },
};
