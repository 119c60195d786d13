import officeAddins from 'eslint-plugin-office-addins';
import tseslint from 'typescript-eslint';

/** Names that would let a clock, randomness or a host into the solver core (solver-core/SPEC.md, SC-2). */
const forbiddenInSolverCore = [
  'Date',
  'performance',
  'setTimeout',
  'setInterval',
  'setImmediate',
  'queueMicrotask',
  'process',
  'Buffer',
  'require',
  'window',
  'document',
  'self',
  'globalThis',
  'fetch',
  'console',
];

export default tseslint.config(
  { ignores: ['dist/', 'build/', 'node_modules/', '**/*.cjs', '*.config.js'] },
  ...tseslint.configs.recommendedTypeChecked,
  {
    languageOptions: { parserOptions: { projectService: true } },
    rules: {
      '@typescript-eslint/consistent-type-imports': 'error',
      '@typescript-eslint/switch-exhaustiveness-check': [
        'error',
        { considerDefaultExhaustiveForUnions: true },
      ],
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_' }],
      '@typescript-eslint/no-non-null-assertion': 'off',
      eqeqeq: ['error', 'always', { null: 'ignore' }],
      'prefer-const': 'error',
      'no-var': 'error',
    },
  },
  {
    // The only room that names Office: load before read, sync before read, no sync in a loop.
    files: ['addin/adapters/excel-host/**/*.ts'],
    plugins: { 'office-addins': officeAddins },
    rules: Object.fromEntries(
      Object.keys(officeAddins.rules).map((rule) => [`office-addins/${rule}`, 'error']),
    ),
  },
  {
    files: ['solver-core/**/*.ts'],
    rules: {
      'no-restricted-globals': ['error', ...forbiddenInSolverCore],
      'no-restricted-properties': [
        'error',
        // Their last bit is left open by the language: results would differ between machines.
        ...[
          'random',
          'log',
          'log2',
          'log10',
          'log1p',
          'exp',
          'expm1',
          'pow',
          'sin',
          'cos',
          'tan',
          'hypot',
          'cbrt',
          'sinh',
          'cosh',
          'tanh',
        ].map((property) => ({ object: 'Math', property })),
      ],
    },
  },
);
