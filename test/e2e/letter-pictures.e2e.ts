import { existsSync } from 'node:fs';
import { openPrinter, type Printer } from '../../server/printing/printer';
import type { LanguageId } from '../../shared/languages/languages';
import { wordingIn } from '../support/words';
import { fullLetter, longLetter, usualLetter } from './support/letter-samples';
import { pdfPages, type PdfPage } from './support/pdf-pages';
import { expect, test } from './support/walk';

const languages: readonly LanguageId[] = ['en', 'es', 'ar'];

// The browser that prints for a clinic, not the shell that tests run in.
const chromium = ['/usr/bin/chromium', '/usr/bin/chromium-headless-shell'].find(existsSync) ?? '';
let printer: Printer;
test.beforeAll(() => {
  printer = openPrinter(chromium);
});
test.afterAll(() => printer.close());

/** The page beside the one that was looked at and approved; drawn edges may differ, signs may not. */
function expectApproved({ picture }: PdfPage, name: string): void {
  expect(picture).toMatchSnapshot(`${name}.png`, { threshold: 0.3, maxDiffPixels: 40 });
}

for (const language of languages) {
  test(`the usual letter in ${language} looks as it was approved`, async () => {
    const pdf = await printer.print(usualLetter(language));
    const file = pdf.toString('latin1');
    // Tagged, in its language, and with the bundled fonts alone inside.
    for (const sign of ['/StructTreeRoot', '/Marked true', `/Lang (${language})`])
      expect(file.includes(sign), sign).toBe(true);
    const fonts = [...file.matchAll(/\/BaseFont \/[A-Z]{6}\+(Nunito|Vazirmatn|\w+)/g)];
    const families = [...new Set(fonts.map(([, family]) => family))].sort();
    const allowed = language === 'ar' ? ['Nunito', 'Vazirmatn'] : ['Nunito'];
    expect(families).toEqual(allowed);

    const pages = await pdfPages(pdf);
    expect(pages).toHaveLength(1);
    for (const page of pages) {
      expect(page.text).toContain('312-555-0142');
      expectApproved(page, `letter-${language}`);
      // The name stands in the window of the envelope, and nothing else does.
      const name = page.inkWithin(50, 81);
      expect(name.top).toBeGreaterThanOrEqual(63);
      expect(name.bottom).toBeLessThanOrEqual(80);
      expect(name.left).toBeGreaterThanOrEqual(22.3);
      expect(name.right).toBeLessThanOrEqual(111);
    }
  });

  test(`the fullest letter in ${language} takes one page`, async () => {
    const pages = await pdfPages(await printer.print(fullLetter(language)));
    expect(pages).toHaveLength(1);
    for (const page of pages) expectApproved(page, `letter-full-${language}`);
  });

  test(`a long letter in ${language} breaks where it may`, async () => {
    const pages = await pdfPages(await printer.print(longLetter(language)));
    expect(pages).toHaveLength(2);
    // The first page is filled, and no heading stands alone at its end.
    expect(pages[0]?.ink.bottom).toBeGreaterThan(230);
    const wording = wordingIn(language);
    const lastLine = pages[0]?.text.trim().split(/\r?\n/).at(-1);
    for (const heading of ['mornings', 'still-waiting', 'when-to-call'])
      expect(lastLine).not.toBe(wording.text(`letter.heading.${heading}`));
    // Danger and signature stay together, below lines that belong to them.
    expect(pages[1]?.text).toContain('911');
    expect(pages[1]?.text).toContain('Okafor');
    expect((pages[1]?.ink.bottom ?? 0) - (pages[1]?.ink.top ?? 0)).toBeGreaterThan(40);
  });
}
