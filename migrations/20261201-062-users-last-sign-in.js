'use strict';

module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(
      'ALTER TABLE `users` ADD COLUMN `last_sign_in_at` DATETIME(3) NULL AFTER `disabled_at`',
    );
  },
  async down(queryInterface) {
    await queryInterface.sequelize.query('ALTER TABLE `users` DROP COLUMN `last_sign_in_at`');
  },
};
