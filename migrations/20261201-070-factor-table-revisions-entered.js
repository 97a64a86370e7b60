'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`ALTER TABLE \`factor_table_revisions\`
      ADD COLUMN \`reason\` VARCHAR(300) NULL AFTER \`source\`,
      ADD COLUMN \`file_name\` VARCHAR(200) NULL AFTER \`reason\`,
      ADD COLUMN \`file_sha256\` CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NULL AFTER \`file_name\`,
      ADD COLUMN \`user_id\` BIGINT UNSIGNED NULL AFTER \`file_sha256\`,
      ADD CONSTRAINT \`fk_factor_table_revisions_user\` FOREIGN KEY (\`user_id\`) REFERENCES \`users\` (\`id\`)`);
  },
  async down(queryInterface) {
    await queryInterface.sequelize.query(`ALTER TABLE \`factor_table_revisions\`
      DROP FOREIGN KEY \`fk_factor_table_revisions_user\`,
      DROP COLUMN \`user_id\`,
      DROP COLUMN \`file_sha256\`,
      DROP COLUMN \`file_name\`,
      DROP COLUMN \`reason\``);
  },
};
