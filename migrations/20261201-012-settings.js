'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`CREATE TABLE \`settings\` (
      \`name\` VARCHAR(40) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`value\` JSON NOT NULL,
      PRIMARY KEY (\`name\`)
    ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`);
  },
  async down(queryInterface) {
    await queryInterface.dropTable('settings');
  },
};
