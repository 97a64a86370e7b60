'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`CREATE TABLE \`sweep_file_parts\` (
      \`sweep_file_id\` BIGINT UNSIGNED NOT NULL,
      \`seq\` INT UNSIGNED NOT NULL,
      \`part\` MEDIUMBLOB NOT NULL,
      PRIMARY KEY (\`sweep_file_id\`, \`seq\`),
      CONSTRAINT \`fk_sweep_file_parts_sweep_file\` FOREIGN KEY (\`sweep_file_id\`) REFERENCES \`sweep_files\` (\`id\`)
    ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`);
  },
  async down(queryInterface) {
    await queryInterface.dropTable('sweep_file_parts');
  },
};
