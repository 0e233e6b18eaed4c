import type { CallList } from '../../shared/contracts/calls';
import { addDays, instantOf } from '../../shared/domain/zone';
import { FamilyPhone } from './support/family-phone';
import { zone } from './support/house';
import { planMornings, prepareFamily } from './support/prepared-family';
import { linkIn } from './support/stand-ins';
import { expect, test } from './support/walk';

const noVisit = /No visit on \w+, .+\. Your child may eat now\./;

test('snow at four in the morning: one text, one call, and the page says that there is no visit', async ({
  house,
  people,
}) => {
  await house.awake();
  const early = await prepareFamily(house, {
    fullName: 'Ilse Marlow',
    callMe: 'Ilse',
    phone: '+13125550185',
  });
  const asleep = await prepareFamily(house, {
    fullName: 'Bram Okoro',
    callMe: 'Bram',
    phone: '+13125550186',
    agreesToEarlyTexts: false,
  });
  const { on } = await planMornings(house, early);
  expect((await planMornings(house, asleep)).on).toBe(on);

  await house.moveTo(instantOf({ on: addDays(on, -1), time: '19:00', zone }));
  const { body } = await house.standIns.text(early.phone, /\/m\//);
  await house.standIns.text(asleep.phone, /\/m\//);
  await house.moveTo(instantOf({ on, time: '04:00', zone }));
  const before = {
    early: (await house.standIns.texts(early.phone)).length,
    asleep: (await house.standIns.texts(asleep.phone)).length,
  };

  const page = await people.staff('rosa');
  await page.setViewportSize({ width: 390, height: 844 });
  await page.goto('/clinic/en/this-morning');
  await page.getByRole('link', { name: 'Close this morning' }).click();
  await expect(page.getByRole('heading', { level: 1, name: 'Close this morning' })).toBeVisible();
  const go = page.getByRole('button', { name: 'Close this morning …' });
  await go.click();
  await expect(page.getByText('Choose why the clinic stays closed.')).toBeVisible();
  await page.getByLabel('Snow or ice').check();
  await expect(page.getByText('Call: no yes to texts at this hour.').first()).toBeVisible();
  await go.click();
  await expect(page.getByText('This cannot be undone')).toBeVisible();
  const now = page.getByRole('button', { name: 'Close it and tell the families' });
  await now.dblclick();
  await expect(page.getByText(/^Closed .+ by .+: Snow or ice\.$/)).toBeVisible();

  await house.standIns.text(early.phone, noVisit, before.early);
  expect((await house.standIns.texts(early.phone)).slice(before.early)).toHaveLength(1);
  expect(await house.standIns.texts(asleep.phone)).toHaveLength(before.asleep);
  const { open } = await house.get<CallList>('/api/clinic/calls');
  const reasonsOf = (childId: number): string[] =>
    open.filter((call) => call.childId === childId).map(({ reason }) => reason);
  expect(reasonsOf(early.childId)).toEqual(['plan-anew']);
  expect(reasonsOf(asleep.childId).sort()).toEqual(['clinic-closed', 'plan-anew']);

  const phone = new FamilyPhone(await people.phone());
  await phone.arrive(linkIn(body, 'm'), early.bornOn);
  await phone.page.goto('/en/');
  await expect(phone.heading(noVisit)).toBeVisible();
});
