import type { Page } from '@playwright/test';
import type { LetterList } from '../../shared/contracts/letters';
import { addDays } from '../../shared/domain/zone';
import { expectAccessible, settled } from './support/accessible';
import { password, type Who } from './support/house';
import { LetterDesk } from './support/letter-desk';
import { say, sayLike } from './support/frame-words';
import { planMornings, prepareFamily } from './support/prepared-family';
import { linkIn } from './support/stand-ins';
import { ThisMorningScreen } from './support/this-morning-screen';
import { expectBigTargets } from './support/targets';
import { expect, signIn, test, toScreen, type People } from './support/walk';

const menu = (page: Page) => page.getByRole('navigation', { name: say(page, 'Screens') });

/** Every screen of this person's menu, whatever the language of the page. */
async function checkMenu(page: Page, check: (screen: string) => Promise<void>): Promise<void> {
  const words = await menu(page).getByRole('link').allInnerTexts();
  expect(words.length).toBeGreaterThan(0);
  for (const word of words) {
    const link = menu(page).getByRole('link', { name: word, exact: true });
    await link.click();
    await expect(link).toHaveAttribute('aria-current', 'page');
    await check(word);
  }
}

/** Somebody at work with fingers and gloves, in Spanish; both grow words and sizes. */
async function onTouchScreen(people: People, who: Who): Promise<Page> {
  const page = await people.phone({ viewport: { width: 1024, height: 768 } });
  await signIn(page, who, 'es');
  return page;
}

async function checkTouch(page: Page, screen: string): Promise<void> {
  await expectAccessible(page, `${screen}, in Spanish`, { byNight: false });
  await expectBigTargets(page, screen);
}

test('public pages and doors', async ({ people, clean }) => {
  // Asking who is here, and a link that is not known, are refused.
  clean.expecting(/status of (401|404)/);
  const page = await people.visitor();
  for (const address of [
    '/',
    '/sheet/en',
    '/sheet/es',
    '/sheet/ar',
    '/clinic/en/sign-in',
    '/clinic/en/join/not-a-real-token',
    '/clinic/es/sign-in',
    '/clinic/es/join/not-a-real-token',
  ]) {
    await page.goto(address);
    await expectAccessible(page, address);
  }
});

for (const who of ['rosa', 'okafor', 'milan', 'hanna'] satisfies Who[])
  test(`every screen in the menu of ${who}`, async ({ people }) => {
    test.setTimeout(150_000);
    const page = await people.staff(who);
    await checkMenu(page, (screen) => expectAccessible(page, screen));
  });

for (const who of ['okafor', 'milan'] satisfies Who[])
  test(`every screen in the menu of ${who}, in Spanish on a touch screen`, async ({ people }) => {
    test.setTimeout(150_000);
    const page = await onTouchScreen(people, who);
    await checkMenu(page, (screen) => checkTouch(page, screen));
  });

for (const { language, ...names } of [
  { language: 'en', fullName: 'Sanna Reyes', callMe: 'Sanna', phone: '+13125550145' },
  { language: 'es', fullName: 'Nadia Sorel', callMe: 'Nadia', phone: '+13125550156' },
] as const)
  test(`the screens behind the menu, in ${language}`, async ({ house, people }) => {
    test.setTimeout(150_000);
    await house.awake();
    const family = await prepareFamily(house, names);
    const isTouch = language === 'es';
    const okafor = isTouch ? await onTouchScreen(people, 'okafor') : await people.staff('okafor');
    const press = (word: string): Promise<void> =>
      okafor
        .getByRole('button', { name: say(okafor, word) })
        .first()
        .click();
    const check = async (address: string, prepare?: () => Promise<void>): Promise<void> => {
      await okafor.goto(`/clinic/${language}/${address}`);
      await settled(okafor);
      await prepare?.();
      await (isTouch ? checkTouch(okafor, address) : expectAccessible(okafor, address));
    };
    await check('children/new', async () => {
      await press('Keep this child');
      // A field with a fault has colours of its own under the pointer.
      await okafor.getByLabel(say(okafor, 'Full name')).hover();
    });
    await check(`children/${family.childId}`);
    await check(`children/${family.childId}/family-members/new`);
    await check(`orders/new?child=${family.childId}`, () => press('Keep this order'));
    await check(`orders/${family.orderId}`);
    await check(`series/plan?orders=${family.orderId}`, async () => {
      await okafor.getByRole('radio').first().check();
      await expect(okafor.getByRole('heading', { name: family.fullName })).toBeVisible();
    });
    await check('results', () => press('Enter a result'));
    const { letters } = await house.get<LetterList>('/api/clinic/letters');
    await check(`letters/${letters[0]?.seriesId}`, () => press('Sign and release'));
    await check('nowhere');

    const { arrivalAt } = await planMornings(house, family);
    await house.moveTo(arrivalAt);
    await check('this-morning', async () => {
      const row = new ThisMorningScreen(okafor).row(family.fullName);
      const act = (word: string) =>
        row.getByRole('button', { name: sayLike(okafor, word) }).click();
      await act('Arrived');
      await act('Door check');
      await act('Keep this door check');
      await expect(row.locator('.field-says').filter({ hasText: /./ }).first()).toBeVisible();
    });
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
