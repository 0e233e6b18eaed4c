// Four projects: domain and house are pure, server has a real database, web has a pretended browser.
const compiled = {
  '^.+\\.ts$': [
    '@swc/jest',
    {
      jsc: { target: 'es2022', parser: { syntax: 'typescript' } },
      module: { type: 'commonjs' },
      sourceMaps: 'inline',
    },
  ],
};

const node = {
  testEnvironment: 'node',
  testMatch: ['**/*.spec.ts'],
  transform: compiled,
  moduleFileExtensions: ['ts', 'js', 'json', 'node'],
};

module.exports = {
  projects: [
    {
      ...node,
      displayName: 'domain',
      roots: ['<rootDir>/shared', '<rootDir>/test/domain'],
    },
    {
      ...node,
      displayName: 'house',
      // Its tests start programs and databases of their own.
      testTimeout: 60_000,
      roots: ['<rootDir>/test/house'],
    },
    {
      ...node,
      displayName: 'server',
      testTimeout: 20_000,
      roots: ['<rootDir>/server', '<rootDir>/test/server'],
      globalSetup: '<rootDir>/test/support/jest-global-setup.mjs',
      globalTeardown: '<rootDir>/test/support/jest-global-teardown.mjs',
    },
    {
      displayName: 'web',
      preset: 'jest-preset-angular',
      roots: ['<rootDir>/src'],
      testMatch: ['**/*.spec.ts'],
      setupFilesAfterEnv: ['<rootDir>/test/support/angular-setup.ts'],
      transform: {
        '^.+\\.(ts|js|mjs|html|svg)$': [
          'jest-preset-angular',
          {
            tsconfig: '<rootDir>/tsconfig.spec.json',
            stringifyContentPathRegex: '\\.(html|svg)$',
          },
        ],
      },
    },
  ],
};
