'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`CREATE TABLE \`upload_parts\` (
      \`upload_id\` BIGINT UNSIGNED NOT NULL,
      \`seq\` INT UNSIGNED NOT NULL,
      \`part\` MEDIUMBLOB NOT NULL,
      PRIMARY KEY (\`upload_id\`, \`seq\`),
      CONSTRAINT \`fk_upload_parts_upload\` FOREIGN KEY (\`upload_id\`) REFERENCES \`uploads\` (\`id\`) ON DELETE CASCADE
    ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`);
  },
  async down(queryInterface) {
    await queryInterface.dropTable('upload_parts');
  },
};
