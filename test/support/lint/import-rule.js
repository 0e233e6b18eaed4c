const { dirname, join, relative, sep } = require('node:path');
const { refusals } = require('./rooms');

const root = join(__dirname, '..', '..', '..');
const fromRoot = (path) => relative(root, path).split(sep).join('/');

/** One import as the table of rooms reads it. */
function importedBy(file, source, typeOnly) {
  if (!source.startsWith('.')) return { package: source, typeOnly };
  const path = fromRoot(join(dirname(join(root, file)), source));
  return { path: path.replace(/\.(ts|js|mjs|json)$/, ''), typeOnly };
}

/** `import type`, or nothing but `type` specifiers between the braces. */
function isTypeOnly(node) {
  if (node.importKind === 'type' || node.exportKind === 'type') return true;
  const specifiers = node.specifiers ?? [];
  return (
    specifiers.length > 0 &&
    specifiers.every(({ importKind, exportKind }) => (importKind ?? exportKind) === 'type')
  );
}

/** ESLint rule: every import, export from, import() and require() asks the table of rooms. */
module.exports = {
  meta: {
    type: 'problem',
    docs: { description: 'Who may import whom' },
    messages: { refused: '{{ file }} may not import "{{ source }}": {{ why }}.' },
    schema: [],
  },
  create(context) {
    const file = fromRoot(context.filename);
    const check = (node, source, typeOnly) => {
      if (typeof source !== 'string') return;
      for (const why of refusals(file, importedBy(file, source, typeOnly)))
        context.report({ node, messageId: 'refused', data: { file, source, why } });
    };
    const checkDeclaration = (node) => check(node, node.source?.value, isTypeOnly(node));
    return {
      ImportDeclaration: checkDeclaration,
      ExportNamedDeclaration: checkDeclaration,
      ExportAllDeclaration: checkDeclaration,
      ImportExpression: (node) => check(node, node.source.value, false),
      TSImportType: (node) => check(node, (node.source ?? node.argument?.literal)?.value, true),
      TSExternalModuleReference: (node) => check(node, node.expression.value, false),
      CallExpression: (node) =>
        node.callee.name === 'require' && check(node, node.arguments[0]?.value, false),
    };
  },
};
