'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(
      `ALTER TABLE \`retests\` ADD COLUMN \`waits_at\` JSON NOT NULL DEFAULT '[]' AFTER \`positions\``,
    );
  },
  async down(queryInterface) {
    await queryInterface.sequelize.query(`ALTER TABLE \`retests\` DROP COLUMN \`waits_at\``);
  },
};
