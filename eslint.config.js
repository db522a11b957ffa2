import js from '@eslint/js';
import prettier from 'eslint-config-prettier';
import vue from 'eslint-plugin-vue';
import { defineConfig, globalIgnores } from 'eslint/config';
import globals from 'globals';
import tseslint from 'typescript-eslint';

/** Import boundaries: shared knows nothing around it, the app never the server, the server never the app. */
const forbid = (files, groups, message) => ({
  files,
  rules: { 'no-restricted-imports': ['error', { patterns: [{ group: groups, message }] }] },
});
// Anchored, so that a file of ours may be called http or path.
const NODE = ['node:*', '/fs', '/path', '/os', '/crypto', '/http', '/child_process', '/worker_threads'];

export default defineConfig(
  globalIgnores(['dist', 'build', 'coverage', '.data']),
  js.configs.recommended,
  tseslint.configs.recommended,
  vue.configs['flat/recommended'],
  { files: ['**/*.vue'], languageOptions: { parserOptions: { parser: tseslint.parser } } },
  { files: ['src/**', 'templates/**'], ignores: ['src/sw.js'], languageOptions: { globals: globals.browser } },
  { files: ['src/sw.js'], languageOptions: { globals: { ...globals.serviceworker, __FILES__: 'readonly', __VERSION__: 'readonly' } } },
  { files: ['server/**', 'tests/**', '*.js', '*.ts'], languageOptions: { globals: globals.node } },
  {
    files: ['**/*.ts', '**/*.vue'],
    rules: {
      'no-undef': 'off',
      '@typescript-eslint/no-explicit-any': 'error',
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_' }],
      '@typescript-eslint/consistent-type-imports': 'error',
      'no-restricted-syntax': ['error', { selector: 'ExportAllDeclaration', message: 'Name what a module gives; no export *.' }],
    },
  },
  forbid(
    ['shared/**/*.ts'],
    [...NODE, 'vue', 'vue-router', 'pinia', 'express', 'sequelize', '**/server/**', '**/src/**', '**/templates/**'],
    'shared/ is pure: no Vue, no Express, no database, no Node.',
  ),
  {
    files: ['shared/**/*.ts'],
    rules: {
      'no-restricted-globals': [
        'error',
        'window',
        'document',
        'navigator',
        'localStorage',
        'process',
        'performance',
        'setTimeout',
        'fetch',
      ],
      'no-restricted-properties': [
        'error',
        { object: 'Date', property: 'now', message: 'The clock comes in as an argument.' },
        { object: 'Math', property: 'random', message: 'Random numbers come from a seed.' },
      ],
    },
  },
  forbid(
    ['shared/solver/check/**/*.ts'],
    [
      ...NODE,
      'vue',
      '**/server/**',
      '**/src/**',
      '../search/**',
      '../constraints/**',
      '../score*',
      '../model*',
      '../bound*',
      '../explain*',
      '../../planner/**',
    ],
    'The checker shares no code with search, constraints or score.',
  ),
  forbid(
    ['src/**/*.{ts,vue}'],
    [...NODE, 'express', 'sequelize', '**/server/**'],
    'The app may import shared and templates, never the server.',
  ),
  forbid(
    ['templates/**/*.{ts,vue}'],
    [...NODE, 'express', 'sequelize', 'pinia', 'vue-router', '**/server/**', '**/src/**'],
    'A printed document is drawn from plain data and shared/.',
  ),
  forbid(
    ['src/stores/**/*.ts'],
    [...NODE, '**/server/**', '**/views/**', '**/components/**', '*.vue'],
    'No store imports a view or a component.',
  ),
  forbid(['src/components/base/**/*.{ts,vue}'], [...NODE, '**/server/**', '**/stores/**'], 'A base component knows no store.'),
  forbid(['server/**/*.ts'], ['**/src/**', 'pinia', 'vue-router'], 'The server never imports the app.'),
  prettier,
);
