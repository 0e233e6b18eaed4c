import type { Page } from '@playwright/test';
import type { OutcomeKind } from '../../shared/contracts/family-morning';
import type { LanguageId } from '../../shared/languages/languages';
import { addDays } from '../../shared/domain/zone';
import { altered } from '../screens/support/answers';
import { expectAccessible } from './support/accessible';
import { FamilyPhone } from './support/family-phone';
import { say } from './support/frame-words';
import { expectOwnPage } from './support/own-language';
import {
  inviteMother,
  planMornings,
  prepareFamily,
  toMorningQuestion,
} from './support/prepared-family';
import { expectBigTargets } from './support/targets';
import { expect, test } from './support/walk';

const families: readonly {
  language: LanguageId;
  fullName: string;
  callMe: string;
  phone: string;
}[] = [
  { language: 'en', fullName: 'Emre Solberg', callMe: 'Emre', phone: '+13125550189' },
  { language: 'es', fullName: 'Lucio Prado', callMe: 'Lucio', phone: '+13125550183' },
  { language: 'ar', fullName: 'Rami Sabbagh', callMe: 'Rami', phone: '+13125550184' },
];

/** One of each look that the answer of the clinic can have. */
const looks: readonly OutcomeKind[] = [
  'come-and-wait',
  'call-us',
  'feed-now-and-call',
  'emergency',
  'not-coming',
];

for (const { language, ...names } of families)
  test(`the pages of a family that reads ${language}`, async ({ house, people, clean }) => {
    test.setTimeout(180_000);
    // Refused on purpose: a link that is not known, a wrong birth date, nobody signed in.
    clean.expecting(/status of (401|404|422)/, /Service Worker registration blocked/);
    await house.awake();
    const family = await prepareFamily(house, { ...names, language });
    const morning = await planMornings(house, family);
    const invitation = await inviteMother(house, family);
    // Without the worker, so that answers of the house can be changed on their way.
    const page = await people.phone({ serviceWorkers: 'block' });
    const mother = new FamilyPhone(page);
    const clinicNames = [
      names.callMe,
      'Alder Street',
      'Children’s Clinic',
      'Door B is on the garden side, under the yellow lamp. Ring once.',
    ];
    const check = async (screen: string): Promise<void> => {
      const named = `${screen} in ${language}`;
      await expectAccessible(page, named, { byNight: language === 'en' });
      await expectBigTargets(page, named);
      if (language !== 'en') await expectOwnPage(page.locator('body'), language, clinicNames);
      expect.soft(await overflow(page), `${named}: wider than the phone`).toBeLessThanOrEqual(0);
    };
    const open = async (path: string, screen = path): Promise<void> => {
      await page.goto(`/${language}/${path}`);
      await check(screen);
    };

    await test.step('before anybody is known', async () => {
      await open('code');
      await open('nowhere');
      await open('i/not-a-link-that-we-know-of');
      const states = '**/api/family/links/describe';
      for (const state of ['used', 'expired', 'locked']) {
        await altered(page.context(), states, (body) => ({ ...body, state }));
        await page.goto(invitation);
        await expect(page.locator('h1')).toBeVisible();
        await check(`arrive, ${state}`);
        await page.context().unrouteAll();
      }
      await page.goto(invitation);
      await check('arrive');
      await page.getByRole('button', { name: say(page, 'Open my visit') }).click();
      await expect(page.locator('.wrong')).toBeVisible();
      await check('arrive, nothing typed');
      await mother.typeBirthDate(addDays(family.bornOn, 1));
      await page.getByRole('button', { name: say(page, 'Open my visit') }).click();
      await expect(
        page.getByText(
          say(page, 'This is not the birth date we have. Look at the day and the month.'),
        ),
      ).toBeVisible();
      await check('arrive, wrong birth date');
    });

    await test.step('the night before', async () => {
      await mother.arrive(invitation, family.bornOn);
      await expect(page.locator('td-night-path')).toBeVisible();
      await check('next morning');
      await open('calendar');
      await open('interpreter');
      await open('letters', 'letters, code');
      await open('morning', 'question, not open yet');
    });

    await test.step('the question and every answer', async () => {
      await page.goto(await toMorningQuestion(house, family, morning));
      await expect(page.locator('button.choice').first()).toBeVisible();
      await check('question');
      await open('morning?step=w1', 'question, when');
      for (const step of ['other', 'ill', 'late', 'not-coming'])
        await open(`morning?step=${step}`, `question, ${step}`);
      await page.goto(`/${language}/morning`);
      await mother.answerNothing(language);
      await expect(page.locator('.outcome-come')).toBeVisible();
      await check('outcome, come');
      for (const kind of looks) {
        await altered(page.context(), '**/api/family/morning-question', (body) => ({
          ...body,
          outcome: { ...(body['outcome'] as object), kind },
        }));
        await open('morning', `outcome, ${kind}`);
        await expect(page.locator('.outcome')).toBeVisible();
        await page.context().unrouteAll();
      }
      await open('', 'next morning, in the morning');
    });
  });

function overflow(page: Page): Promise<number> {
  return page.evaluate(
    () => document.documentElement.scrollWidth - document.documentElement.clientWidth,
  );
}
