import js from '@eslint/js';
import globals from 'globals';
import hooks from 'eslint-plugin-react-hooks';
import ts from 'typescript-eslint';

export default ts.config(
  { ignores: ['dist', 'data', 'coverage', 'node_modules'] },
  js.configs.recommended,
  ...ts.configs.recommended,
  {
    languageOptions: { globals: { ...globals.node } },
    rules: {
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_', varsIgnorePattern: '^_' }],
      '@typescript-eslint/consistent-type-imports': 'error',
      eqeqeq: ['error', 'always', { null: 'ignore' }],
      'no-restricted-properties': [
        'error',
        { object: 'process', property: 'env', message: 'Settings come from api/config.ts, which the two processes hand the environment.' },
      ],
    },
  },
  {
    files: [
      'api/config.ts',
      'api/server.ts',
      'api/worker.ts',
      'scripts/**',
      'tests/**',
      'seeds/**',
      'docker-free-dev/**',
      'vite.config.ts',
    ],
    rules: { 'no-restricted-properties': 'off' },
  },
  {
    files: ['web/**/*.{ts,tsx}', 'tests/web/**', 'tests/browser/**'],
    languageOptions: { globals: { ...globals.browser } },
    plugins: { 'react-hooks': hooks },
    rules: { ...hooks.configs.recommended.rules },
  },
  {
    files: ['**/*.cjs'],
    languageOptions: { globals: { ...globals.node, ...globals.commonjs } },
    rules: { '@typescript-eslint/no-require-imports': 'off' },
  },
);
