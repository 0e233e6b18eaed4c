import { escapeHtml } from '../printing/page';

export interface SmallPage {
  readonly language: string;
  readonly dir: 'ltr' | 'rtl';
  readonly title: string;
  /** Safe HTML. */
  readonly body: string;
}

/** Three discs that rise over a horizon: the mark, in a band of the sky before sunrise. */
const sky =
  '<header class="sky"><svg viewBox="0 0 96 34" width="144" height="51" aria-hidden="true"><circle cx="16" cy="27" r="6"/><circle cx="42" cy="22" r="9"/><path d="M60 34a15 15 0 0 1 30 0Z"/></svg></header>';

/**
 * A page that needs no script and no other file. Colours and sky are those of the applications' theme; the device's
 * scheme decides before the first paint, so that nothing flashes at night.
 */
export function smallPage({ language, dir, title, body }: SmallPage): string {
  return `<!doctype html>
<html lang="${escapeHtml(language)}" dir="${dir}">
<head>
<meta charset="utf-8">
<meta name="viewport" content="width=device-width, initial-scale=1">
<meta name="color-scheme" content="light dark">
<title>${escapeHtml(title)}</title>
<style>
:root{color-scheme:light dark;--paper:#f6f7fb;--sheet:#fff;--text:#1b2036;--soft:#474e70;--ink:#2b3566;--line:#747ca8;--danger:#a11d22;--danger-soft:#fbe4e3}
@media screen and (prefers-color-scheme:dark){:root{--paper:#10142a;--sheet:#191f3c;--text:#edeffc;--soft:#b9c0e2;--ink:#bcc6ff;--line:#7c84b3;--danger:#ffb4ac;--danger-soft:#4a1f24}}
*{box-sizing:border-box}
body{margin:0;font:1.125rem/1.6 Nunito,system-ui,sans-serif;background:var(--paper);color:var(--text)}
:lang(ar) body,:lang(fa) body{font-size:1.25rem;line-height:1.8}
.sky,main{padding-inline:max(1.25rem,calc((100vw - 36rem) / 2))}
.sky{display:flex;align-items:flex-end;height:7rem;background:linear-gradient(#1a2150,#4a4580 55%,#85587f 82%,#e3a894);border-bottom:2px solid var(--line)}
.sky svg{display:block;fill:#f0b79b}
main{padding-block:1.75rem 3rem}
h1{margin:0 0 1rem;font-size:1.6rem;line-height:1.3;text-wrap:balance}
ul{margin:1.25rem 0;padding-inline-start:1.25rem}li{margin-block:.75rem}li::marker{color:var(--line)}
.choices{list-style:none;padding:0}
.choices a{display:flex;align-items:center;min-height:3.5rem;padding:.5rem 1.25rem;border:2px solid var(--ink);border-radius:1rem;background:var(--sheet);color:var(--ink);text-decoration:none;font-weight:700}
.choices a:focus-visible{outline:3px solid var(--ink);outline-offset:3px}
.urgent{border:2px solid var(--danger);border-radius:1rem;padding:.75rem 1.25rem;background:var(--danger-soft);font-weight:700}
.soft{color:var(--soft);font-size:1rem}
@media print{:root{--paper:#fff}.sky{display:none}main{padding:0}.urgent{background:none}}
</style>
</head>
<body>
${sky}
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
