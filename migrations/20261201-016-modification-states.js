'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`CREATE TABLE \`modification_states\` (
      \`id\` BIGINT UNSIGNED NOT NULL AUTO_INCREMENT,
      \`public_id\` CHAR(16) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`sample_id\` BIGINT UNSIGNED NOT NULL,
      \`position\` SMALLINT UNSIGNED NOT NULL,
      \`description\` VARCHAR(300) NOT NULL,
      \`planned\` BOOLEAN NOT NULL DEFAULT FALSE,
      \`version\` INT UNSIGNED NOT NULL DEFAULT 1,
      \`created_at\` DATETIME(3) NOT NULL,
      \`updated_at\` DATETIME(3) NOT NULL,
      PRIMARY KEY (\`id\`),
      UNIQUE KEY \`uq_modification_states_public\` (\`public_id\`),
      UNIQUE KEY \`uq_modification_states_sample_position\` (\`sample_id\`, \`position\`),
      CONSTRAINT \`fk_modification_states_sample\` FOREIGN KEY (\`sample_id\`) REFERENCES \`samples\` (\`id\`)
    ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`);
  },
  async down(queryInterface) {
    await queryInterface.dropTable('modification_states');
  },
};
