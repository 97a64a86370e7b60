/** @type {import('next').NextConfig} */
module.exports = {
  serverExternalPackages: ['sequelize', 'mariadb'],
  poweredByHeader: false,
  agentRules: false,
  reactStrictMode: true,
};
