const { existsSync } = require('node:fs');

/*
 * The tests build beside a running lab, never over its build. Next writes the directory it builds into into the
 * tsconfig it is given, so that build gets a tsconfig of its own, which npm test writes and which extends ours.
 */
const distDir = process.env.NEXT_DIST_DIR || '.next';
const ownTsconfig = `${distDir}.tsconfig.json`;

/** @type {import('next').NextConfig} */
module.exports = {
  distDir,
  // npm test checks the types once, for every process and not only for what the build reads
  typescript: { ignoreBuildErrors: true, ...(existsSync(ownTsconfig) ? { tsconfigPath: ownTsconfig } : {}) },
  serverExternalPackages: ['sequelize', 'mariadb'],
  poweredByHeader: false,
  agentRules: false,
  reactStrictMode: true,
};
