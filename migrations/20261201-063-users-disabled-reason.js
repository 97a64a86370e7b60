'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(
      'ALTER TABLE `users` ADD COLUMN `disabled_reason` VARCHAR(300) NULL AFTER `disabled_at`',
    );
  },
  async down(queryInterface) {
    await queryInterface.sequelize.query('ALTER TABLE `users` DROP COLUMN `disabled_reason`');
  },
};
