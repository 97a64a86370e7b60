const nextJest = require('next/jest');

const createConfig = nextJest({ dir: './' });

/** Test directories that need a database, and those that drive a browser; every other one is the core. */
const WITH_DATABASE = ['app', 'database', 'http', 'models', 'outbox', 'resilience', 'services'];
const WITH_BROWSER = ['browser'];

const common = {
  testEnvironment: 'node',
  moduleNameMapper: { '^@/(.*)$': '<rootDir>/src/$1', '^@fixtures/(.*)$': '<rootDir>/fixtures/$1' },
  modulePathIgnorePatterns: ['<rootDir>/.next/', '<rootDir>/.stillfield/', '<rootDir>/.stillfield-test/'],
  testPathIgnorePatterns: ['/node_modules/'],
};

const below = (directories) => directories.flatMap((name) => [`<rootDir>/tests/${name}/**/*.test.{ts,tsx}`]);
const pattern = (directories) => directories.map((name) => `<rootDir>/tests/${name}/`);

const projects = [
  {
    ...common,
    displayName: 'core',
    testMatch: ['<rootDir>/tests/**/*.test.{ts,tsx}'],
    testPathIgnorePatterns: [...common.testPathIgnorePatterns, ...pattern([...WITH_DATABASE, ...WITH_BROWSER])],
  },
  {
    ...common,
    displayName: 'http',
    testMatch: below(WITH_DATABASE),
    globalSetup: '<rootDir>/tests/support/databaseSetup.ts',
  },
  {
    ...common,
    displayName: 'browser',
    testMatch: below(WITH_BROWSER),
    globalSetup: '<rootDir>/tests/support/browserSetup.ts',
    globalTeardown: '<rootDir>/tests/support/browserTeardown.ts',
    setupFilesAfterEnv: ['<rootDir>/tests/support/browserLab.ts'],
  },
];

module.exports = async () => ({
  projects: await Promise.all(projects.map((project) => createConfig(project)())),
  // two cores: one worker beside the server under test
  maxWorkers: 2,
  testTimeout: 30_000,
});
