import { readdirSync } from 'node:fs';
import js from '@eslint/js';
import query from '@tanstack/eslint-plugin-query';
import { importX } from 'eslint-plugin-import-x';
import reactHooks from 'eslint-plugin-react-hooks';
import tseslint from 'typescript-eslint';

/** Zones read from the folders themselves, so that a new feature is fenced the day it appears. */
const fencesBetweenFeatures = (parent) =>
  readdirSync(parent, { withFileTypes: true })
    .filter((entry) => entry.isDirectory())
    .map(({ name }) => ({
      target: `./${parent}/${name}`,
      from: `./${parent}`,
      except: [`./${name}`],
      message: 'A feature imports no other feature; router.tsx and app.ts compose them.',
    }));

const layers = [
  { target: './shared', from: './server', message: 'shared/ stands on its own.' },
  { target: './shared', from: './src', message: 'shared/ stands on its own.' },
  { target: './server', from: './src', message: 'server/ and src/ meet only in shared/.' },
  { target: './src', from: './server', message: 'server/ and src/ meet only in shared/.' },
  { target: './src/components', from: './src/features', message: 'The design system knows no feature.' },
  { target: './src/plots', from: './src/features', message: 'Plots know no feature.' },
  { target: './src/audio', from: './src/features', message: 'The audio graph knows no feature.' },
  {
    target: './shared/contract',
    from: './shared',
    except: ['./contract'],
    message: 'The contract is the ground floor.',
  },
];

const impureNames = [
  'window',
  'document',
  'navigator',
  'performance',
  'Date',
  'process',
  'Buffer',
  'setTimeout',
  'fetch',
];

export default tseslint.config(
  {
    ignores: [
      'dist/**',
      'node_modules/**',
      '.data/**',
      '.cache/**',
      'drizzle/**',
      'test-results/**',
      'playwright-report/**',
    ],
  },
  js.configs.recommended,
  ...tseslint.configs.strict,
  ...query.configs['flat/recommended'],
  {
    plugins: { 'import-x': importX, 'react-hooks': reactHooks },
    rules: {
      ...reactHooks.configs.recommended.rules,
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_', varsIgnorePattern: '^_' }],
      '@typescript-eslint/consistent-type-imports': 'error',
      '@typescript-eslint/no-non-null-assertion': 'error',
      'max-lines': ['error', { max: 300, skipBlankLines: true, skipComments: true }],
      eqeqeq: 'error',
      'no-console': 'error',
      'import-x/no-restricted-paths': [
        'error',
        {
          zones: [
            ...layers,
            ...fencesBetweenFeatures('src/features'),
            ...fencesBetweenFeatures('server/features'),
          ],
        },
      ],
    },
  },
  {
    files: ['shared/**/*.ts'],
    rules: {
      'no-restricted-imports': [
        'error',
        {
          patterns: [
            {
              group: ['node:*', 'fs', 'path', 'crypto', 'react', 'express', 'drizzle-orm*'],
              message: 'shared/ is pure.',
            },
          ],
        },
      ],
      'no-restricted-globals': ['error', ...impureNames],
      'no-restricted-properties': [
        'error',
        {
          object: 'Math',
          property: 'random',
          message: 'Seeded generators only: same definition, same table.',
        },
      ],
    },
  },
  {
    files: ['server/setup/**/*.mjs'],
    languageOptions: {
      globals: {
        process: 'readonly',
        console: 'readonly',
        URL: 'readonly',
        setTimeout: 'readonly',
        clearTimeout: 'readonly',
        setInterval: 'readonly',
        clearInterval: 'readonly',
        fetch: 'readonly',
        performance: 'readonly',
        Buffer: 'readonly',
        AbortSignal: 'readonly',
      },
    },
    rules: { 'no-console': 'off' },
  },
  {
    files: ['public/**/*.js'],
    languageOptions: { globals: { localStorage: 'readonly', document: 'readonly', matchMedia: 'readonly' } },
  },
  { files: ['server/cli/**/*.ts', 'tests/**/*.ts'], rules: { 'no-console': 'off' } },
  {
    files: ['**/*.js', '*.config.ts'],
    languageOptions: { globals: { process: 'readonly', console: 'readonly', URL: 'readonly' } },
  },
);
