'use strict';

/* One row per person and turn; whoever holds one has it until `held_until`, and a process that dies loses it then. */
module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`CREATE TABLE \`import_turns\` (
      \`user_id\` BIGINT UNSIGNED NOT NULL,
      \`turn\` TINYINT UNSIGNED NOT NULL,
      \`holder\` CHAR(16) CHARACTER SET ascii COLLATE ascii_bin NULL,
      \`held_until\` DATETIME(3) NOT NULL,
      PRIMARY KEY (\`user_id\`, \`turn\`),
      CONSTRAINT \`fk_import_turns_user\` FOREIGN KEY (\`user_id\`) REFERENCES \`users\` (\`id\`)
    ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`);
  },
  async down(queryInterface) {
    await queryInterface.dropTable('import_turns');
  },
};
