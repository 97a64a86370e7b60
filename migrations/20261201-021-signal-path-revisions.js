'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`CREATE TABLE \`signal_path_revisions\` (
      \`id\` BIGINT UNSIGNED NOT NULL AUTO_INCREMENT,
      \`public_id\` CHAR(16) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`signal_path_id\` BIGINT UNSIGNED NOT NULL,
      \`revision\` INT UNSIGNED NOT NULL,
      \`items\` JSON NOT NULL,
      \`uncertainty\` JSON NOT NULL,
      \`uncertainty_source\` VARCHAR(300) NOT NULL,
      \`created_at\` DATETIME(3) NOT NULL,
      PRIMARY KEY (\`id\`),
      UNIQUE KEY \`uq_signal_path_revisions_public\` (\`public_id\`),
      UNIQUE KEY \`uq_signal_path_revisions_signal_path_revision\` (\`signal_path_id\`, \`revision\`),
      CONSTRAINT \`fk_signal_path_revisions_signal_path\` FOREIGN KEY (\`signal_path_id\`) REFERENCES \`signal_paths\` (\`id\`)
    ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`);
  },
  async down(queryInterface) {
    await queryInterface.dropTable('signal_path_revisions');
  },
};
