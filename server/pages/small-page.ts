import { escapeHtml } from '../printing/page';

export interface SmallPage {
  readonly language: string;
  readonly dir: 'ltr' | 'rtl';
  readonly title: string;
  /** Safe HTML. */
  readonly body: string;
}

/** Three discs over a horizon: the mark. Drawn in the text's own colour, so that it follows the device's scheme. */
const mark =
  '<svg viewBox="0 0 96 40" width="96" height="40" aria-hidden="true"><g fill="currentColor"><circle cx="18" cy="26" r="6"/><circle cx="44" cy="22" r="9"/><circle cx="76" cy="17" r="13"/></g><path d="M2 35h92" stroke="currentColor" stroke-width="2"/></svg>';

/** A page that needs no script and no other file; colours are the device's own, so that nothing flashes at night. */
export function smallPage({ language, dir, title, body }: SmallPage): string {
  return `<!doctype html>
<html lang="${escapeHtml(language)}" dir="${dir}">
<head>
<meta charset="utf-8">
<meta name="viewport" content="width=device-width, initial-scale=1">
<title>${escapeHtml(title)}</title>
<style>
:root{color-scheme:light dark}
body{margin:0 auto;padding:2rem 1.25rem 3rem;max-width:36rem;font:1.125rem/1.6 Nunito,system-ui,sans-serif;background:Canvas;color:CanvasText}
h1{font-size:1.6rem;line-height:1.3}
ul{padding-inline-start:1.25rem}li{margin-block:.75rem}
.choices{list-style:none;padding:0}
.choices a{display:block;min-height:3rem;padding:.6rem 1.25rem;border:2px solid;border-radius:1rem;text-decoration:none;font-weight:700;box-sizing:border-box}
.choices a:focus-visible{outline:3px solid;outline-offset:3px}
.urgent{border:2px solid;border-radius:1rem;padding:.75rem 1.25rem;font-weight:700}
.soft{font-size:1rem}
@media print{:root{color-scheme:light}body{padding:0}}
</style>
</head>
<body>
${mark}
<main>
${body}
</main>
</body>
</html>
`;
}

export function notThere(): string {
  return smallPage({
    language: 'en',
    dir: 'ltr',
    title: 'Nothing here',
    body: '<h1>There is nothing at this address.</h1><ul class="choices"><li><a href="/">Choose your language</a></li></ul>',
  });
}
