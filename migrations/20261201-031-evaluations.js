'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`CREATE TABLE \`evaluations\` (
      \`id\` BIGINT UNSIGNED NOT NULL AUTO_INCREMENT,
      \`public_id\` CHAR(16) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`sweep_id\` BIGINT UNSIGNED NOT NULL,
      \`engine\` VARCHAR(60) NOT NULL,
      \`decision_rule\` VARCHAR(40) NOT NULL,
      \`inputs\` JSON NOT NULL,
      \`verdict\` ENUM('over','needs-final','inconclusive','not-covered','under') NOT NULL,
      \`worst_frequency_hz\` DOUBLE NULL,
      \`worst_margin_db\` DOUBLE NULL,
      \`counts\` JSON NOT NULL,
      \`pairs\` JSON NOT NULL,
      \`gaps\` JSON NOT NULL,
      \`candidates\` INT UNSIGNED NOT NULL,
      \`user_id\` BIGINT UNSIGNED NOT NULL,
      \`created_at\` DATETIME(3) NOT NULL,
      PRIMARY KEY (\`id\`),
      UNIQUE KEY \`uq_evaluations_public\` (\`public_id\`),
      KEY \`ix_evaluations_sweep_id\` (\`sweep_id\`, \`id\`),
      CONSTRAINT \`fk_evaluations_sweep\` FOREIGN KEY (\`sweep_id\`) REFERENCES \`sweeps\` (\`id\`),
      CONSTRAINT \`fk_evaluations_user\` FOREIGN KEY (\`user_id\`) REFERENCES \`users\` (\`id\`)
    ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`);
  },
  async down(queryInterface) {
    await queryInterface.dropTable('evaluations');
  },
};
