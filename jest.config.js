const nextJest = require('next/jest');

const createConfig = nextJest({ dir: './' });

module.exports = createConfig({
  testEnvironment: 'node',
  moduleNameMapper: { '^@/(.*)$': '<rootDir>/src/$1', '^@fixtures/(.*)$': '<rootDir>/fixtures/$1' },
  testMatch: ['<rootDir>/tests/**/*.test.ts', '<rootDir>/tests/**/*.test.tsx'],
  modulePathIgnorePatterns: ['<rootDir>/.next/', '<rootDir>/.stillfield/', '<rootDir>/.stillfield-test/'],
});
