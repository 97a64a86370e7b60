'use strict';

/*
 * How the axis is written (0: as it is), and segments that go when their run does. Only a run that never got an
 * evaluation can go: fk_evaluations_sweep holds every other.
 */
module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`ALTER TABLE \`sweep_segments\`
      ADD COLUMN \`packing\` TINYINT UNSIGNED NOT NULL DEFAULT 0 AFTER \`step_hz\`,
      DROP FOREIGN KEY \`fk_sweep_segments_sweep\`,
      ADD CONSTRAINT \`fk_sweep_segments_run\` FOREIGN KEY (\`sweep_id\`) REFERENCES \`sweeps\` (\`id\`) ON DELETE CASCADE`);
  },
  async down(queryInterface) {
    await queryInterface.sequelize.query(`ALTER TABLE \`sweep_segments\`
      DROP FOREIGN KEY \`fk_sweep_segments_run\`,
      DROP COLUMN \`packing\`,
      ADD CONSTRAINT \`fk_sweep_segments_sweep\` FOREIGN KEY (\`sweep_id\`) REFERENCES \`sweeps\` (\`id\`)`);
  },
};
