import { defineConfig, globalIgnores } from 'eslint/config'
import nextVitals from 'eslint-config-next/core-web-vitals'
import nextTs from 'eslint-config-next/typescript'
import tanstack from '@tanstack/eslint-plugin-query'
import jsdoc from 'eslint-plugin-jsdoc'

/** One implementation of the transcendental functions, versioned in the lock file, so that equal inputs give equal bits. */
const ENGINE_MATH = [
  'exp',
  'expm1',
  'log',
  'log1p',
  'log10',
  'log2',
  'pow',
  'sin',
  'cos',
  'tan',
  'asin',
  'acos',
  'atan',
  'atan2',
  'sinh',
  'cosh',
  'tanh',
  'asinh',
  'acosh',
  'atanh',
  'cbrt',
  'hypot',
  'random',
]

export default defineConfig([
  ...nextVitals,
  ...nextTs,
  ...tanstack.configs['flat/recommended'],
  {
    files: ['**/*.{ts,tsx,mts}'],
    rules: {
      '@typescript-eslint/no-explicit-any': 'error',
      '@typescript-eslint/no-non-null-assertion': 'error',
      '@typescript-eslint/consistent-type-imports': ['error', { fixStyle: 'inline-type-imports' }],
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_', ignoreRestSiblings: true }],
    },
  },
  { files: ['**/*.cjs'], rules: { '@typescript-eslint/no-require-imports': 'off' } },
  {
    files: ['app/**/*.tsx', 'components/**/*.tsx'],
    rules: {
      'react/no-danger': 'error',
      'no-restricted-properties': ['error', { property: 'innerHTML', message: 'markup from data is an injection' }],
    },
  },
  {
    files: ['**/*.{ts,tsx,mts}'],
    ignores: ['lib/environment.ts', 'tests/**', '*.config.ts', 'scripts/**'],
    rules: {
      'no-restricted-properties': ['error', { object: 'process', property: 'env', message: 'read lib/environment.ts' }],
    },
  },
  {
    files: ['lib/analysis/**/*.ts'],
    plugins: { jsdoc },
    settings: { jsdoc: { mode: 'typescript' } },
    rules: {
      'no-restricted-imports': [
        'error',
        {
          patterns: [
            {
              regex: '^(?!\\.{1,2}/|regression$|@stdlib/|ml-matrix$|ml-levenberg-marquardt$)',
              message: 'lib/analysis imports its own files, by relative path, and pure numeric packages',
            },
          ],
        },
      ],
      'no-restricted-properties': [
        'error',
        ...ENGINE_MATH.map((property) => ({
          object: 'Math',
          property,
          message: 'use @stdlib, so that the same inputs give the same bits',
        })),
      ],
      'no-restricted-globals': [
        'error',
        { name: 'Intl', message: 'its tables change with the engine' },
        { name: 'Date', message: 'pass instants in as numbers' },
        'window',
        'document',
        'process',
      ],
      'no-restricted-syntax': [
        'error',
        { selector: "BinaryExpression[operator='**']", message: 'use @stdlib pow, or write the product out' },
        { selector: "AssignmentExpression[operator='**=']", message: 'use @stdlib pow' },
      ],
      'jsdoc/require-jsdoc': [
        'error',
        { publicOnly: true, require: { FunctionDeclaration: true, ArrowFunctionExpression: true } },
      ],
      'jsdoc/require-param': 'error',
      'jsdoc/require-returns': 'error',
      'jsdoc/no-types': 'error',
    },
  },
  globalIgnores(['.next/**', 'next-env.d.ts', 'drizzle/**', 'tests/fixtures/**', 'node_modules/**', '.data/**']),
])
