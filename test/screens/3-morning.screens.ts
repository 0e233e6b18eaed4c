import type { Page } from '@playwright/test';
import { House } from '../e2e/support/house';
import { ThisMorningScreen } from '../e2e/support/this-morning-screen';
import { test } from '../e2e/support/walk';
import { Album } from './support/album';
import { inHand, languagesOf, zoomed } from './support/views';

const clinic = languagesOf('clinic');
const minute = 60_000;

/** Presses the first thing to do of the row at this place; works in every language. */
const press = (page: Page, place: number): Promise<void> =>
  page.locator('ol.rows > li').nth(place).locator('.acts button').first().click();

test('this morning', async ({ browser, people }) => {
  const house = await House.open();
  const rosa = await people.staff('rosa');
  const board = new ThisMorningScreen(rosa);
  for (const [phone, body] of [
    ['+13125550121', '1'],
    ['+13125550132', '2'],
  ])
    await house.post('/api/clinic/rehearsal/replies', { phone, body });
  await house.moveTo((await house.now()) + 90 * minute);
  await board.open();
  await Album.fill(
    browser,
    { group: 'clinic-morning', languages: clinic, cookies: await rosa.context().cookies() },
    async (album) => {
      const address = (language: string): string => `/clinic/${language}/this-morning`;
      await album.shoot({ name: 'nobody-here-yet', address });
      const rows = rosa.locator('ol.rows > li');
      await rows.first().waitFor();
      const act = async (place: number, name: RegExp): Promise<void> => {
        await rows.nth(place).getByRole('button', { name }).first().click();
      };
      await act(0, /^Arrived/);
      await album.shoot({ name: 'door-check-open', address, prepare: (page) => press(page, 0) });
      await album.shoot({
        name: 'door-check-nothing-typed',
        address,
        prepare: async (page) => {
          await press(page, 0);
          await page.locator('td-door-check-form button[type="submit"]').click();
        },
      });
      await act(0, /^Door check/);
      const form = rows.first();
      await form.getByLabel(/^Nothing since/).check();
      await form.getByLabel('None', { exact: true }).check();
      await form.getByLabel('Well', { exact: true }).check();
      await form.getByLabel(/Parwin/).check();
      await form.getByRole('button', { name: 'Keep this door check' }).click();
      await act(1, /^Arrived/);
      await album.shoot({ name: 'one-checked', address });
      await album.shoot({ name: 'forced-colors', address, hasForcedColors: true });
      await act(0, /^Begin in Room|^Collect now/);
      await album.shoot({ name: 'collecting', address, prepare: (page) => press(page, 0) });
      await act(0, /^Collected/);
      await form.getByLabel('Volume, mL').fill('6.5');
      await form.getByRole('button', { name: 'Keep: collected' }).click();
      await album.shoot({ name: 'collected', address });
      await album.shoot({ name: 'text-200', address, textSize: 2, views: inHand });
      await album.shoot({ name: 'zoom-400', address, views: zoomed });
      await album.shoot({ name: 'print', address, media: 'print' });
      const calls = (language: string): string => `/clinic/${language}/calls`;
      await album.shoot({ name: 'calls', address: calls });
      await album.shoot({ name: 'calls-forced-colors', address: calls, hasForcedColors: true });
      await album.shoot({
        name: 'calls-text-200',
        address: calls,
        textSize: 2,
        views: inHand,
      });
      await album.shoot({ name: 'calls-print', address: calls, media: 'print' });
    },
  );
  await house.close();
});
