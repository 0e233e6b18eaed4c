// The domain's tests as `npm run mutate` uses them: the files and the compiler of jest.config.js. The
// large comparisons with a second clock are left out, since they would run once for every mutant:
// the tables and properties have to catch each of them alone.
const { projects } = require('../../jest.config');

const domain = projects.find(({ displayName }) => displayName === 'domain');

module.exports = {
  ...domain,
  rootDir: '../..',
  testEnvironment: '@stryker-mutator/jest-runner/jest-env/node',
  setupFiles: ['<rootDir>/test/mutation/jest-setup.js'],
  testPathIgnorePatterns: ['/node_modules/', '/(second-clock|clock-changes)\\.spec\\.ts$'],
};
