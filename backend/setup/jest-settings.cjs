'use strict';

// A zone with a 45 minute offset and summer time: whatever silently depends on the machine's zone shows itself.
process.env.TZ = 'Pacific/Chatham';

/** Jest settings shared by backend and jobs. Types are checked once by `tsc -b`; here they are only stripped. */
module.exports = {
  testEnvironment: 'node',
  testRegex: '/src/.*\\.spec\\.ts$',
  transform: {
    '^.+\\.(t|j|mj)s$': [
      '@swc/jest',
      {
        swcrc: false,
        sourceMaps: 'inline',
        jsc: {
          target: 'es2022',
          parser: { syntax: 'typescript', decorators: true },
          // Nest's injection and MikroORM's entities both read the metadata of legacy decorators.
          transform: { legacyDecorator: true, decoratorMetadata: true },
          keepClassNames: true,
        },
        module: { type: 'commonjs' },
      },
    ],
  },
  moduleFileExtensions: ['ts', 'js', 'mjs', 'cjs', 'json', 'node'],
  // Workspaces are read from their sources, so a stale build cannot be tested by mistake.
  testEnvironmentOptions: { customExportConditions: ['@stayledger/source', 'node', 'require', 'default'] },
  // Sources import with the `.js` ending that Node needs after the build.
  moduleNameMapper: { '^(\\.{1,2}/.*)\\.js$': '$1' },
  // These packages ship ES modules only; Jest cannot require them untransformed on Node 20.
  transformIgnorePatterns: ['/node_modules/(?!(@tus|srvx|uuid)/)'],
  globalSetup: require.resolve('./jest-database.cjs'),
  maxWorkers: 2,
  // On two busy cores a password hash or the first request of an application can take seconds.
  testTimeout: 20_000,
};
