'use strict';

/* One row per bookable resource (`person-12`, `position-3`) and UTC day: whoever books it updates the row first. */

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`CREATE TABLE \`booking_guards\` (
      \`resource\` VARCHAR(40) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`day\` DATE NOT NULL,
      \`touched\` BIGINT UNSIGNED NOT NULL DEFAULT 0,
      PRIMARY KEY (\`resource\`, \`day\`)
    ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`);
  },
  async down(queryInterface) {
    await queryInterface.dropTable('booking_guards');
  },
};
