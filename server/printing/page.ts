import { fontRules } from './fonts';

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

/**
 * A page for paper: Letter size, always dark on white. `.top` keeps the first 82 mm for letterhead and address; the
 * address stands where every window at the left shows it, however the folded paper slides: from 63 to 80 mm below the
 * upper edge and from 23 mm right of the left edge, in every direction of writing. (Number 10 window envelope: window
 * 4.5 by 1.125 inches, 0.875 from the left and 0.5 from the lower edge; DIN 5008:2020 form B: recipient's zone from 62.7
 * mm below the upper and 20 mm right of the left edge.)
 */
export function printedPage({ language, dir, title, body }: PrintedPage): string {
  return `<!doctype html><html lang="${escapeHtml(language)}" dir="${dir}"><head><meta charset="utf-8"><title>${escapeHtml(title)}</title><style>${fontRules(language)}
@page{size:Letter;margin:16mm 19mm 12mm}
html{font:11pt/1.45 Nunito,Vazirmatn,sans-serif;color:#111}
:lang(ar),:lang(fa){line-height:1.6}
body{margin:0}.top{position:relative;height:66mm}
header{display:flex;justify-content:space-between;gap:10mm;border-bottom:1.2pt solid #2b3566;padding-bottom:3mm}
header p{margin:0}.address{position:absolute;top:47mm;left:4mm;width:85mm;height:17mm;overflow:hidden}
h1{font-size:16pt;line-height:1.3;margin:0 0 2mm;break-after:avoid}
h2{font-size:12pt;line-height:1.35;margin:3mm 0 .5mm;break-after:avoid}
p{margin:0 0 2mm;orphans:3;widows:3}section:last-child{break-before:avoid}section:last-child p{margin:0}
.calm{break-inside:avoid;border:1.2pt solid #2b3566;border-radius:3mm;padding:3mm 4mm}.do{font-weight:700}
.soft,footer{font-size:9.5pt;color:#333}footer{margin-top:8mm;border-top:.6pt solid #777;padding-top:3mm}
</style></head><body>${body}</body></html>`;
}
