'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(
      "ALTER TABLE `jobs` MODIFY `decision_rule` ENUM('guarded-by-u','cispr-16-4-2','simple-acceptance') NOT NULL",
    );
  },
  async down(queryInterface) {
    await queryInterface.sequelize.query("ALTER TABLE `jobs` MODIFY `decision_rule` ENUM('guarded-by-u') NOT NULL");
  },
};
