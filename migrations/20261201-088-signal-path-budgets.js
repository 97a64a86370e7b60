'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`ALTER TABLE \`signal_path_revisions\`
      ADD COLUMN \`budget\` JSON NULL AFTER \`uncertainty_source\``);
  },
  async down(queryInterface) {
    await queryInterface.sequelize.query('ALTER TABLE `signal_path_revisions` DROP COLUMN `budget`');
  },
};
