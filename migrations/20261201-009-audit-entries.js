'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`CREATE TABLE \`audit_entries\` (
      \`id\` BIGINT UNSIGNED NOT NULL AUTO_INCREMENT,
      \`scope\` VARCHAR(40) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`seq\` BIGINT UNSIGNED NOT NULL,
      \`at\` DATETIME(3) NOT NULL,
      \`actor_id\` BIGINT UNSIGNED NULL,
      \`action\` VARCHAR(240) NOT NULL,
      \`subject_type\` VARCHAR(40) NOT NULL,
      \`subject_id\` CHAR(16) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`canonical\` LONGTEXT CHARACTER SET utf8mb4 COLLATE utf8mb4_bin NOT NULL,
      \`previous_hash\` CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`hash\` CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      PRIMARY KEY (\`id\`),
      UNIQUE KEY \`uq_audit_entries_scope_seq\` (\`scope\`, \`seq\`),
      KEY \`ix_audit_entries_subject_type_subject_id\` (\`subject_type\`, \`subject_id\`, \`id\`),
      CONSTRAINT \`fk_audit_entries_actor\` FOREIGN KEY (\`actor_id\`) REFERENCES \`users\` (\`id\`)
    ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`);
  },
  async down(queryInterface) {
    await queryInterface.dropTable('audit_entries');
  },
};
