import type { Locator, Page } from '@playwright/test';
import { FamilyPhone } from './support/family-phone';
import {
  inviteMother,
  planMornings,
  prepareFamily,
  toMorningQuestion,
} from './support/prepared-family';
import { ThisMorningScreen } from './support/this-morning-screen';
import { expect, test } from './support/walk';

/**
 * Shapes of a picture stand out from what is behind them: what is drawn has at least 3 to 1 (WCAG 2.2, success criterion
 * 1.4.11) against the background, though the device has replaced all colours by its own few.
 *
 * @returns the share of dots that stand out.
 */
async function shareThatStandsOut(eye: Page, seen: Locator): Promise<number> {
  const picture = (await seen.screenshot({ animations: 'disabled' })).toString('base64');
  return eye.evaluate(async (base64) => {
    const image = new Image();
    image.src = `data:image/png;base64,${base64}`;
    await image.decode();
    const canvas = new OffscreenCanvas(image.width, image.height);
    const context = canvas.getContext('2d');
    if (!context) throw new Error('There is nothing to draw on.');
    context.drawImage(image, 0, 0);
    const { data } = context.getImageData(0, 0, image.width, image.height);
    const light = (at: number): number => {
      const part = (value: number): number => {
        const share = value / 255;
        return share <= 0.04045 ? share / 12.92 : ((share + 0.055) / 1.055) ** 2.4;
      };
      const [red = 0, green = 0, blue = 0] = data.slice(at, at + 3);
      return 0.2126 * part(red) + 0.7152 * part(green) + 0.0722 * part(blue);
    };
    const behind = light(0);
    let count = 0;
    for (let at = 0; at < data.length; at += 4) {
      const [darker, lighter] = [light(at), behind].sort((a, b) => a - b) as [number, number];
      if ((lighter + 0.05) / (darker + 0.05) >= 3) count += 1;
    }
    return count / (data.length / 4);
  }, picture);
}

test('where the device chooses the colours, shapes still tell states apart', async ({
  house,
  people,
}) => {
  test.setTimeout(120_000);
  await house.awake();
  const family = await prepareFamily(house, {
    fullName: 'Mira Halvorsen',
    callMe: 'Mira',
    phone: '+13125550157',
  });
  const morning = await planMornings(house, family);
  const phone = new FamilyPhone(await people.phone({ forcedColors: 'active' }));
  const eye = await people.visitor();
  await phone.arrive(await inviteMother(house, family), family.bornOn);

  await test.step('suns that are next and that come later', async () => {
    const suns = phone.page.locator('ol.horizon svg.disc');
    await expect(suns).toHaveCount(3);
    const [next, later] = [suns.nth(0), suns.nth(1)];
    // Half a disc, filled; less than half, drawn as a line.
    const shares = [await shareThatStandsOut(eye, next), await shareThatStandsOut(eye, later)];
    expect(shares[0]).toBeGreaterThan(0.1);
    expect(shares[1]).toBeGreaterThan(0.002);
    expect(shares[0]).toBeGreaterThan(2 * (shares[1] ?? 0));
  });

  await test.step('the radio that is chosen', async () => {
    const radios = phone.page.getByRole('radio');
    const chosen = await shareThatStandsOut(eye, radios.and(phone.page.locator(':checked')));
    const other = await shareThatStandsOut(
      eye,
      radios.and(phone.page.locator(':not(:checked)')).first(),
    );
    expect(other).toBeGreaterThan(0.02);
    expect(chosen).toBeGreaterThan(other * 1.2);
  });

  await test.step('the bar of the hours fasted, with its ticks', async () => {
    await phone.page.goto(await toMorningQuestion(house, family, morning));
    await phone.answerNothing();
    await expect(phone.page.locator('.outcome')).toBeVisible();
    const rosa = await people.staff('rosa');
    await rosa.emulateMedia({ forcedColors: 'active' });
    const board = new ThisMorningScreen(rosa);
    await board.open();
    const bar = board.row(family.fullName).locator('td-hours-fasted-bar');
    await expect(bar).toBeVisible();
    const share = await shareThatStandsOut(eye, bar);
    expect(share).toBeGreaterThan(0.05);
    expect(share).toBeLessThan(0.95);
    for (const tick of ['.least', '.end']) {
      const line = await bar.locator(tick).evaluate((element) => {
        const { borderLeftWidth, borderRightWidth, backgroundColor } = getComputedStyle(element);
        const around = getComputedStyle(document.body).backgroundColor;
        const width = Number.parseFloat(borderLeftWidth) + Number.parseFloat(borderRightWidth);
        return { width, isFilled: backgroundColor !== around };
      });
      expect(line.width > 0 || line.isFilled, `${tick} can be seen`).toBe(true);
    }
  });
});
