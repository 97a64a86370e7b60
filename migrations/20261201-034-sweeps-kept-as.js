'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`ALTER TABLE \`sweeps\`
      ADD COLUMN \`trial\` VARCHAR(120) NULL AFTER \`operating_mode\`,
      ADD COLUMN \`partial\` JSON NULL AFTER \`trial\`,
      ADD COLUMN \`voided_at\` DATETIME(3) NULL AFTER \`partial\`,
      ADD COLUMN \`void_reason\` VARCHAR(300) NULL AFTER \`voided_at\`,
      ADD COLUMN \`voided_by\` BIGINT UNSIGNED NULL AFTER \`void_reason\`,
      ADD CONSTRAINT \`fk_sweeps_voided_by\` FOREIGN KEY (\`voided_by\`) REFERENCES \`users\` (\`id\`)`);
  },
  async down(queryInterface) {
    await queryInterface.sequelize.query(`ALTER TABLE \`sweeps\`
      DROP FOREIGN KEY \`fk_sweeps_voided_by\`,
      DROP COLUMN \`voided_by\`,
      DROP COLUMN \`void_reason\`,
      DROP COLUMN \`voided_at\`,
      DROP COLUMN \`partial\`,
      DROP COLUMN \`trial\``);
  },
};
