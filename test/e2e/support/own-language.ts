import type { Locator } from '@playwright/test';
import type { LanguageId } from '../../../shared/languages/languages';
import { expect } from './walk';

const english =
  /\b(the|and|your|you|is|are|not|call|please|with|from|until|morning|today|child|letter|clinic|nurse|answers?|now|what|have)\b/i;
/** A key, a place for a value, or a value that is missing: what nobody should ever read. */
const raw = /\b[a-z]+(?:-[a-z]+)*\.[a-z-]+(?:\.[a-z-]+)+\b|\{\w+\}|\b(?:undefined|null|NaN)\b/;
/** Unicode's isolates, one within another. */
const isolated = /[\u2066-\u2068][^\u2066-\u2069]*\u2069/g;

/**
 * Fails when a text is in another language than it should be: English words in Spanish, Latin letters in Arabic.
 * `names` are what clinic and family call things and people, which no language changes.
 */
export function expectOwnWords(
  text: string,
  language: LanguageId,
  names: readonly string[] = [],
): void {
  let rest = text.replace(/https?:\S+/g, ' ');
  for (let before = ''; before !== rest;) {
    before = rest;
    rest = rest.replace(isolated, ' ');
  }
  for (const name of [...names].sort((a, b) => b.length - a.length))
    rest = rest.replaceAll(name, ' ');
  expect(rest).not.toMatch(raw);
  expect(rest).not.toMatch(language === 'ar' ? /[a-z]{2,}/i : english);
}

/** The same for all that a page shows; names of people and parts in another language are left out. */
export async function expectOwnPage(
  part: Locator,
  language: LanguageId,
  names: readonly string[] = [],
): Promise<void> {
  const html = part.page().locator('html');
  await expect(html).toHaveAttribute('lang', language);
  if (language === 'ar') await expect(html).toHaveAttribute('dir', 'rtl');
  const text = await part.evaluate((element, own) => {
    const isForeign = (node: Element | null): boolean =>
      node?.closest('[lang]')?.getAttribute('lang') !== own || node?.closest('noscript') !== null;
    const walker = document.createTreeWalker(element, NodeFilter.SHOW_TEXT);
    const texts: string[] = [];
    while (walker.nextNode())
      if (!isForeign(walker.currentNode.parentElement))
        texts.push(walker.currentNode.textContent ?? '');
    return texts.join('\n');
  }, language);
  expectOwnWords(text, language, names);
  expect(await turnedNumbers(part), 'numbers whose digits run the wrong way').toEqual([]);
}

/** Telephone numbers and clock times whose first digit is not drawn to the left of the last. */
function turnedNumbers(part: Locator): Promise<readonly string[]> {
  return part.evaluate((element) => {
    const walker = document.createTreeWalker(element, NodeFilter.SHOW_TEXT);
    const place = (node: Node, at: number): DOMRect => {
      const range = document.createRange();
      range.setStart(node, at);
      range.setEnd(node, at + 1);
      return range.getBoundingClientRect();
    };
    const turned: string[] = [];
    while (walker.nextNode()) {
      const node = walker.currentNode;
      for (const found of (node.textContent ?? '').matchAll(
        /\(?\d{3}\)?[ -]\d{3}-\d{4}|\d{1,2}:\d{2}/g,
      )) {
        const first = place(node, found.index);
        const last = place(node, found.index + found[0].length - 1);
        const isOneLine = Math.abs(first.top - last.top) < 2;
        if (first.width > 0 && isOneLine && first.left >= last.left) turned.push(found[0]);
      }
    }
    return turned;
  });
}
