'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`CREATE TABLE \`jobs\` (
      \`id\` BIGINT UNSIGNED NOT NULL AUTO_INCREMENT,
      \`public_id\` CHAR(16) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`number\` VARCHAR(20) NOT NULL,
      \`organisation_id\` BIGINT UNSIGNED NOT NULL,
      \`product_id\` BIGINT UNSIGNED NOT NULL,
      \`title\` VARCHAR(160) NOT NULL,
      \`decision_rule\` ENUM('guarded-by-u') NOT NULL,
      \`state\` ENUM('open','declined','closed') NOT NULL DEFAULT 'open',
      \`state_reason\` VARCHAR(500) NULL,
      \`version\` INT UNSIGNED NOT NULL DEFAULT 1,
      \`created_at\` DATETIME(3) NOT NULL,
      \`updated_at\` DATETIME(3) NOT NULL,
      PRIMARY KEY (\`id\`),
      UNIQUE KEY \`uq_jobs_public\` (\`public_id\`),
      UNIQUE KEY \`uq_jobs_number\` (\`number\`),
      KEY \`ix_jobs_organisation_id\` (\`organisation_id\`, \`id\`),
      CONSTRAINT \`fk_jobs_organisation\` FOREIGN KEY (\`organisation_id\`) REFERENCES \`organisations\` (\`id\`),
      CONSTRAINT \`fk_jobs_product\` FOREIGN KEY (\`product_id\`) REFERENCES \`products\` (\`id\`)
    ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`);
  },
  async down(queryInterface) {
    await queryInterface.dropTable('jobs');
  },
};
