'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`CREATE TABLE \`samples\` (
      \`id\` BIGINT UNSIGNED NOT NULL AUTO_INCREMENT,
      \`public_id\` CHAR(16) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`job_id\` BIGINT UNSIGNED NOT NULL,
      \`code\` VARCHAR(20) NOT NULL,
      \`serial\` VARCHAR(80) NOT NULL,
      \`firmware\` VARCHAR(80) NOT NULL,
      \`description\` VARCHAR(2000) NOT NULL,
      \`version\` INT UNSIGNED NOT NULL DEFAULT 1,
      \`created_at\` DATETIME(3) NOT NULL,
      \`updated_at\` DATETIME(3) NOT NULL,
      PRIMARY KEY (\`id\`),
      UNIQUE KEY \`uq_samples_public\` (\`public_id\`),
      UNIQUE KEY \`uq_samples_job_code\` (\`job_id\`, \`code\`),
      CONSTRAINT \`fk_samples_job\` FOREIGN KEY (\`job_id\`) REFERENCES \`jobs\` (\`id\`)
    ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`);
  },
  async down(queryInterface) {
    await queryInterface.dropTable('samples');
  },
};
