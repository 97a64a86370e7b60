'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`CREATE TABLE \`file_shapes\` (
      \`id\` BIGINT UNSIGNED NOT NULL AUTO_INCREMENT,
      \`shape\` CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`answers\` JSON NOT NULL,
      \`sweep_id\` BIGINT UNSIGNED NOT NULL,
      \`kept\` INT UNSIGNED NOT NULL DEFAULT 1,
      \`user_id\` BIGINT UNSIGNED NOT NULL,
      \`created_at\` DATETIME(3) NOT NULL,
      \`updated_at\` DATETIME(3) NOT NULL,
      PRIMARY KEY (\`id\`),
      UNIQUE KEY \`uq_file_shapes_shape\` (\`shape\`),
      CONSTRAINT \`fk_file_shapes_sweep\` FOREIGN KEY (\`sweep_id\`) REFERENCES \`sweeps\` (\`id\`),
      CONSTRAINT \`fk_file_shapes_user\` FOREIGN KEY (\`user_id\`) REFERENCES \`users\` (\`id\`)
    ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`);
  },
  async down(queryInterface) {
    await queryInterface.dropTable('file_shapes');
  },
};
