import type { Page } from '@playwright/test';
import type { LetterList } from '../../shared/contracts/letters';
import { addDays } from '../../shared/domain/zone';
import { expectAccessible, settled } from './support/accessible';
import { FamilyPhone } from './support/family-phone';
import { password, type Who } from './support/house';
import { LetterDesk } from './support/letter-desk';
import {
  inviteMother,
  planMornings,
  prepareFamily,
  toMorningQuestion,
} from './support/prepared-family';
import { linkIn } from './support/stand-ins';
import { expect, test, toScreen } from './support/walk';

const menu = (page: Page) => page.getByRole('navigation', { name: 'Screens' });

/** Every screen of this person's menu. */
async function checkMenu(page: Page): Promise<void> {
  const words = await menu(page).getByRole('link').allInnerTexts();
  expect(words.length).toBeGreaterThan(0);
  for (const word of words) {
    await toScreen(page, word);
    await expect(menu(page).getByRole('link', { name: word, exact: true })).toHaveAttribute(
      'aria-current',
      'page',
    );
    await expectAccessible(page, word);
  }
}

test('public pages and doors', async ({ people, clean }) => {
  // Asking who is here, and a link that is not known, are refused.
  clean.expecting(/status of (401|404)/);
  const page = await people.visitor();
  for (const address of [
    '/',
    '/sheet/en',
    '/clinic/en/sign-in',
    '/clinic/en/join/not-a-real-token',
  ]) {
    await page.goto(address);
    await expectAccessible(page, address);
  }
  for (const address of ['/en/code', '/en/i/not-a-link-that-we-know', '/en/nowhere']) {
    await page.goto(address);
    await expectAccessible(page, address);
  }
});

for (const who of ['rosa', 'okafor', 'milan', 'hanna'] satisfies Who[])
  test(`every screen in the menu of ${who}`, async ({ people }) => {
    test.setTimeout(150_000);
    await checkMenu(await people.staff(who));
  });

test('the screens behind the menu', async ({ house, people }) => {
  test.setTimeout(150_000);
  await house.awake();
  const family = await prepareFamily(house, {
    fullName: 'Sanna Reyes',
    callMe: 'Sanna',
    phone: '+13125550145',
  });
  const okafor = await people.staff('okafor');
  const check = async (address: string, prepare?: () => Promise<void>): Promise<void> => {
    await okafor.goto(`/clinic/en/${address}`);
    await settled(okafor);
    await prepare?.();
    await expectAccessible(okafor, address);
  };
  await check('children/new', async () => {
    await okafor.getByRole('button', { name: 'Keep this child' }).click();
    // A field with a fault has colours of its own under the pointer.
    await okafor.getByLabel('Full name').hover();
  });
  await check(`children/${family.childId}`);
  await check(`children/${family.childId}/family-members/new`);
  await check(`orders/new?child=${family.childId}`, () =>
    okafor.getByRole('button', { name: 'Keep this order' }).click(),
  );
  await check(`orders/${family.orderId}`);
  await check(`series/plan?orders=${family.orderId}`, async () => {
    await okafor.getByRole('radio').first().check();
    await expect(okafor.getByRole('heading', { name: family.fullName })).toBeVisible();
  });
  await check('results', () =>
    okafor.getByRole('button', { name: 'Enter a result' }).first().click(),
  );
  const { letters } = await house.get<LetterList>('/api/clinic/letters');
  await check(`letters/${letters[0]?.seriesId}`, () =>
    okafor.getByRole('button', { name: 'Sign and release' }).click(),
  );
  await check('nowhere');
});

test('the family’s pages, the night before and in the morning', async ({
  house,
  people,
  clean,
}) => {
  test.setTimeout(150_000);
  clean.expecting(/status of 422/);
  await house.awake();
  const family = await prepareFamily(house, {
    fullName: 'Emre Solberg',
    callMe: 'Emre',
    phone: '+13125550189',
  });
  const morning = await planMornings(house, family);
  const invitation = await inviteMother(house, family);
  const page = await people.phone();
  const mother = new FamilyPhone(page);

  await page.goto(invitation);
  await expectAccessible(page, 'arrive');
  await mother.typeBirthDate(addDays(family.bornOn, 1));
  await page.getByRole('button', { name: 'Open my visit' }).click();
  await expect(page.getByText(/You can try 4 more times/)).toBeVisible();
  await expectAccessible(page, 'arrive, wrong birth date');
  await mother.arrive(invitation, family.bornOn);
  await expectAccessible(page, 'next morning');
  await page.goto('/en/calendar');
  await expectAccessible(page, 'calendar');
  await page.goto('/en/interpreter');
  await expectAccessible(page, 'interpreter');
  await page.goto('/en/morning');
  await expectAccessible(page, 'question, not open yet');

  await page.goto(await toMorningQuestion(house, family, morning));
  await expect(mother.heading(/eat or drink/)).toBeVisible();
  await expectAccessible(page, 'question');
  await page.getByRole('button', { name: 'Milk or food' }).click();
  await expectAccessible(page, 'when');
  for (const step of ['other', 'ill', 'late', 'not-coming']) {
    await page.goto(`/en/morning?step=${step}`);
    await expectAccessible(page, `question, ${step}`);
  }
  await page.goto('/en/morning');
  await mother.answerNothing();
  await expect(mother.heading(/^Come/)).toBeVisible();
  await expectAccessible(page, 'outcome');
  await page.goto('/en/');
  await expectAccessible(page, 'next morning, in the morning');

  const kofi = await people.staff('kofi');
  const row = kofi.locator('ol.rows > li').filter({ hasText: family.fullName });
  await row.getByRole('button', { name: /^Arrived/ }).click();
  await row.getByRole('button', { name: /^Door check/ }).click();
  await row.getByRole('button', { name: 'Keep this door check' }).click();
  await expectAccessible(kofi, 'this morning, door check');
});

test('the family’s letters', async ({ house, people, clean }) => {
  // Nobody is signed in when the link in the text is opened.
  clean.expecting(/status of 401.*\/api\/family\/session/);
  await house.awake();
  // A child of the demo clinic whose cultures still run: interim news.
  const name = 'Ayaan Warsame';
  const phone = '+13125550171';
  const okafor = await people.staff('okafor');
  await toScreen(okafor, 'Letters');
  const desk = new LetterDesk(okafor);
  await desk.open(name);
  await desk.decide(addDays(await house.today(), 10));
  await okafor.getByLabel('Your password, at signing').fill(password);
  await desk.sign().click();
  await expect(okafor.getByText('Signed and released.')).toBeVisible();

  const { body } = await house.standIns.text(phone, /A letter is ready/);
  const page = await people.phone();
  await page.goto(linkIn(body, ''));
  await expectAccessible(page, 'code');
  await page.getByLabel('Your telephone number or e-mail').fill(phone);
  await page.getByRole('button', { name: 'Send me a code' }).click();
  const code = await house.standIns.text(phone, /Your code is \d{6}/);
  await expectAccessible(page, 'code, sent');
  await page.getByLabel('Code with 6 digits').fill(/\d{6}/.exec(code.body)?.[0] ?? '');
  await page.getByRole('button', { name: 'Open', exact: true }).click();
  await expect(page).not.toHaveURL(/code/);
  await page.goto('/en/letters');
  await expect(page.getByRole('link', { name: /New/ })).toBeVisible();
  await expectAccessible(page, 'letters');
  await page.getByRole('link', { name: /New/ }).click();
  await expect(page.getByRole('article')).toContainText('can still have tuberculosis');
  await expectAccessible(page, 'letter');
});
