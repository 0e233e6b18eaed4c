import { expectAccessible } from './support/accessible';
import { planMornings, prepareFamily, toMorningQuestion } from './support/prepared-family';
import { expect, test } from './support/walk';

const families = [
  { language: 'es', dir: 'ltr', fullName: 'Lucio Prado', callMe: 'Lucio', phone: '+13125550183' },
  { language: 'ar', dir: 'rtl', fullName: 'Rami Sabbagh', callMe: 'Rami', phone: '+13125550184' },
] as const;

for (const { dir, ...person } of families)
  test(`a family reads its night and answers at dawn in ${person.language}`, async ({
    house,
    people,
  }) => {
    await house.awake();
    const family = await prepareFamily(house, person);
    const morning = await planMornings(house, family);
    const link = await toMorningQuestion(house, family, morning);
    for (const { body } of await house.standIns.texts(family.phone)) {
      expect(body).not.toMatch(/tubercul|السل|Lucio|Rami/i);
      expect(body).not.toMatch(/Reply|clinic:|Come on/);
    }

    const page = await people.phone();
    await page.goto(link);
    await expect(page).toHaveURL(new RegExp(`/${person.language}/m/`));
    const html = page.locator('html');
    await expect(html).toHaveAttribute('lang', person.language);
    if (dir === 'rtl') await expect(html).toHaveAttribute('dir', 'rtl');
    const [year = '', month = '', day = ''] = family.bornOn.split('-');
    await page.locator('#born-day').fill(day);
    await page.locator('#born-month').fill(month);
    await page.locator('#born-year').fill(year);
    await page.locator('form button[type=submit]').click();

    // The question of the morning, in the family's words, with the child's name.
    const heading = page.getByRole('heading', { level: 1 });
    await expect(heading).toContainText(person.callMe);
    await expectAccessible(page, `the question in ${person.language}`);
    await page.locator('button.choice').first().click();
    await expect(page.locator('.outcome')).toBeVisible();
    await expect(page.locator('.outcome h1')).not.toHaveText(/[A-Za-z]{4,} (and|the|until|at) /);
    await expectAccessible(page, `the outcome in ${person.language}`);

    await page.goto(`/${person.language}/`);
    await expect(page.locator('td-night-path')).toBeVisible();
    await expectAccessible(page, `the night path in ${person.language}`);
    const wide = await page.evaluate(
      () => document.documentElement.scrollWidth - document.documentElement.clientWidth,
    );
    expect(wide).toBeLessThanOrEqual(0);
  });
