'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`CREATE TABLE \`calibrations\` (
      \`id\` BIGINT UNSIGNED NOT NULL AUTO_INCREMENT,
      \`public_id\` CHAR(16) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`equipment_id\` BIGINT UNSIGNED NOT NULL,
      \`certificate\` VARCHAR(80) NOT NULL,
      \`laboratory\` VARCHAR(120) NOT NULL,
      \`calibrated_on\` DATE NOT NULL,
      \`due_on\` DATE NULL,
      \`created_at\` DATETIME(3) NOT NULL,
      PRIMARY KEY (\`id\`),
      UNIQUE KEY \`uq_calibrations_public\` (\`public_id\`),
      KEY \`ix_calibrations_equipment_calibrated_on\` (\`equipment_id\`, \`calibrated_on\`),
      CONSTRAINT \`fk_calibrations_equipment\` FOREIGN KEY (\`equipment_id\`) REFERENCES \`equipment\` (\`id\`)
    ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`);
  },
  async down(queryInterface) {
    await queryInterface.dropTable('calibrations');
  },
};
