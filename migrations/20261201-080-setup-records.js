'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`CREATE TABLE \`setup_records\` (
      \`id\` BIGINT UNSIGNED NOT NULL AUTO_INCREMENT,
      \`sweep_id\` BIGINT UNSIGNED NOT NULL,
      \`revision\` SMALLINT UNSIGNED NOT NULL,
      \`operating_mode\` VARCHAR(300) NULL,
      \`supply_kind\` ENUM('ac','dc') NULL,
      \`supply_v\` DOUBLE NULL,
      \`supply_frequency_hz\` DOUBLE NULL,
      \`supply_source\` VARCHAR(120) NULL,
      \`cable_layout\` VARCHAR(1000) NULL,
      \`ancillary\` VARCHAR(1000) NULL,
      \`temperature_c\` DOUBLE NULL,
      \`humidity_pct\` DOUBLE NULL,
      \`deviations\` VARCHAR(1000) NULL,
      \`eut_stayed\` ENUM('yes','no','not-watched') NULL,
      \`what_happened\` VARCHAR(500) NULL,
      \`reason\` VARCHAR(300) NULL,
      \`user_id\` BIGINT UNSIGNED NOT NULL,
      \`created_at\` DATETIME(3) NOT NULL,
      PRIMARY KEY (\`id\`),
      UNIQUE KEY \`uq_setup_records_revision\` (\`sweep_id\`, \`revision\`),
      CONSTRAINT \`fk_setup_records_sweep\` FOREIGN KEY (\`sweep_id\`) REFERENCES \`sweeps\` (\`id\`),
      CONSTRAINT \`fk_setup_records_user\` FOREIGN KEY (\`user_id\`) REFERENCES \`users\` (\`id\`)
    ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`);
  },
  async down(queryInterface) {
    await queryInterface.dropTable('setup_records');
  },
};
