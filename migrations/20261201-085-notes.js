'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`CREATE TABLE \`notes\` (
      \`id\` BIGINT UNSIGNED NOT NULL AUTO_INCREMENT,
      \`public_id\` CHAR(16) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`job_id\` BIGINT UNSIGNED NULL,
      \`sample_id\` BIGINT UNSIGNED NULL,
      \`sweep_id\` BIGINT UNSIGNED NULL,
      \`organisation_id\` BIGINT UNSIGNED NOT NULL,
      \`audience\` ENUM('lab','client') NOT NULL,
      \`text\` VARCHAR(2000) NOT NULL,
      \`user_id\` BIGINT UNSIGNED NOT NULL,
      \`created_at\` DATETIME(3) NOT NULL,
      PRIMARY KEY (\`id\`),
      UNIQUE KEY \`uq_notes_public\` (\`public_id\`),
      KEY \`ix_notes_job\` (\`job_id\`, \`id\`),
      KEY \`ix_notes_sample\` (\`sample_id\`, \`id\`),
      KEY \`ix_notes_sweep\` (\`sweep_id\`, \`id\`),
      CONSTRAINT \`fk_notes_job\` FOREIGN KEY (\`job_id\`) REFERENCES \`jobs\` (\`id\`),
      CONSTRAINT \`fk_notes_sample\` FOREIGN KEY (\`sample_id\`) REFERENCES \`samples\` (\`id\`),
      CONSTRAINT \`fk_notes_sweep\` FOREIGN KEY (\`sweep_id\`) REFERENCES \`sweeps\` (\`id\`),
      CONSTRAINT \`fk_notes_organisation\` FOREIGN KEY (\`organisation_id\`) REFERENCES \`organisations\` (\`id\`),
      CONSTRAINT \`fk_notes_user\` FOREIGN KEY (\`user_id\`) REFERENCES \`users\` (\`id\`),
      CONSTRAINT \`ck_notes_about_one\` CHECK ((\`job_id\` IS NOT NULL) + (\`sample_id\` IS NOT NULL) + (\`sweep_id\` IS NOT NULL) = 1)
    ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`);
  },
  async down(queryInterface) {
    await queryInterface.dropTable('notes');
  },
};
