import tseslint from 'typescript-eslint';

const MAX_LINES = ['error', { max: 400, skipBlankLines: false, skipComments: false }];

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
  { ignores: ['dist/**', 'node_modules/**', 'coverage/**', 'dist-next/**', 'report/client/**'] },
  // Exceptions are settled here, with their reason, not where they are convenient.
  { linterOptions: { noInlineConfig: true, reportUnusedDisableDirectives: 'error' } },
  { files: ['**/*.mjs', '**/*.cjs'], rules: { 'max-lines': MAX_LINES } },
  ...tseslint.configs.strictTypeChecked.map((part) => ({ ...part, files: ['**/*.ts'] })),
  {
    files: ['**/*.ts'],
    languageOptions: { parserOptions: { projectService: true, tsconfigRootDir: import.meta.dirname } },
    rules: {
      'max-lines': MAX_LINES,
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
