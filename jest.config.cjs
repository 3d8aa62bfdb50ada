const { createCjsPreset } = require('jest-preset-angular/presets');

const paths = {
  '^@foldwright/shared/(.*)$': '<rootDir>/shared/src/$1',
  '^@foldwright/server/(.*)$': '<rootDir>/server/src/$1',
};

// Published as ES modules only, under a plain .js name; jest requires CommonJS.
const ES_MODULES = '(earcut|robust-predicates|clipper2-ts|flatbush|flatqueue)';

const node = {
  rootDir: __dirname,
  testEnvironment: 'node',
  // Time limits of tests say what hangs, not what is slow: two busy cores make a quick test take seconds.
  testTimeout: 30_000,
  setupFiles: ['<rootDir>/test/support/property-runs.cjs'],
  // Types are checked by `tsc -b`; here each file is only transpiled, which keeps the suite fast.
  transform: {
    '^.+\\.ts$': ['ts-jest', { tsconfig: '<rootDir>/tsconfig.jest.json', diagnostics: false }],
    'server/src/setup/.+\\.mjs$': '<rootDir>/test/support/esm-transform.cjs',
    [`node_modules/${ES_MODULES}/.+\\.js$`]: '<rootDir>/test/support/esm-transform.cjs',
  },
  transformIgnorePatterns: [`node_modules/(?!${ES_MODULES}/)`],
  moduleNameMapper: paths,
};

/** One cluster and one migrated template per call of jest, however many of these projects run. */
const withDatabase = {
  ...node,
  globalSetup: '<rootDir>/test/support/database-setup.cjs',
  globalTeardown: '<rootDir>/test/support/database-teardown.cjs',
};

/** Code that needs nothing but Node; code that needs the database; journeys through the built product; the application. */
module.exports = {
  projects: [
    {
      ...node,
      displayName: 'node',
      testMatch: [
        '<rootDir>/shared/src/**/*.test.ts',
        '<rootDir>/server/src/**/*.test.ts',
        '<rootDir>/test/cross/**/*.test.ts',
        '<rootDir>/test/setup/**/*.test.ts',
      ],
      testPathIgnorePatterns: ['/node_modules/', '\\.db\\.test\\.ts$', '\\.e2e\\.test\\.ts$'],
    },
    {
      ...withDatabase,
      displayName: 'database',
      testMatch: [
        '<rootDir>/server/src/**/*.db.test.ts',
        '<rootDir>/test/setup/**/*.db.test.ts',
        '<rootDir>/test/api/**/*.test.ts',
      ],
    },
    {
      ...node,
      displayName: 'e2e',
      // One running product for all journeys; each makes the parts it works on.
      globalSetup: '<rootDir>/test/support/product-setup.cjs',
      globalTeardown: '<rootDir>/test/support/product-teardown.cjs',
      testMatch: ['<rootDir>/test/e2e/**/*.test.ts', '<rootDir>/test/setup/**/*.e2e.test.ts'],
    },
    {
      displayName: 'web',
      rootDir: __dirname,
      ...createCjsPreset({ tsconfig: '<rootDir>/projects/foldwright/tsconfig.spec.json' }),
      testMatch: ['<rootDir>/projects/**/*.spec.ts'],
      setupFilesAfterEnv: ['<rootDir>/projects/foldwright/jest-setup.ts'],
      transformIgnorePatterns: ['node_modules/(?!(.*\\.mjs$|three/|earcut/|flatbush/|flatqueue/|clipper2-ts/|robust-predicates/|@mdi/js/|@angular/common/locales/.*\\.js$))'],
      moduleNameMapper: { ...paths, '^@foldwright/ui/(.*)$': '<rootDir>/projects/ui/src/$1' },
    },
  ],
};
