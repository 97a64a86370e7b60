'use strict';

/* What somebody sent within an hour is added up before each upload; the wider key also serves fk_uploads_user. */
module.exports = {
  async up(queryInterface) {
    await queryInterface.sequelize.query(`ALTER TABLE \`uploads\`
      ADD KEY \`ix_uploads_user_created\` (\`user_id\`, \`created_at\`, \`bytes\`),
      DROP KEY \`ix_uploads_user\``);
  },
  async down(queryInterface) {
    await queryInterface.sequelize.query(`ALTER TABLE \`uploads\`
      ADD KEY \`ix_uploads_user\` (\`user_id\`),
      DROP KEY \`ix_uploads_user_created\``);
  },
};
