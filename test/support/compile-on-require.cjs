// Lets Node.js load the server's TypeScript as it stands, for programs that a test runs as processes of their own.
const { transformFileSync } = require('@swc/core');

require.extensions['.ts'] = (module, filename) => {
  const { code } = transformFileSync(filename, {
    jsc: { target: 'es2022', parser: { syntax: 'typescript' } },
    module: { type: 'commonjs' },
    sourceMaps: 'inline',
  });
  module._compile(code, filename);
};
