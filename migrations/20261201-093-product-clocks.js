'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`CREATE TABLE \`product_clocks\` (
      \`id\` BIGINT UNSIGNED NOT NULL AUTO_INCREMENT,
      \`public_id\` CHAR(16) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`product_id\` BIGINT UNSIGNED NOT NULL,
      \`name\` VARCHAR(80) NOT NULL,
      \`kind\` ENUM('clock','converter') NOT NULL,
      \`frequency_hz\` DOUBLE NOT NULL,
      \`tolerance_ppm\` DOUBLE NOT NULL,
      \`spread_kind\` ENUM('down','centre') NULL,
      \`spread_pct\` DOUBLE NULL,
      \`note\` VARCHAR(300) NOT NULL,
      \`withdrawn_at\` DATETIME(3) NULL,
      \`withdraw_reason\` VARCHAR(300) NULL,
      \`withdrawn_by\` BIGINT UNSIGNED NULL,
      \`version\` INT UNSIGNED NOT NULL DEFAULT 1,
      \`user_id\` BIGINT UNSIGNED NOT NULL,
      \`created_at\` DATETIME(3) NOT NULL,
      \`updated_at\` DATETIME(3) NOT NULL,
      PRIMARY KEY (\`id\`),
      UNIQUE KEY \`uq_product_clocks_public\` (\`public_id\`),
      KEY \`ix_product_clocks_product\` (\`product_id\`, \`id\`),
      CONSTRAINT \`fk_product_clocks_product\` FOREIGN KEY (\`product_id\`) REFERENCES \`products\` (\`id\`),
      CONSTRAINT \`fk_product_clocks_user\` FOREIGN KEY (\`user_id\`) REFERENCES \`users\` (\`id\`),
      CONSTRAINT \`fk_product_clocks_withdrawer\` FOREIGN KEY (\`withdrawn_by\`) REFERENCES \`users\` (\`id\`),
      CONSTRAINT \`ck_product_clocks_spread\` CHECK ((\`spread_kind\` IS NULL) = (\`spread_pct\` IS NULL))
    ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`);
  },
  async down(queryInterface) {
    await queryInterface.dropTable('product_clocks');
  },
};
