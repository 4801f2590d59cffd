import presets from 'jest-preset-angular/presets/index.js';

/** swc strips types; `npm run lint` checks them. */
const swc = [
  '@swc/jest',
  {
    jsc: {
      target: 'es2022',
      parser: { syntax: 'typescript', decorators: true },
      transform: { legacyDecorator: true, decoratorMetadata: false, useDefineForClassFields: false },
      keepClassNames: true,
    },
    module: { type: 'commonjs' },
  },
];

/** For suites that need PostgreSQL: a throw-away cluster for as long as Jest runs. */
const database = {
  globalSetup: '<rootDir>/test/support/hold-database.mjs',
  globalTeardown: '<rootDir>/test/support/release-database.mjs',
};

/** One Jest project for each folder of `test/`, so that a suite can be run by its name: `npx jest --selectProjects unit`. */
const nodeProject = (name, more = {}) => ({
  displayName: name,
  rootDir: import.meta.dirname,
  testMatch: [`<rootDir>/test/${name}/**/*.spec.ts`],
  testEnvironment: 'node',
  transform: { '^.+\\.ts$': swc },
  ...more,
});

export default {
  // Ends a test that hangs; a busy machine may be ten times slower than an idle one and is no reason to fail.
  testTimeout: 60_000,
  projects: [
    nodeProject('reference'),
    nodeProject('unit'),
    nodeProject('calibration'),
    nodeProject('api', database),
    nodeProject('e2e', database),
    {
      ...presets.createCjsPreset({ tsconfig: '<rootDir>/src/tsconfig.spec.json' }),
      displayName: 'component',
      rootDir: import.meta.dirname,
      testMatch: ['<rootDir>/src/**/*.spec.ts'],
      testEnvironment: 'jest-preset-angular/environments/jest-jsdom-env',
      setupFilesAfterEnv: ['<rootDir>/src/testing/setup.ts'],
      moduleNameMapper: {
        'log-worker-factory$': '<rootDir>/src/testing/log-worker-stub.ts',
        'plotly-loader$': '<rootDir>/src/testing/plotly-stub.ts',
      },
    },
  ],
};
