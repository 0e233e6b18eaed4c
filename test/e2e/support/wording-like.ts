import type { LanguageId } from '../../../shared/languages/languages';
import { shippedWords } from '../../support/words';

/** What a shipped text of a language looks like, whatever is filled in. */
export function wordingLike(language: LanguageId, ...keys: readonly string[]): RegExp {
  return new RegExp(keys.map((key) => sourceLike(language, key)).join('|'));
}

function sourceLike(language: LanguageId, key: string): string {
  const text = shippedWords(language)[key];
  if (text === undefined) throw new Error(`There is no ${key} in ${language}.`);
  const fixed: string[] = [''];
  let depth = 0;
  for (const sign of text) {
    if (sign === '{') depth += 1;
    if (depth === 0) fixed[fixed.length - 1] += sign;
    if (sign === '}') depth -= 1;
    if (sign === '}' && depth === 0) fixed.push('');
  }
  const literal = (part: string): string =>
    part.replace(/[.*+?^${}()|[\]\\]/g, '\\$&').replace(/\s+/g, '\\s+');
  return fixed.map(literal).join('[^]*?');
}
