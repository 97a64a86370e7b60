/** @type {import('next').NextConfig} */
module.exports = {
  // the tests build beside a running lab, never over its build
  distDir: process.env.NEXT_DIST_DIR || '.next',
  serverExternalPackages: ['sequelize', 'mariadb'],
  poweredByHeader: false,
  agentRules: false,
  reactStrictMode: true,
};
