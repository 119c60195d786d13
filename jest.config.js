/** Tests are TypeScript, turned into CommonJS by swc; types are checked apart, by `npm run types`. */
export default {
  testEnvironment: 'node',
  roots: ['<rootDir>/tests'],
  testMatch: ['**/*.test.ts', '**/*.test.tsx'],
  transform: {
    '\\.(m?[jt]sx?)$': [
      '@swc/jest',
      {
        jsc: { target: 'es2022', parser: { syntax: 'typescript', tsx: true } },
        module: { type: 'commonjs' },
      },
    ],
  },
  // These packages ship only ES modules, which jest's CommonJS loader cannot take as they are.
  transformIgnorePatterns: ['/node_modules/(?!(@borgar|@zip\\.js)/)'],
  // Its `exports` name a CommonJS file that the package lacks.
  moduleNameMapper: { '^numfmt$': '<rootDir>/node_modules/numfmt/dist/index.js' },
  reporters: ['default', '<rootDir>/tests/support/closing-line-reporter.cjs'],
  maxWorkers: 2,
};
