import { readFileSync } from 'node:fs';
import { dirname, join } from 'node:path';

const fontFolder = join(dirname(require.resolve('@fontsource/nunito/package.json')), 'files');

const fontFace = (weight: number): string => {
  const data = readFileSync(join(fontFolder, `nunito-latin-${weight}-normal.woff2`)).toString(
    'base64',
  );
  return `@font-face{font-family:Nunito;font-weight:${weight};src:url(data:font/woff2;base64,${data}) format('woff2')}`;
};

let faces: string | null = null;

const entities: Record<string, string> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  "'": '&#39;',
};
export const escapeHtml = (text: string): string =>
  text.replace(/[&<>"']/g, (character) => entities[character] ?? character);

/** Telephone numbers and clock times keep their order in right-to-left text. */
export const isolateNumbers = (escaped: string): string =>
  escaped.replace(
    /(\+?\d[\d ().-]{5,}\d|\d{1,2}:\d{2})/g,
    (number) => `<bdi dir="ltr">${number}</bdi>`,
  );

export interface PrintedPage {
  readonly language: string;
  readonly dir: 'ltr' | 'rtl';
  readonly title: string;
  /** Safe HTML. */
  readonly body: string;
}

/** A page for paper: Letter size, an address window, always dark on white. */
export function printedPage({ language, dir, title, body }: PrintedPage): string {
  faces ??= fontFace(400) + fontFace(700);
  return `<!doctype html><html lang="${escapeHtml(language)}" dir="${dir}"><head><meta charset="utf-8"><title>${escapeHtml(title)}</title><style>${faces}
@page{size:Letter;margin:20mm 20mm 18mm}
html{font:11.5pt/1.6 Nunito,sans-serif;color:#111}
header{display:flex;justify-content:space-between;gap:10mm;border-bottom:1.2pt solid #2b3566;padding-bottom:4mm;margin-bottom:8mm}
header p{margin:0}.address{min-height:26mm;margin-bottom:6mm}
h1{font-size:17pt;line-height:1.3;margin:0 0 5mm;break-after:avoid}
h2{font-size:12.5pt;line-height:1.35;margin:5mm 0 1mm;break-after:avoid}
p{margin:0 0 2.5mm;orphans:3;widows:3}section{break-inside:avoid}
.calm{border:1.2pt solid #2b3566;border-radius:3mm;padding:3mm 4mm}.do{font-weight:700}
.soft,footer{font-size:9.5pt;color:#333}footer{margin-top:8mm;border-top:.6pt solid #777;padding-top:3mm}
</style></head><body>${body}</body></html>`;
}
