import type { Page } from '@playwright/test';
import type { ThisMorning } from '../../shared/contracts/this-morning';
import { FamilyPhone } from './support/family-phone';
import type { House } from './support/house';
import {
  planMornings,
  prepareFamily,
  toMorningQuestion,
  type PreparedFamily,
} from './support/prepared-family';
import { expect, test } from './support/walk';

const disconnected = /ERR_INTERNET_DISCONNECTED|ERR_FAILED/;
const saved = 'Saved on this phone. We do not have it yet.';
const come = /^Come\. Be at Door B/;

/** A family whose question is open, and the phone on which its link was opened. */
async function atTheQuestion(
  house: House,
  page: Page,
  names: { fullName: string; callMe: string; phone: string },
): Promise<{ family: PreparedFamily; phone: FamilyPhone }> {
  await house.awake();
  const family = await prepareFamily(house, names);
  const link = await toMorningQuestion(house, family, await planMornings(house, family));
  const phone = new FamilyPhone(page);
  await phone.arrive(link, family.bornOn);
  await expect(phone.heading(/eat or drink/)).toBeVisible();
  return { family, phone };
}

/** How many answers of this family the clinic has. */
async function answersOf(house: House, { childId }: PreparedFamily): Promise<number> {
  const { rows } = await house.get<ThisMorning>('/api/clinic/this-morning');
  return rows.find((row) => row.childId === childId)?.said.length ?? 0;
}

test('an answer without signal is saved, and goes by itself, once, when signal returns', async ({
  house,
  people,
  clean,
}) => {
  clean.expecting(disconnected);
  const page = await people.phone();
  const { family, phone } = await atTheQuestion(house, page, {
    fullName: 'Tavi Moss',
    callMe: 'Tavi',
    phone: '+13125550193',
  });
  const taken: string[] = [];
  page.on('response', (response) => {
    if (response.url().endsWith('/fasting-checks') && response.ok()) taken.push(response.url());
  });

  await page.context().setOffline(true);
  await phone.answerNothing();
  await expect(phone.heading(saved)).toBeVisible();
  await expect(page.getByRole('main')).not.toContainText(/\bCome\b/);
  expect(await answersOf(house, family)).toBe(0);

  await page.context().setOffline(false);
  await expect(phone.heading(come)).toBeVisible();
  expect(await answersOf(house, family)).toBe(1);
  expect(taken).toHaveLength(1);
});

test('an answer that was kept when the page was closed goes at the next visit', async ({
  house,
  people,
  clean,
}) => {
  clean.expecting(disconnected);
  const page = await people.phone();
  const { family, phone } = await atTheQuestion(house, page, {
    fullName: 'Ilse Brandt',
    callMe: 'Ilse',
    phone: '+13125550194',
  });
  const context = page.context();
  await context.setOffline(true);
  await phone.answerNothing();
  await expect(phone.heading(saved)).toBeVisible();
  await page.close();
  await context.setOffline(false);

  const later = new FamilyPhone(await context.newPage());
  await later.page.goto('/en/morning');
  await expect(later.heading(come)).toBeVisible();
  expect(await answersOf(house, family)).toBe(1);
});

test('an answer that arrived, but whose thanks got lost, is not taken twice', async ({
  house,
  people,
  clean,
}) => {
  clean.expecting(disconnected);
  // Without the worker, so that the answer on its way back can be caught.
  const page = await people.phone({ serviceWorkers: 'block' });
  const { family, phone } = await atTheQuestion(house, page, {
    fullName: 'Bram Oduya',
    callMe: 'Bram',
    phone: '+13125550195',
  });
  let tries = 0;
  await page.route('**/fasting-checks', async (route) => {
    tries += 1;
    const answer = await route.fetch();
    if (tries === 1) await route.abort();
    else await route.fulfill({ response: answer });
  });
  await phone.answerNothing();
  await expect(phone.heading(saved)).toBeVisible();
  expect(await answersOf(house, family)).toBe(1);
  await page.getByRole('button', { name: 'Send it again' }).click();
  await expect(phone.heading(come)).toBeVisible();
  expect(tries).toBe(2);
  expect(await answersOf(house, family)).toBe(1);
});
