import type { Page } from '@playwright/test';
import { expect } from './walk';

/** What a finger has to hit, in CSS pixels: for wet hands at dawn, and for gloves. */
const least = 48;

/**
 * Fails with everything on the page that can be pressed and is smaller than a finger. A link inside a sentence may be as
 * low as its line (WCAG 2.2, success criterion 2.5.8, exception "inline"); a radio or a check box is as large as its label.
 */
export async function expectBigTargets(page: Page, screen: string): Promise<void> {
  const small = await page.evaluate((size) => {
    const pressed =
      'a[href], button, input:not([type=hidden]), select, textarea, summary, [role=button], [role=combobox]';
    const isShown = (element: Element): boolean =>
      element.checkVisibility({ opacityProperty: true, visibilityProperty: true }) &&
      element.closest('.unseen, .skip, .cdk-visually-hidden, [aria-hidden=true]') === null;
    const isInSentence = (element: Element): boolean =>
      getComputedStyle(element).display === 'inline' &&
      [...(element.closest('p, li, span, td, dd, td-pretend-text')?.childNodes ?? [])].some(
        (node) => !node.contains(element) && (node.textContent ?? '').trim() !== '',
      );
    /** Where a press counts: the element, its label, or the field that Material draws around it. */
    const areas = (element: Element): DOMRect[] =>
      [
        element,
        element.closest('label'),
        ...((element as HTMLInputElement).labels ?? []),
        element.closest('mat-form-field, mat-checkbox, mat-radio-button'),
      ].flatMap((area) => (area ? [area.getBoundingClientRect()] : []));
    return [...document.querySelectorAll(pressed)]
      .filter((element) => isShown(element) && !isInSentence(element))
      .flatMap((element) => {
        const boxes = areas(element);
        const [width, height] = [
          Math.max(...boxes.map((box) => box.width)),
          Math.max(...boxes.map((box) => box.height)),
        ];
        const isBig = Math.round(width) >= size && Math.round(height) >= size;
        const what = (element.textContent ?? '').trim() || element.outerHTML.slice(0, 90);
        return isBig ? [] : [`${width.toFixed(0)} x ${height.toFixed(0)}: ${what.slice(0, 90)}`];
      });
  }, least);
  expect.soft(small, `${screen}: too small for a finger`).toEqual([]);
}
