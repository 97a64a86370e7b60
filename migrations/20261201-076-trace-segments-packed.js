'use strict';

/*
 * How the levels are written (0: as it is), and segments that go when their run does. Only a run that never got an
 * evaluation can go: fk_evaluations_sweep holds every other.
 */
module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`ALTER TABLE \`trace_segments\`
      ADD COLUMN \`packing\` TINYINT UNSIGNED NOT NULL DEFAULT 0 AFTER \`high_level\`,
      DROP FOREIGN KEY \`fk_trace_segments_sweep\`,
      ADD CONSTRAINT \`fk_trace_segments_run\` FOREIGN KEY (\`sweep_id\`) REFERENCES \`sweeps\` (\`id\`) ON DELETE CASCADE`);
  },
  async down(queryInterface) {
    await queryInterface.sequelize.query(`ALTER TABLE \`trace_segments\`
      DROP FOREIGN KEY \`fk_trace_segments_run\`,
      DROP COLUMN \`packing\`,
      ADD CONSTRAINT \`fk_trace_segments_sweep\` FOREIGN KEY (\`sweep_id\`) REFERENCES \`sweeps\` (\`id\`)`);
  },
};
