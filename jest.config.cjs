const { createCjsPreset } = require('jest-preset-angular/presets');

const shared = { '^@foldwright/shared/(.*)$': '<rootDir>/shared/src/$1', '^@foldwright/server/(.*)$': '<rootDir>/server/src/$1' };
// Types are checked by `tsc -b`; here each file is only transpiled, which keeps the suite fast.
const transpile = { '^.+\\.ts$': ['ts-jest', { tsconfig: '<rootDir>/tsconfig.jest.json', diagnostics: false }] };

/** Three projects: pure and server code, code that needs the database, and the Angular application. */
module.exports = {
  projects: [
    {
      displayName: 'node',
      rootDir: __dirname,
      testEnvironment: 'node',
      testMatch: ['<rootDir>/shared/src/**/*.test.ts', '<rootDir>/server/src/**/*.test.ts', '<rootDir>/test/cross/**/*.test.ts'],
      testPathIgnorePatterns: ['\\.db\\.test\\.ts$'],
      transform: transpile,
      moduleNameMapper: shared,
    },
    {
      displayName: 'database',
      rootDir: __dirname,
      testEnvironment: 'node',
      testMatch: ['<rootDir>/server/src/**/*.db.test.ts', '<rootDir>/test/api/**/*.test.ts'],
      transform: transpile,
      moduleNameMapper: shared,
    },
    {
      displayName: 'e2e',
      rootDir: __dirname,
      testEnvironment: 'node',
      testMatch: ['<rootDir>/test/e2e/**/*.test.ts'],
      transform: transpile,
      moduleNameMapper: shared,
    },
    {
      displayName: 'web',
      rootDir: __dirname,
      ...createCjsPreset({ tsconfig: '<rootDir>/projects/foldwright/tsconfig.spec.json' }),
      testMatch: ['<rootDir>/projects/**/*.spec.ts'],
      setupFilesAfterEnv: ['<rootDir>/projects/foldwright/jest-setup.ts'],
      transformIgnorePatterns: ['node_modules/(?!(.*\\.mjs$|three/|@mdi/js/|@angular/common/locales/.*\\.js$))'],
      moduleNameMapper: { ...shared, '^@foldwright/ui/(.*)$': '<rootDir>/projects/ui/src/$1' },
    },
  ],
};
