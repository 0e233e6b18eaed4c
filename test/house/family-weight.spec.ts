import { existsSync, readFileSync } from 'node:fs';
import { dirname, join, relative } from 'node:path';
import ts from 'typescript';

const root = join(__dirname, '..', '..');

/** What a file imports at run time: relative files resolved, packages as written. */
function importsOf(file: string): string[] {
  const source = ts.createSourceFile(file, readFileSync(file, 'utf8'), ts.ScriptTarget.ES2022);
  const found: string[] = [];
  const visit = (node: ts.Node): void => {
    if (
      (ts.isImportDeclaration(node) && !isTypeOnly(node.importClause)) ||
      (ts.isExportDeclaration(node) && !node.isTypeOnly && node.moduleSpecifier)
    )
      found.push((node.moduleSpecifier as ts.StringLiteral).text);
    else if (ts.isCallExpression(node) && node.expression.kind === ts.SyntaxKind.ImportKeyword)
      found.push((node.arguments[0] as ts.StringLiteral).text);
    ts.forEachChild(node, visit);
  };
  visit(source);
  return found;
}

function isTypeOnly(clause: ts.ImportClause | undefined): boolean {
  if (!clause) return false;
  if (clause.isTypeOnly) return true;
  const bindings = clause.namedBindings;
  return (
    !clause.name &&
    bindings !== undefined &&
    ts.isNamedImports(bindings) &&
    bindings.elements.length > 0 &&
    bindings.elements.every((element) => element.isTypeOnly)
  );
}

/** Every file and package that reaches the browser from an entry, with the way it came. */
function reachedFrom(entry: string): Map<string, string> {
  const reached = new Map<string, string>();
  const waiting = [entry];
  for (let file = waiting.pop(); file !== undefined; file = waiting.pop()) {
    for (const source of importsOf(file)) {
      const target = source.startsWith('.') ? resolveFile(dirname(file), source) : source;
      if (reached.has(target)) continue;
      reached.set(target, relative(root, file));
      if (source.startsWith('.') && target.endsWith('.ts')) waiting.push(target);
    }
  }
  return reached;
}

function resolveFile(folder: string, source: string): string {
  const base = join(folder, source);
  const found = [`${base}.ts`, join(base, 'index.ts'), base].find((path) => existsSync(path));
  if (!found) throw new Error(`${source} of ${folder} leads nowhere`);
  return found;
}

describe('what reaches a family’s phone', () => {
  const reached = reachedFrom(join(root, 'src/family/main.ts'));

  it.each([
    ['zod', /^zod/],
    ['luxon', /^luxon/],
    ['overlays', /^@angular\/cdk\/(overlay|dialog|menu|portal)/],
    ['heavy Material controls', /^@angular\/material\/(?!button$|core$|progress-bar$)/],
    ['clinic screens', /\/src\/clinic\//],
    ['conversions of zones', /\/shared\/domain\/zone\.ts$/],
  ])('holds no %s', (_what, heavy) => {
    const ways = [...reached]
      .filter(([target]) => heavy.test(target))
      .map(([target, from]) => `${target} from ${from}`);
    expect(ways).toEqual([]);
  });

  it('is followed through the screens', () => {
    expect([...reached.keys()].filter((target) => target.includes('/src/family/app/'))).not.toEqual(
      [],
    );
  });
});
