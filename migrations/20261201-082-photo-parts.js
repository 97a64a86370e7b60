'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`CREATE TABLE \`photo_parts\` (
      \`photo_id\` BIGINT UNSIGNED NOT NULL,
      \`size\` ENUM('whole','small') NOT NULL,
      \`seq\` INT UNSIGNED NOT NULL,
      \`part\` MEDIUMBLOB NOT NULL,
      PRIMARY KEY (\`photo_id\`, \`size\`, \`seq\`),
      CONSTRAINT \`fk_photo_parts_photo\` FOREIGN KEY (\`photo_id\`) REFERENCES \`photos\` (\`id\`)
    ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`);
  },
  async down(queryInterface) {
    await queryInterface.dropTable('photo_parts');
  },
};
