'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`CREATE TABLE \`trace_segments\` (
      \`sweep_id\` BIGINT UNSIGNED NOT NULL,
      \`trace_index\` SMALLINT UNSIGNED NOT NULL,
      \`seq\` INT UNSIGNED NOT NULL,
      \`low_level\` FLOAT NULL,
      \`high_level\` FLOAT NULL,
      \`levels\` MEDIUMBLOB NOT NULL,
      PRIMARY KEY (\`sweep_id\`, \`trace_index\`, \`seq\`),
      CONSTRAINT \`fk_trace_segments_sweep\` FOREIGN KEY (\`sweep_id\`) REFERENCES \`sweeps\` (\`id\`)
    ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`);
  },
  async down(queryInterface) {
    await queryInterface.dropTable('trace_segments');
  },
};
