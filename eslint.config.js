import js from '@eslint/js';
import prettier from 'eslint-config-prettier';
import vue from 'eslint-plugin-vue';
import globals from 'globals';
import ts from 'typescript-eslint';

const noImports = (files, patterns) => ({ files, rules: { 'no-restricted-imports': ['error', { patterns }] } });
const noSyntax = (files, rules) => ({ files, rules: { 'no-restricted-syntax': ['error', ...rules] } });

const CLOCK_AND_CHANCE = [
  {
    selector: "CallExpression[callee.object.name='Date'][callee.property.name='now']",
    message: 'Time is an argument here.',
  },
  { selector: "NewExpression[callee.name='Date'][arguments.length=0]", message: 'Time is an argument here.' },
  {
    selector: "CallExpression[callee.object.name='Math'][callee.property.name='random']",
    message: 'Chance is an argument here.',
  },
];
const SYNC_TRANSACTIONS = [
  {
    selector: "CallExpression[callee.property.name='transaction'] > ArrowFunctionExpression[async=true]",
    message: 'Transactions are synchronous: an async one would commit at its first await.',
  },
];

export default ts.config(
  { ignores: ['dist/', 'data/', 'drizzle/', 'node_modules/', 'coverage/'] },
  js.configs.recommended,
  ...ts.configs.recommended,
  ...vue.configs['flat/recommended'],
  prettier,
  {
    files: ['**/*.{ts,vue}'],
    languageOptions: { parserOptions: { parser: ts.parser, extraFileExtensions: ['.vue'] } },
    rules: {
      '@typescript-eslint/no-explicit-any': 'error',
      '@typescript-eslint/no-unused-vars': ['error', { ignoreRestSiblings: true }],
      '@typescript-eslint/consistent-type-imports': 'error',
      'max-lines': ['error', { max: 300, skipBlankLines: false }],
      'no-undef': 'off',
    },
  },
  {
    // Rules that need types cost a program per folder, so they hold where a lost promise could lose data.
    files: ['{shared,server,fakes}/**/*.ts'],
    languageOptions: { parserOptions: { projectService: true, tsconfigRootDir: import.meta.dirname } },
    rules: {
      '@typescript-eslint/no-floating-promises': 'error',
      '@typescript-eslint/switch-exhaustiveness-check': ['error', { considerDefaultExhaustiveForUnions: true }],
    },
  },
  {
    files: ['**/*.vue'],
    rules: {
      'vue/component-name-in-template-casing': ['error', 'PascalCase', { registeredComponentsOnly: false }],
      'vue/block-order': ['error', { order: ['script', 'template', 'style'] }],
      'vue/valid-v-slot': ['error', { allowModifiers: true }],
      'vue/require-default-prop': 'off',
    },
  },
  { files: ['**/*.{js,mjs,cjs}'], languageOptions: { globals: globals.node } },
  noImports(
    ['shared/**/*.ts'],
    [
      { group: ['**/server/**', '**/src/**', '@/**', '**/fakes/**', '**/tests/**'], message: 'shared/ is the floor.' },
      {
        group: ['node:*', 'express', 'drizzle-orm*', 'better-sqlite3', 'vue', 'pinia'],
        message: 'No I/O in the core.',
      },
    ],
  ),
  noImports(
    ['server/**/*.ts'],
    [
      {
        group: ['**/src/**', '@/**', '**/fakes/**', '**/tests/**'],
        message: 'The server meets these over the network only.',
      },
    ],
  ),
  noImports(
    ['src/**/*.{ts,vue}'],
    [
      {
        group: ['**/server/**', '**/fakes/**', '**/tests/**', 'node:*'],
        message: 'The client meets the server over HTTP only.',
      },
    ],
  ),
  noImports(
    ['fakes/**/*.ts'],
    [{ group: ['**/server/**', '**/src/**', '@/**'], message: 'Stand-ins know the protocol only.' }],
  ),
  noSyntax(['shared/**/*.ts'], CLOCK_AND_CHANCE),
  noSyntax(['server/**/*.ts'], SYNC_TRANSACTIONS),
);
