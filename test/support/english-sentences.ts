import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import ts from 'typescript';

const root = join(__dirname, '..', '..');

/** Files of a folder of the checkout, without tests. */
export function sourcesOf(folder: string): string[] {
  return readdirSync(join(root, folder), { recursive: true, encoding: 'utf8' })
    .filter((name) => name.endsWith('.ts') && !name.endsWith('.spec.ts'))
    .map((name) => `${folder}/${name}`);
}

/** Every text that a file writes itself, with '7' where it puts a value in; imports left out. */
export function textsOf(file: string): string[] {
  const found: string[] = [];
  const visit = (node: ts.Node): void => {
    if (ts.isImportDeclaration(node) || ts.isTypeNode(node)) return;
    if (ts.isStringLiteral(node) || ts.isNoSubstitutionTemplateLiteral(node)) found.push(node.text);
    else if (ts.isTemplateExpression(node)) {
      found.push(
        [node.head.text, ...node.templateSpans.map(({ literal }) => literal.text)].join('7'),
      );
      // Values that are put in can carry words of their own.
      node.templateSpans.forEach(({ expression }) => visit(expression));
    } else ts.forEachChild(node, visit);
  };
  visit(ts.createSourceFile(file, readFileSync(join(root, file), 'utf8'), ts.ScriptTarget.Latest));
  return found;
}

/** Whether a text is a whole sentence for a person. */
export const isSentence = (text: string): boolean =>
  /^[A-Z7].* .*[.?!]$/s.test(text) && !/\b(SELECT|UPDATE|INSERT)\b/.test(text);
