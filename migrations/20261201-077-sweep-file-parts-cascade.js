'use strict';

/* The bytes go when their file does; fk_sweeps_sweep_file holds every file that a run was read from. */
module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`ALTER TABLE \`sweep_file_parts\`
      DROP FOREIGN KEY \`fk_sweep_file_parts_sweep_file\`,
      ADD CONSTRAINT \`fk_sweep_file_parts_file\` FOREIGN KEY (\`sweep_file_id\`) REFERENCES \`sweep_files\` (\`id\`) ON DELETE CASCADE`);
  },
  async down(queryInterface) {
    await queryInterface.sequelize.query(`ALTER TABLE \`sweep_file_parts\`
      DROP FOREIGN KEY \`fk_sweep_file_parts_file\`,
      ADD CONSTRAINT \`fk_sweep_file_parts_sweep_file\` FOREIGN KEY (\`sweep_file_id\`) REFERENCES \`sweep_files\` (\`id\`)`);
  },
};
