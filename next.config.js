/** @type {import('next').NextConfig} */
module.exports = {
  // the tests build beside a running lab, never over its build
  distDir: process.env.NEXT_DIST_DIR || '.next',
  // npm test checks the types once, for every process and not only for what the build reads
  typescript: { ignoreBuildErrors: true },
  serverExternalPackages: ['sequelize', 'mariadb'],
  poweredByHeader: false,
  agentRules: false,
  reactStrictMode: true,
};
