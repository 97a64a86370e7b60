'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`ALTER TABLE \`evaluations\`
      ADD COLUMN \`reason\` VARCHAR(300) NULL AFTER \`candidates\`,
      ADD COLUMN \`repeats_id\` BIGINT UNSIGNED NULL AFTER \`reason\`,
      ADD CONSTRAINT \`fk_evaluations_repeats\` FOREIGN KEY (\`repeats_id\`) REFERENCES \`evaluations\` (\`id\`)`);
  },
  async down(queryInterface) {
    await queryInterface.sequelize.query(`ALTER TABLE \`evaluations\`
      DROP FOREIGN KEY \`fk_evaluations_repeats\`,
      DROP COLUMN \`repeats_id\`,
      DROP COLUMN \`reason\``);
  },
};
