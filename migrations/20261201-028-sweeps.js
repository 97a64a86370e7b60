'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`CREATE TABLE \`sweeps\` (
      \`id\` BIGINT UNSIGNED NOT NULL AUTO_INCREMENT,
      \`public_id\` CHAR(16) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`number\` VARCHAR(20) NOT NULL,
      \`state_id\` BIGINT UNSIGNED NOT NULL,
      \`sweep_file_id\` BIGINT UNSIGNED NOT NULL,
      \`sweep_index\` INT UNSIGNED NOT NULL,
      \`purpose\` ENUM('prescan','final','ambient') NOT NULL,
      \`port\` ENUM('enclosure','ac-mains','wired-network') NOT NULL,
      \`line\` ENUM('L','N','L1','L2','L3') NULL,
      \`polarisation\` ENUM('horizontal','vertical') NULL,
      \`height_m\` DOUBLE NULL,
      \`height_swept\` BOOLEAN NOT NULL DEFAULT FALSE,
      \`azimuth_deg\` DOUBLE NULL,
      \`distance_m\` DOUBLE NULL,
      \`operating_mode\` VARCHAR(120) NOT NULL,
      \`path_revision_id\` BIGINT UNSIGNED NULL,
      \`limit_set_id\` BIGINT UNSIGNED NOT NULL,
      \`values_hold\` ENUM('receiver-input','field') NOT NULL,
      \`reading\` JSON NOT NULL,
      \`measured_at\` DATETIME(3) NULL,
      \`points\` INT UNSIGNED NOT NULL,
      \`first_hz\` DOUBLE NOT NULL,
      \`last_hz\` DOUBLE NOT NULL,
      \`step_hz\` DOUBLE NULL,
      \`user_id\` BIGINT UNSIGNED NOT NULL,
      \`evaluation_id\` BIGINT UNSIGNED NULL,
      \`version\` INT UNSIGNED NOT NULL DEFAULT 1,
      \`created_at\` DATETIME(3) NOT NULL,
      \`updated_at\` DATETIME(3) NOT NULL,
      PRIMARY KEY (\`id\`),
      UNIQUE KEY \`uq_sweeps_public\` (\`public_id\`),
      UNIQUE KEY \`uq_sweeps_number\` (\`number\`),
      KEY \`ix_sweeps_state_id\` (\`state_id\`, \`id\`),
      CONSTRAINT \`fk_sweeps_state\` FOREIGN KEY (\`state_id\`) REFERENCES \`modification_states\` (\`id\`),
      CONSTRAINT \`fk_sweeps_sweep_file\` FOREIGN KEY (\`sweep_file_id\`) REFERENCES \`sweep_files\` (\`id\`),
      CONSTRAINT \`fk_sweeps_path_revision\` FOREIGN KEY (\`path_revision_id\`) REFERENCES \`signal_path_revisions\` (\`id\`),
      CONSTRAINT \`fk_sweeps_limit_set\` FOREIGN KEY (\`limit_set_id\`) REFERENCES \`limit_sets\` (\`id\`),
      CONSTRAINT \`fk_sweeps_user\` FOREIGN KEY (\`user_id\`) REFERENCES \`users\` (\`id\`)
    ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`);
  },
  async down(queryInterface) {
    await queryInterface.dropTable('sweeps');
  },
};
