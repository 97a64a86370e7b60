'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`CREATE TABLE \`products\` (
      \`id\` BIGINT UNSIGNED NOT NULL AUTO_INCREMENT,
      \`public_id\` CHAR(16) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`organisation_id\` BIGINT UNSIGNED NOT NULL,
      \`code\` VARCHAR(40) NOT NULL,
      \`name\` VARCHAR(120) NOT NULL,
      \`description\` VARCHAR(2000) NOT NULL,
      \`version\` INT UNSIGNED NOT NULL DEFAULT 1,
      \`created_at\` DATETIME(3) NOT NULL,
      \`updated_at\` DATETIME(3) NOT NULL,
      PRIMARY KEY (\`id\`),
      UNIQUE KEY \`uq_products_public\` (\`public_id\`),
      UNIQUE KEY \`uq_products_organisation_code\` (\`organisation_id\`, \`code\`),
      KEY \`ix_products_organisation_id\` (\`organisation_id\`, \`id\`),
      CONSTRAINT \`fk_products_organisation\` FOREIGN KEY (\`organisation_id\`) REFERENCES \`organisations\` (\`id\`)
    ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`);
  },
  async down(queryInterface) {
    await queryInterface.dropTable('products');
  },
};
