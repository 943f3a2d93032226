import js from '@eslint/js';
import globals from 'globals';
import reactHooks from 'eslint-plugin-react-hooks';
import tseslint from 'typescript-eslint';

const noDefaultGlobals = [
  'process',
  'Buffer',
  'window',
  'document',
  'navigator',
  'fetch',
  'setTimeout',
  'performance',
];

export default tseslint.config(
  {
    ignores: [
      '**/dist/**',
      '**/dist-types/**',
      '**/node_modules/**',
      '**/.run/**',
      'app/src/lib/api-types.ts',
    ],
  },
  js.configs.recommended,
  {
    files: ['**/*.{ts,tsx}'],
    extends: [tseslint.configs.recommendedTypeChecked],
    languageOptions: { parserOptions: { projectService: true, tsconfigRootDir: import.meta.dirname } },
    rules: {
      '@typescript-eslint/no-explicit-any': 'error',
      '@typescript-eslint/no-non-null-assertion': 'error',
      '@typescript-eslint/consistent-type-imports': 'off',
      '@typescript-eslint/restrict-template-expressions': [
        'error',
        { allowNumber: true, allowBoolean: true },
      ],
      '@typescript-eslint/switch-exhaustiveness-check': 'error',
      '@typescript-eslint/no-misused-promises': ['error', { checksVoidReturn: { attributes: false } }],
      'no-empty': ['error', { allowEmptyCatch: false }],
    },
  },
  {
    // dsp runs in Node, in a browser and in a worker alike: it may lean on none of them.
    files: ['dsp/src/**/*.ts'],
    ignores: ['dsp/src/**/*.test.ts', 'dsp/src/**/testing/**'],
    rules: {
      'no-restricted-globals': ['error', ...noDefaultGlobals],
      'no-restricted-imports': ['error', { patterns: ['node:*', '@benchlark/*'] }],
      'no-restricted-syntax': [
        'error',
        {
          selector: "CallExpression[callee.object.name='Math'][callee.property.name='random']",
          message: 'Use a seeded generator.',
        },
        { selector: "CallExpression[callee.object.name='Date']", message: 'dsp knows no clock.' },
      ],
    },
  },
  {
    files: [
      'dsp/**/*.test.ts',
      'server/**/*.spec.ts',
      'server/test/**/*.ts',
      'app/**/*.test.{ts,tsx}',
      'app/e2e/**/*.ts',
    ],
    rules: {
      '@typescript-eslint/no-non-null-assertion': 'off',
      '@typescript-eslint/no-unsafe-assignment': 'off',
      '@typescript-eslint/no-unsafe-member-access': 'off',
      '@typescript-eslint/no-unsafe-argument': 'off',
      '@typescript-eslint/unbound-method': 'off',
    },
  },
  {
    files: ['app/src/**/*.{ts,tsx}'],
    plugins: { 'react-hooks': reactHooks },
    rules: {
      'react-hooks/rules-of-hooks': 'error',
      'react-hooks/exhaustive-deps': 'error',
    },
  },
  {
    // Imports in the app go one way: lib and components know no feature, a feature knows no other.
    files: ['app/src/lib/**/*.{ts,tsx}', 'app/src/components/**/*.{ts,tsx}'],
    rules: { 'no-restricted-imports': ['error', { patterns: ['@/features/*', '@/app/*'] }] },
  },
  {
    files: ['app/src/features/**/*.{ts,tsx}'],
    rules: { 'no-restricted-imports': ['error', { patterns: ['@/features/*', '@/app/*'] }] },
  },
  {
    files: ['**/*.{mjs,cjs,js}'],
    languageOptions: { globals: { ...globals.node } },
  },
);
