'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`CREATE TABLE \`factor_table_revisions\` (
      \`id\` BIGINT UNSIGNED NOT NULL AUTO_INCREMENT,
      \`public_id\` CHAR(16) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`equipment_id\` BIGINT UNSIGNED NOT NULL,
      \`calibration_id\` BIGINT UNSIGNED NULL,
      \`name\` VARCHAR(120) NOT NULL,
      \`revision\` INT UNSIGNED NOT NULL,
      \`quantity\` ENUM('antenna-factor','loss','gain') NOT NULL,
      \`polarisation\` ENUM('horizontal','vertical') NULL,
      \`distance_m\` DOUBLE NULL,
      \`frequencies_hz\` JSON NOT NULL,
      \`values_db\` JSON NOT NULL,
      \`source\` VARCHAR(300) NOT NULL,
      \`created_at\` DATETIME(3) NOT NULL,
      PRIMARY KEY (\`id\`),
      UNIQUE KEY \`uq_factor_table_revisions_public\` (\`public_id\`),
      UNIQUE KEY \`uq_factor_table_revisions_equipment_name_revision\` (\`equipment_id\`, \`name\`, \`revision\`),
      CONSTRAINT \`fk_factor_table_revisions_equipment\` FOREIGN KEY (\`equipment_id\`) REFERENCES \`equipment\` (\`id\`),
      CONSTRAINT \`fk_factor_table_revisions_calibration\` FOREIGN KEY (\`calibration_id\`) REFERENCES \`calibrations\` (\`id\`)
    ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`);
  },
  async down(queryInterface) {
    await queryInterface.dropTable('factor_table_revisions');
  },
};
