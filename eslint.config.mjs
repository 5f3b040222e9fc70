import next from 'eslint-config-next/core-web-vitals';
import nextTypescript from 'eslint-config-next/typescript';

const code = ['**/*.{ts,tsx,mts}'];
// React's rules cost a quarter of the time, so they run where React is.
const browserCode = [
  'app/**/*.{ts,tsx}',
  'components/**/*.{ts,tsx}',
  'lib/client/**/*.{ts,tsx}',
  'tests/unit/**/*.tsx',
  'proxy.ts',
];

export default [
  {
    ignores: [
      'node_modules/**',
      'dist/**',
      '.next/**',
      '.data/**',
      'coverage/**',
      'test-results/**',
      'tests/fixtures/**',
      'next-env.d.ts',
    ],
  },
  { linterOptions: { reportUnusedDisableDirectives: 'error' } },
  ...next.map((entry) => (entry.rules ? { ...entry, files: browserCode } : entry)),
  ...nextTypescript,
  {
    files: ['**/*.{ts,tsx,mts,mjs,cjs}'],
    rules: {
      eqeqeq: ['error', 'always', { null: 'ignore' }],
      'no-control-regex': 'error',
      'no-var': 'error',
      'prefer-const': 'error',
      'object-shorthand': 'error',
      'no-eval': 'error',
      'no-implied-eval': 'error',
      'no-new-func': 'error',
    },
  },
  {
    files: browserCode,
    rules: {
      // It takes every function that touches a ref, event handlers too, for a read during render.
      'react-hooks/refs': 'off',
      // Leaving the site's state behind by a full load is meant where it is done.
      '@next/next/no-location-assign-relative-destination': 'off',
    },
  },
  {
    files: code,
    languageOptions: { parserOptions: { projectService: true } },
    rules: {
      '@typescript-eslint/no-explicit-any': 'error',
      '@typescript-eslint/ban-ts-comment': [
        'error',
        { 'ts-expect-error': true, 'ts-ignore': true, 'ts-nocheck': true },
      ],
      '@typescript-eslint/no-unused-vars': [
        'error',
        { argsIgnorePattern: '^_', varsIgnorePattern: '^_', caughtErrors: 'all' },
      ],
      '@typescript-eslint/consistent-type-imports': [
        'error',
        { fixStyle: 'inline-type-imports', disallowTypeAnnotations: false },
      ],
      '@typescript-eslint/no-floating-promises': 'error',
      '@typescript-eslint/no-misused-promises': [
        'error',
        { checksVoidReturn: { arguments: false, attributes: false } },
      ],
      '@typescript-eslint/only-throw-error': 'error',
      '@typescript-eslint/switch-exhaustiveness-check': [
        'error',
        { considerDefaultExhaustiveForUnions: true },
      ],
    },
  },
  {
    // The product speaks through lib/log, so that secrets are cut out.
    files: ['app/**', 'components/**', 'db/**', 'lib/**', 'storage/**', 'worker/**', 'proxy.ts'],
    rules: { 'no-console': 'error' },
  },
  {
    // Settings are read and checked in one place. The log must work before that.
    files: ['app/**', 'components/**', 'db/**', 'lib/**', 'storage/**'],
    ignores: ['lib/env/**', 'lib/log/**'],
    rules: {
      'no-restricted-properties': [
        'error',
        { object: 'process', property: 'env', message: 'Read settings through lib/env/env.ts.' },
      ],
    },
  },
  {
    // The engine gives the same numbers for the same arrays and seed, whenever and wherever it runs.
    files: ['lib/engine/**'],
    rules: {
      'no-restricted-properties': [
        'error',
        { object: 'Math', property: 'random', message: 'Randomness comes from a passed, seeded generator.' },
        { object: 'Date', property: 'now', message: 'The engine knows no clock.' },
        { object: 'performance', property: 'now', message: 'The engine knows no clock.' },
        { object: 'process', property: 'env', message: 'The engine knows no environment.' },
      ],
      'no-restricted-globals': [
        'error',
        'Date',
        'process',
        'performance',
        'crypto',
        'fetch',
        'setTimeout',
        'setInterval',
        'Buffer',
        'window',
        'document',
        'globalThis',
      ],
    },
  },
  {
    // Skipping for want of a library is counted and told; what hides the other tests is not for keeps.
    files: ['tests/**'],
    rules: {
      'no-restricted-properties': [
        'error',
        ...['describe', 'it', 'test'].flatMap((object) =>
          ['only', 'todo'].map((property) => ({ object, property, message: 'A test file runs whole.' })),
        ),
      ],
    },
  },
];
