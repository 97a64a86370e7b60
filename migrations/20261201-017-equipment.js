'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`CREATE TABLE \`equipment\` (
      \`id\` BIGINT UNSIGNED NOT NULL AUTO_INCREMENT,
      \`public_id\` CHAR(16) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`identifier\` VARCHAR(20) NOT NULL,
      \`role\` VARCHAR(40) NOT NULL,
      \`description\` VARCHAR(200) NOT NULL,
      \`state\` ENUM('in-use','quarantined','retired') NOT NULL DEFAULT 'in-use',
      \`version\` INT UNSIGNED NOT NULL DEFAULT 1,
      \`created_at\` DATETIME(3) NOT NULL,
      \`updated_at\` DATETIME(3) NOT NULL,
      PRIMARY KEY (\`id\`),
      UNIQUE KEY \`uq_equipment_public\` (\`public_id\`),
      UNIQUE KEY \`uq_equipment_identifier\` (\`identifier\`)
    ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`);
  },
  async down(queryInterface) {
    await queryInterface.dropTable('equipment');
  },
};
