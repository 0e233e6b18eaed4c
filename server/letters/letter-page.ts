import { languageOf, type LanguageId } from '../../shared/languages/languages';
import { escapeHtml, isolateNumbers, printedPage } from '../printing/page';
import type { LetterBody } from './sign-letter';

export interface LetterPage {
  readonly body: LetterBody;
  readonly language: string;
  readonly recipient: string;
  readonly letterhead: readonly string[];
}

const lines = (text: string): string =>
  text
    .split('\n')
    .map((line) => isolateNumbers(escapeHtml(line)))
    .join('<br>');

/** A name or an address keeps its own direction inside a letter that runs the other way. */
const apart = (text: string): string => `<bdi>${escapeHtml(text)}</bdi>`;

/** The letter for paper: letterhead, address window, the paragraphs as signed. */
export function letterPage({ body, language, recipient, letterhead }: LetterPage): string {
  const [name, ...rest] = letterhead;
  const paragraphs = body.paragraphs.map(
    ({ heading, text, tone }) =>
      `<section>${heading ? `<h2>${escapeHtml(heading)}</h2>` : ''}<p class="${tone}">${lines(text)}</p></section>`,
  );
  return printedPage({
    language,
    dir: languageOf(language as LanguageId).dir,
    title: body.title,
    body: `<div class="top"><header><p><strong>${apart(name ?? '')}</strong><br>${rest.map(apart).join('<br>')}</p>
      <p>${escapeHtml(body.dateSays)}</p></header>
      <div class="address"><p>${apart(recipient)}</p></div></div>
      <main><h1>${escapeHtml(body.title)}</h1>${paragraphs.join('')}</main>`,
  });
}
