'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`CREATE TABLE \`evaluation_layers\` (
      \`evaluation_id\` BIGINT UNSIGNED NOT NULL,
      \`trace_index\` SMALLINT UNSIGNED NOT NULL,
      \`columns\` INT UNSIGNED NOT NULL,
      \`layer\` MEDIUMBLOB NOT NULL,
      PRIMARY KEY (\`evaluation_id\`, \`trace_index\`),
      CONSTRAINT \`fk_evaluation_layers_evaluation\` FOREIGN KEY (\`evaluation_id\`) REFERENCES \`evaluations\` (\`id\`)
    ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`);
  },
  async down(queryInterface) {
    await queryInterface.dropTable('evaluation_layers');
  },
};
