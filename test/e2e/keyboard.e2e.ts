import type { Locator, Page } from '@playwright/test';
import { planMornings, prepareFamily, toMorningQuestion } from './support/prepared-family';
import { ThisMorningScreen } from './support/this-morning-screen';
import { expect, test } from './support/walk';

/** Goes on with the key until this has the focus; every stop on the way must be one that the eye can see. */
async function tabTo(page: Page, goal: Locator): Promise<void> {
  for (let stops = 0; stops < 80; stops += 1) {
    await page.keyboard.press('Tab');
    const focused = page.locator(':focus');
    if (await goal.evaluate((element) => element === document.activeElement)) {
      await expectRing(focused);
      return;
    }
  }
  throw new Error(`The key never reached ${String(goal)}`);
}

/** A ring of the theme around whatever has the focus; a radio or a check box may leave it to its label. */
async function expectRing(focused: Locator): Promise<void> {
  const hasRing = await focused.evaluate((element) =>
    [element, element.closest('label')].some((candidate) => {
      if (!candidate) return false;
      const { outlineStyle, outlineWidth } = getComputedStyle(candidate);
      return outlineStyle !== 'none' && Number.parseFloat(outlineWidth) >= 2;
    }),
  );
  expect(hasRing, 'a ring around the focus').toBe(true);
}

async function pressOn(page: Page, goal: Locator, key = 'Enter'): Promise<void> {
  await tabTo(page, goal);
  await page.keyboard.press(key);
}

test('the morning question and the door are run with the keyboard alone', async ({
  house,
  people,
}) => {
  test.setTimeout(180_000);
  await house.awake();
  const family = await prepareFamily(house, {
    fullName: 'Tavi Lindgren',
    callMe: 'Tavi',
    phone: '+13125550158',
  });
  const morning = await planMornings(house, family);
  const link = await toMorningQuestion(house, family, morning);

  await test.step('from the link to the outcome', async () => {
    const page = await people.visitor();
    await page.goto(link);
    const [year = '', month = '', day = ''] = family.bornOn.split('-');
    await tabTo(page, page.getByLabel('Month'));
    await page.keyboard.type(month);
    await tabTo(page, page.getByLabel('Day'));
    await page.keyboard.type(day);
    await tabTo(page, page.getByLabel('Year'));
    await page.keyboard.type(year);
    await pressOn(page, page.getByRole('button', { name: 'Open my visit' }));
    const heading = page.getByRole('heading', { level: 1 });
    await expect(heading).toHaveText(/eat or drink/);
    await expect(heading).toBeFocused();
    await pressOn(page, page.getByRole('button', { name: 'Nothing', exact: true }));
    await expect(heading).toHaveText(/Come\. Be at Door B/);
    await expect(heading).toBeFocused();
  });

  await test.step('from the arrival to the beginning', async () => {
    await house.moveTo(morning.arrivalAt);
    const page = await people.staff('rosa');
    const board = new ThisMorningScreen(page);
    await board.open();
    const row = board.row(family.fullName);
    await expect(row).toBeVisible();
    await pressOn(page, row.getByRole('button', { name: /^Arrived/ }));
    await expect(row.getByRole('button', { name: /^Door check/ })).toBeVisible();
    await pressOn(page, row.getByRole('button', { name: /^Door check/ }));
    const choose = async (label: string | RegExp): Promise<void> => {
      const radio = row.getByLabel(label, { exact: true });
      if (!(await radio.isChecked())) await pressOn(page, radio, 'Space');
    };
    await choose(/^Nothing since/);
    await choose('None');
    await choose('Well');
    await choose(/Mother of Tavi/);
    await pressOn(page, row.getByRole('button', { name: 'Keep this door check' }));
    await pressOn(page, row.getByRole('button', { name: /^Begin in Room|^Collect now/ }));
    await expect(row.getByRole('button', { name: /^Collected/ })).toBeVisible();
  });
});

test('whoever wants no motion sees none', async ({ people }) => {
  const page = await people.staff('rosa');
  await page.emulateMedia({ reducedMotion: 'reduce' });
  for (const address of ['/en/code', '/clinic/en/children/new', '/clinic/en/this-morning']) {
    await page.goto(address);
    await page.getByRole('heading', { level: 1 }).waitFor();
    expect(await moving(page), address).toEqual([]);
  }
});

/** The elements of a page that would move. */
function moving(page: Page): Promise<readonly string[]> {
  return page.evaluate(() =>
    [...document.querySelectorAll('*')].flatMap((element) => {
      const { animationName, animationDuration, transitionProperty, transitionDuration } =
        getComputedStyle(element);
      const isMoving =
        (animationName !== 'none' && Number.parseFloat(animationDuration) > 0) ||
        (transitionProperty !== 'none' &&
          transitionDuration.split(',').some((time) => Number.parseFloat(time) > 0));
      return isMoving ? [element.outerHTML.slice(0, 80)] : [];
    }),
  );
}
