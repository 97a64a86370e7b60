'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`CREATE TABLE \`bookings\` (
      \`id\` BIGINT UNSIGNED NOT NULL AUTO_INCREMENT,
      \`public_id\` CHAR(16) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`position_id\` BIGINT UNSIGNED NOT NULL,
      \`technician_id\` BIGINT UNSIGNED NOT NULL,
      \`sample_id\` BIGINT UNSIGNED NOT NULL,
      \`state_id\` BIGINT UNSIGNED NULL,
      \`work\` VARCHAR(120) NOT NULL,
      \`starts_at\` DATETIME(3) NOT NULL,
      \`ends_at\` DATETIME(3) NOT NULL,
      \`state\` ENUM('booked','cancelled') NOT NULL DEFAULT 'booked',
      \`cancel_reason\` VARCHAR(300) NULL,
      \`created_by\` BIGINT UNSIGNED NOT NULL,
      \`version\` INT UNSIGNED NOT NULL DEFAULT 1,
      \`created_at\` DATETIME(3) NOT NULL,
      \`updated_at\` DATETIME(3) NOT NULL,
      PRIMARY KEY (\`id\`),
      UNIQUE KEY \`uq_bookings_public\` (\`public_id\`),
      KEY \`ix_bookings_position_starts\` (\`position_id\`, \`starts_at\`),
      KEY \`ix_bookings_technician_starts\` (\`technician_id\`, \`starts_at\`),
      KEY \`ix_bookings_sample_starts\` (\`sample_id\`, \`starts_at\`),
      KEY \`ix_bookings_starts\` (\`starts_at\`, \`id\`),
      CONSTRAINT \`fk_bookings_position\` FOREIGN KEY (\`position_id\`) REFERENCES \`test_positions\` (\`id\`),
      CONSTRAINT \`fk_bookings_technician\` FOREIGN KEY (\`technician_id\`) REFERENCES \`users\` (\`id\`),
      CONSTRAINT \`fk_bookings_sample\` FOREIGN KEY (\`sample_id\`) REFERENCES \`samples\` (\`id\`),
      CONSTRAINT \`fk_bookings_state\` FOREIGN KEY (\`state_id\`) REFERENCES \`modification_states\` (\`id\`),
      CONSTRAINT \`fk_bookings_created_by\` FOREIGN KEY (\`created_by\`) REFERENCES \`users\` (\`id\`)
    ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`);
  },
  async down(queryInterface) {
    await queryInterface.dropTable('bookings');
  },
};
