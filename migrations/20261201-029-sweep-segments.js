'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`CREATE TABLE \`sweep_segments\` (
      \`sweep_id\` BIGINT UNSIGNED NOT NULL,
      \`seq\` INT UNSIGNED NOT NULL,
      \`first_index\` INT UNSIGNED NOT NULL,
      \`points\` INT UNSIGNED NOT NULL,
      \`low_hz\` DOUBLE NOT NULL,
      \`high_hz\` DOUBLE NOT NULL,
      \`start_hz\` DOUBLE NULL,
      \`step_hz\` DOUBLE NULL,
      \`axis\` MEDIUMBLOB NULL,
      PRIMARY KEY (\`sweep_id\`, \`seq\`),
      CONSTRAINT \`fk_sweep_segments_sweep\` FOREIGN KEY (\`sweep_id\`) REFERENCES \`sweeps\` (\`id\`)
    ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`);
  },
  async down(queryInterface) {
    await queryInterface.dropTable('sweep_segments');
  },
};
