'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`ALTER TABLE \`signal_path_revisions\`
      ADD COLUMN \`reason\` VARCHAR(300) NULL AFTER \`budget\`,
      ADD COLUMN \`user_id\` BIGINT UNSIGNED NULL AFTER \`reason\`,
      ADD CONSTRAINT \`fk_signal_path_revisions_user\` FOREIGN KEY (\`user_id\`) REFERENCES \`users\` (\`id\`)`);
  },
  async down(queryInterface) {
    await queryInterface.sequelize.query(`ALTER TABLE \`signal_path_revisions\`
      DROP FOREIGN KEY \`fk_signal_path_revisions_user\`,
      DROP COLUMN \`user_id\`,
      DROP COLUMN \`reason\``);
  },
};
