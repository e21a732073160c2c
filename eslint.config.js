import js from '@eslint/js'
import reactHooks from 'eslint-plugin-react-hooks'
import tseslint from 'typescript-eslint'

/** Folders that code in one folder may not import from: imports flow shared -> features -> pages -> app, never client <-> server. */
const forbid = (...patterns) => ({ 'no-restricted-imports': ['error', { patterns: patterns.map((group) => ({ group: [group] })) }] })

export default tseslint.config(
  { ignores: ['dist', 'node_modules', '.data'] },
  js.configs.recommended,
  ...tseslint.configs.recommended,
  {
    rules: {
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_', varsIgnorePattern: '^_' }],
      'no-console': 'error',
      eqeqeq: 'error',
    },
  },
  { files: ['server/scripts/**', 'server/cli/**', 'tests/support/**'], rules: { 'no-console': 'off' }, languageOptions: { globals: { process: 'readonly', console: 'readonly', URL: 'readonly', setTimeout: 'readonly', clearTimeout: 'readonly', setInterval: 'readonly', clearInterval: 'readonly', fetch: 'readonly', Buffer: 'readonly' } } },
  {
    files: ['shared/engine/**'],
    rules: {
      ...forbid('node:*', '**/server/**', '**/client/**', 'decimal.js'),
      'no-restricted-globals': ['error', 'process', 'Buffer', 'window', 'document', 'setTimeout', 'fetch'],
    },
  },
  { files: ['shared/**'], ignores: ['shared/engine/**'], rules: forbid('node:*', '**/server/**', '**/client/**') },
  { files: ['client/src/**'], rules: forbid('**/server/**', 'node:*') },
  { files: ['client/src/components/**', 'client/src/lib/**'], rules: forbid('**/server/**', '**/features/**', '**/pages/**', '**/app/router*') },
  { files: ['client/src/features/**'], rules: forbid('**/server/**', '**/pages/**', '**/app/router*') },
  { files: ['server/**', 'migrations/**', 'seeders/**'], rules: forbid('**/client/**') },
  { files: ['client/src/**/*.tsx'], plugins: { 'react-hooks': reactHooks }, rules: reactHooks.configs.recommended.rules },
)
