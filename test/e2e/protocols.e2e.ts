import { addDays } from '../../shared/domain/zone';
import { expectAccessible, settled } from './support/accessible';
import { password } from './support/house';
import { expect, test } from './support/walk';

/**
 * A clinician changes the clinic's hours: draft, problem, mended, looked at as a family reads it, signed. The version
 * begins long after every other walk, so that no other family's night changes.
 */
test('a fasting protocol from the draft to the signature', async ({ house, people, clean }) => {
  test.setTimeout(120_000);
  const page = await people.staff('okafor');
  const from = addDays(await house.today(), 900);

  await test.step('begin a draft from what is in force', async () => {
    await page.goto('/clinic/en/set-up/fasting-protocol');
    await settled(page);
    await expect(page.getByText('In force', { exact: true })).toBeVisible();
    await expectAccessible(page, 'fasting protocols');
    await page.getByRole('button', { name: 'Begin a new draft' }).click();
    await expect(
      page.getByRole('heading', { name: 'Fasting protocol, version 2', level: 1 }),
    ).toBeVisible();
  });

  const least = page.getByLabel('1 year, Everything by mouth, least hours');
  const longest = page.getByLabel('1 year, Longest fast, hours');
  await test.step('a number that cannot be is told beside its field', async () => {
    await expect(page.getByText('Published: 2 to 10 hours').first()).toBeVisible();
    await page.getByLabel('Title of this version').fill('Hours of our clinic');
    await page.getByLabel('In force from').fill(from);
    await least.fill('12');
    await expect(longest).toHaveAttribute('aria-invalid', 'true');
    await expect(page.getByText('Must be longer than 12 hours.')).toBeVisible();
    await expect(page.getByText('Not saved yet')).toBeVisible();
    await expectAccessible(page, 'a draft with a problem');
  });

  await test.step('mended, and read as a family would', async () => {
    await least.fill('8');
    await expect(longest).not.toHaveAttribute('aria-invalid');
    await page.getByLabel('Child', { exact: true }).selectOption({ label: '1 year, family food' });
    await page.getByLabel('Arrival', { exact: true }).fill('07:00');
    await expect(page.getByText('Noor after 11:00 at night')).toBeVisible();
    await page.getByRole('combobox', { name: 'Language' }).selectOption('es');
    await expect(page.locator('.path')).toHaveAttribute('lang', 'es');
    await expect(page.locator('.path')).toContainText('Noor');
  });

  await test.step('what differs is told before it is signed', async () => {
    await page.getByRole('button', { name: 'Save and look at what changes' }).click();
    await expect(page.getByText('Saved', { exact: true })).toBeVisible();
    await expect(page.getByRole('heading', { name: /^Compared with version 1/ })).toBeFocused();
    const row = page.getByRole('row', { name: /^1 year/ }).filter({ hasText: '6 h; at most 12 h' });
    await expect(row).toContainText('8 h; at most 12 h');
    await expect(page.getByText('No morning is planned from that day on.')).toBeVisible();
    await expectAccessible(page, 'before the signature');
  });

  await test.step('a wrong password signs nothing, the right one does', async () => {
    clean.expecting(/status of 422/);
    const sign = page.getByRole('button', { name: 'Sign this version' });
    await page.getByLabel('Your password, at signing').fill('not mine');
    await sign.click();
    await expect(page.getByText('This is not your password.').first()).toBeVisible();
    await page.getByLabel('Your password, at signing').fill(password);
    await sign.click();
    await expect(page.getByText('Signed, not in force yet.')).toBeVisible();
    await expect(page.getByLabel('Title of this version')).toBeDisabled();
    await expect(page.getByRole('button', { name: 'Save the draft' })).toHaveCount(0);
  });

  await test.step('the front desk does not come here', async () => {
    const desk = await people.staff('hanna');
    await desk.goto('/clinic/en/set-up/fasting-protocol');
    await expect(desk).not.toHaveURL(/set-up/);
    await expect(desk.getByRole('heading', { level: 1 })).not.toHaveText('Fasting protocol');
  });
});
