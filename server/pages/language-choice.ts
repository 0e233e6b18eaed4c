import { languages } from '../../shared/languages/languages';
import { escapeHtml } from '../printing/page';
import { smallPage } from './small-page';

/** Every language in its own name and script; only those that can be opened. Neutral: it names no clinic and no job. */
export function languageChoice(built: readonly string[]): string {
  const links = languages
    .filter(({ id }) => built.includes(id))
    .map(
      ({ id, tag, dir, nativeName }) =>
        `<li><a href="/${id}/" lang="${tag}" hreflang="${tag}" dir="${dir}">${escapeHtml(nativeName)}</a></li>`,
    );
  const body =
    links.length > 0
      ? `<h1>Choose your language</h1><ul class="choices">${links.join('')}</ul>`
      : '<h1>The pages are not built yet.</h1><p>Start again with npm start, or run npm run build.</p>';
  return smallPage({ language: 'en', dir: 'ltr', title: 'Choose your language', body });
}
