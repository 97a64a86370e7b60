import next from 'eslint-config-next/core-web-vitals';
import typescript from 'eslint-config-next/typescript';

const config = [
  { ignores: ['.next/', '.stillfield/', '.stillfield-test/', 'coverage/', 'next-env.d.ts'] },
  ...next,
  ...typescript,
  {
    rules: {
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_', varsIgnorePattern: '^_' }],
      '@typescript-eslint/consistent-type-imports': ['error', { fixStyle: 'inline-type-imports' }],
      eqeqeq: 'error',
      'no-console': ['error', { allow: ['error'] }],
    },
  },
  {
    files: ['**/*.js', '.sequelizerc'],
    rules: { '@typescript-eslint/no-require-imports': 'off', 'no-console': 'off' },
  },
  { files: ['src/models/**', 'src/services/**'], rules: { 'react-hooks/rules-of-hooks': 'off' } },
  { files: ['src/ops/**', 'fixtures/**', 'tests/**'], rules: { 'no-console': 'off' } },
  { files: ['tests/**'], rules: { '@next/next/no-assign-module-variable': 'off' } },
];

export default config;
