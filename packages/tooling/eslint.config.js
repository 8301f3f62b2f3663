import { fileURLToPath } from 'node:url';

import js from '@eslint/js';
import reactHooks from 'eslint-plugin-react-hooks';
import tseslint from 'typescript-eslint';

import { reasonedDisable } from './src/reasoned-disable.js';

const FUNCTION = { max: 60, skipBlankLines: true, skipComments: true };
/** @type {import('eslint').Linter.RulesRecord} */
const SIZES = {
  'max-lines': ['error', { max: 250, skipBlankLines: true, skipComments: true }],
  'max-lines-per-function': ['error', FUNCTION],
  'max-params': ['error', 4],
  // Defaults and optional chaining count as branches too; a plain read-out of a record has many.
  complexity: ['error', 16],
};

/** What needs the types; style and simple mistakes are Biome's. */
export default tseslint.config(
  { ignores: ['**/dist/**', '**/dist.*/**', '.tsbuild/**', '.foldwell/**', '**/node_modules/**'] },
  js.configs.recommended,
  tseslint.configs.recommendedTypeChecked,
  {
    languageOptions: {
      parserOptions: {
        tsconfigRootDir: fileURLToPath(new URL('../../', import.meta.url)),
        projectService: {
          allowDefaultProject: [
            'apps/*/*.mjs',
            'apps/web/vite.config.ts',
            'apps/web/public/*.js',
            '.*.cjs',
          ],
        },
      },
    },
    linterOptions: { reportUnusedDisableDirectives: 'error' },
    plugins: { foldwell: { rules: { 'reasoned-disable': reasonedDisable } } },
    rules: {
      ...SIZES,
      'foldwell/reasoned-disable': 'error',
      'no-warning-comments': 'error',
      'no-undef': 'off',
      // Props and route handlers are plain functions in the shape of methods; nothing here uses `this`.
      '@typescript-eslint/unbound-method': 'off',
      '@typescript-eslint/no-unused-vars': [
        'error',
        { argsIgnorePattern: '^_', varsIgnorePattern: '^_', destructuredArrayIgnorePattern: '^_' },
      ],
      'no-control-regex': 'off',
      '@typescript-eslint/restrict-template-expressions': [
        'error',
        { allowNumber: true, allowBoolean: true },
      ],
      '@typescript-eslint/no-misused-promises': [
        'error',
        { checksVoidReturn: { attributes: false } },
      ],
    },
  },
  {
    // A condition in markup is read where it stands, and the formatter gives each attribute a line.
    files: ['apps/web/**/*.tsx'],
    rules: {
      complexity: ['error', 22],
      'max-lines': ['error', { max: 330, skipBlankLines: true, skipComments: true }],
      'max-lines-per-function': ['error', { ...FUNCTION, max: 200 }],
    },
  },
  { files: ['apps/web/**/*.{ts,tsx}'], ...reactHooks.configs.flat['recommended-latest'] },
  {
    // A hook's answer may carry a ref that is only handed on; the rule takes that for reading it.
    files: ['apps/web/**/*.{ts,tsx}'],
    rules: { 'react-hooks/refs': 'off', 'react-hooks/incompatible-library': 'off' },
  },
  {
    // Tests look at answers from outside, whose type is whatever came.
    files: ['tests/**/*.ts', '**/*.test.{ts,tsx}'],
    rules: {
      '@typescript-eslint/no-explicit-any': 'off',
      '@typescript-eslint/no-unsafe-argument': 'off',
      '@typescript-eslint/no-unsafe-assignment': 'off',
      '@typescript-eslint/no-unsafe-call': 'off',
      '@typescript-eslint/no-unsafe-member-access': 'off',
      '@typescript-eslint/no-unsafe-return': 'off',
      'max-lines-per-function': 'off',
    },
  },
  {
    // Plain JavaScript has no way to say what JSON.parse gives.
    files: ['**/*.{js,mjs,cjs}'],
    rules: {
      '@typescript-eslint/no-unsafe-argument': 'off',
      '@typescript-eslint/no-unsafe-assignment': 'off',
      '@typescript-eslint/no-unsafe-call': 'off',
      '@typescript-eslint/no-unsafe-member-access': 'off',
      '@typescript-eslint/no-unsafe-return': 'off',
    },
  },
  {
    // The tables and guards read best as whole SQL texts.
    files: ['apps/api/src/database/migrations/*.ts', 'apps/api/src/features/verify/guards.ts'],
    rules: { 'max-lines-per-function': 'off', 'max-lines': 'off' },
  },
);
