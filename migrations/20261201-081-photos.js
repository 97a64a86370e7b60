'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`CREATE TABLE \`photos\` (
      \`id\` BIGINT UNSIGNED NOT NULL AUTO_INCREMENT,
      \`public_id\` CHAR(16) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`sweep_id\` BIGINT UNSIGNED NOT NULL,
      \`caption\` VARCHAR(200) NOT NULL,
      \`content_type\` ENUM('image/jpeg') NOT NULL,
      \`width\` SMALLINT UNSIGNED NOT NULL,
      \`height\` SMALLINT UNSIGNED NOT NULL,
      \`bytes\` INT UNSIGNED NOT NULL,
      \`sha256\` CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`small_width\` SMALLINT UNSIGNED NOT NULL,
      \`small_height\` SMALLINT UNSIGNED NOT NULL,
      \`sent_bytes\` INT UNSIGNED NOT NULL,
      \`sent_sha256\` CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`withdrawn_at\` DATETIME(3) NULL,
      \`withdraw_reason\` VARCHAR(300) NULL,
      \`withdrawn_by\` BIGINT UNSIGNED NULL,
      \`version\` INT UNSIGNED NOT NULL DEFAULT 1,
      \`user_id\` BIGINT UNSIGNED NOT NULL,
      \`created_at\` DATETIME(3) NOT NULL,
      PRIMARY KEY (\`id\`),
      UNIQUE KEY \`uq_photos_public\` (\`public_id\`),
      KEY \`ix_photos_sweep\` (\`sweep_id\`, \`id\`),
      CONSTRAINT \`fk_photos_sweep\` FOREIGN KEY (\`sweep_id\`) REFERENCES \`sweeps\` (\`id\`),
      CONSTRAINT \`fk_photos_user\` FOREIGN KEY (\`user_id\`) REFERENCES \`users\` (\`id\`),
      CONSTRAINT \`fk_photos_withdrawn_by\` FOREIGN KEY (\`withdrawn_by\`) REFERENCES \`users\` (\`id\`)
    ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`);
  },
  async down(queryInterface) {
    await queryInterface.dropTable('photos');
  },
};
