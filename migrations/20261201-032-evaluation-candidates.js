'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`CREATE TABLE \`evaluation_candidates\` (
      \`evaluation_id\` BIGINT UNSIGNED NOT NULL,
      \`rank\` INT UNSIGNED NOT NULL,
      \`kind\` ENUM('peak','floor') NOT NULL,
      \`trace_index\` SMALLINT UNSIGNED NOT NULL,
      \`line_id\` CHAR(16) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`frequency_hz\` DOUBLE NOT NULL,
      \`from_hz\` DOUBLE NOT NULL,
      \`to_hz\` DOUBLE NOT NULL,
      \`reading\` DOUBLE NOT NULL,
      \`level\` DOUBLE NOT NULL,
      \`limit\` DOUBLE NOT NULL,
      \`margin_db\` DOUBLE NOT NULL,
      \`uncertainty_db\` DOUBLE NOT NULL,
      \`verdict\` ENUM('over','needs-final','inconclusive','not-covered','under') NOT NULL,
      \`because\` VARCHAR(300) NULL,
      PRIMARY KEY (\`evaluation_id\`, \`rank\`),
      CONSTRAINT \`fk_evaluation_candidates_evaluation\` FOREIGN KEY (\`evaluation_id\`) REFERENCES \`evaluations\` (\`id\`)
    ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`);
  },
  async down(queryInterface) {
    await queryInterface.dropTable('evaluation_candidates');
  },
};
