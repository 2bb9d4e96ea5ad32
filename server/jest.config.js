const swc = {
  swcrc: false,
  sourceMaps: 'inline',
  module: { type: 'commonjs' },
  jsc: {
    target: 'es2022',
    parser: { syntax: 'typescript', decorators: true },
    transform: { legacyDecorator: true, decoratorMetadata: true, useDefineForClassFields: false },
    keepClassNames: true,
  },
};
// jest on Node 20 cannot require an ES module, so what an in-process spec loads is transformed.
const esmOnly = [
  '@nestjs',
  'file-type',
  'strtok3',
  'token-types',
  'uint8array-extras',
  '@tokenizer',
  '@borewit',
  'load-esm',
  'uuid',
];

export default {
  testEnvironment: 'node',
  testEnvironmentOptions: { customExportConditions: ['@kerfyard/source', 'node', 'node-addons'] },
  moduleFileExtensions: ['ts', 'js', 'mjs', 'cjs', 'json', 'node'],
  resolver: '<rootDir>/test/resolver.cjs',
  transform: {
    '^.+\\.ts$': ['@swc/jest', swc],
    '^.+\\.m?js$': ['@swc/jest', { ...swc, jsc: { ...swc.jsc, parser: { syntax: 'ecmascript' } } }],
  },
  transformIgnorePatterns: [`/node_modules/(?!(${esmOnly.join('|')})/)`],
  testMatch: [
    '<rootDir>/src/**/*.spec.ts',
    '<rootDir>/fakes/**/*.spec.ts',
    '<rootDir>/test/**/*.e2e-spec.ts',
  ],
  modulePathIgnorePatterns: ['<rootDir>/dist/', '<rootDir>/dist-fakes/'],
  globalSetup: '<rootDir>/test/global-setup.mjs',
  globalTeardown: '<rootDir>/test/global-teardown.mjs',
  testTimeout: 60_000,
  maxWorkers: 2,
  workerIdleMemoryLimit: '1GB',
};
