import tseslint from 'typescript-eslint';

/** The pure folders: same input, same output. No clock, no chance, no files, no log hidden inside. */
const PURE = ['pipeline/**/*.ts', 'templates/**/*.ts', 'simulate/**/*.ts'];
const IMPURE_GLOBALS = [
  'Date',
  'console',
  'process',
  'performance',
  'fetch',
  'setTimeout',
  'setInterval',
  'crypto',
  'Buffer',
  'globalThis',
];

export default tseslint.config(
  { ignores: ['dist/**', 'node_modules/**', 'coverage/**', 'report/client/**', '**/*.mjs', '**/*.cjs'] },
  ...tseslint.configs.strictTypeChecked,
  {
    languageOptions: { parserOptions: { projectService: true, tsconfigRootDir: import.meta.dirname } },
    rules: {
      'max-lines': ['error', { max: 400, skipBlankLines: false, skipComments: false }],
      '@typescript-eslint/require-array-sort-compare': 'error',
      '@typescript-eslint/restrict-template-expressions': [
        'error',
        { allowNumber: true, allowBoolean: true },
      ],
      // Typed arrays are indexed in range by construction in numeric loops; the `!` there is the contract.
      '@typescript-eslint/no-non-null-assertion': 'off',
      '@typescript-eslint/no-unnecessary-condition': ['error', { allowConstantLoopConditions: true }],
    },
  },
  {
    files: PURE,
    rules: {
      'no-restricted-globals': ['error', ...IMPURE_GLOBALS],
      'no-restricted-properties': [
        'error',
        { object: 'Math', property: 'random', message: 'Take a seeded generator.' },
      ],
    },
  },
);
