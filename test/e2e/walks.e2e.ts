import type { ClinicLanguage } from '../../shared/languages/clinic-languages';
import type { LanguageId } from '../../shared/languages/languages';
import { addDays, instantOf } from '../../shared/domain/zone';
import { shippedWords } from '../support/words';
import { FamilyPhone } from './support/family-phone';
import { say } from './support/frame-words';
import { zone } from './support/house';
import { planFirstRun, type Adult, type PlannedMorning } from './support/new-child';
import { expectOwnPage, expectOwnWords } from './support/own-language';
import { expectNeutral, linkIn } from './support/stand-ins';
import { ThisMorningScreen } from './support/this-morning-screen';
import { expect, test, toScreen } from './support/walk';
import {
  addWithOrder,
  bringResults,
  collect,
  releaseLetter,
  signAndConsent,
} from './support/whole-chain';
import { wordingLike } from './support/wording-like';

interface Walk {
  readonly language: LanguageId;
  /** In which the clinic works. */
  readonly clinic: ClinicLanguage;
  readonly mother: Adult;
  readonly phone: string;
  readonly child: {
    readonly fullName: string;
    readonly callMe: string;
    readonly familyLabel: string;
  };
  readonly series: string;
}

const walks: readonly Walk[] = [
  {
    language: 'es',
    clinic: 'es',
    mother: {
      fullName: 'Lucía Ocampo',
      relationship: 'madre',
      phone: '312 555 0154',
      email: 'lucia.ocampo@example.org',
      isHelper: false,
      reads: 'es',
    },
    phone: '+13125550154',
    child: { fullName: 'Mateo Ocampo', callMe: 'Mateo', familyLabel: 'Mi lucero' },
    series: '54',
  },
  {
    language: 'ar',
    clinic: 'en',
    mother: {
      fullName: 'سلمى الخطيب',
      relationship: 'mother',
      phone: '312 555 0155',
      email: null,
      isHelper: false,
      reads: 'ar',
    },
    phone: '+13125550155',
    child: { fullName: 'Yazan Khatib', callMe: 'يزن', familyLabel: 'نجمتنا' },
    series: '55',
  },
];

/** What the demo clinic calls itself and its people, and how it describes its door, whoever reads it. */
const clinicNames = [
  'Alder Street',
  'Children’s Clinic',
  'Dr. Ines Okafor',
  'Door B is on the garden side, under the yellow lamp. Ring once.',
];

for (const { language, clinic, mother, phone: number, child: names, series } of walks)
  test(`a family that reads ${language} goes through the whole chain`, async ({
    house,
    people,
  }) => {
    test.setTimeout(240_000);
    const { standIns } = house;
    await house.awake();
    const words = shippedWords(language);
    const child = { ...names, bornOn: addDays(await house.today(), -800), adults: [mother] };
    const secrets = [child.fullName, child.callMe, child.bornOn, mother.fullName];
    const ownNames = [...clinicNames, child.callMe, child.familyLabel];
    const rosa = await people.staff('rosa', clinic);
    const okafor = await people.staff('okafor', clinic);
    const desks = { house, rosa, okafor };
    const phone = new FamilyPhone(await people.phone());
    const main = phone.page.locator('body');
    /** A text that fits a wording of the language: neutral, and in no other language. */
    const text = async (after: number, ...keys: string[]): Promise<string> => {
      const { body } = await standIns.text(number, wordingLike(language, ...keys), after);
      expectNeutral(body, secrets);
      expectOwnWords(body, language, ownNames);
      return body;
    };
    const textsSoFar = async (): Promise<number> => (await standIns.texts(number)).length;
    let mornings: readonly PlannedMorning[] = [];

    await test.step('order, signature, consent, three mornings', async () => {
      await addWithOrder(desks, child);
      await signAndConsent(desks, child);
      mornings = await planFirstRun(rosa, child, [mother, mother, mother]);
      expect(mornings).toHaveLength(3);
      await rosa.getByRole('link', { name: say(rosa, 'Open the record') }).click();
      await expect(rosa.locator('ol.mornings > li')).toHaveCount(3);
    });

    await test.step('the invitation opens with a birth date, and shows the night', async () => {
      await rosa.getByRole('button', { name: say(rosa, 'Send the invitation') }).click();
      await expect(rosa.getByText(say(rosa, 'The invitation is on its way.'))).toBeVisible();
      const link = linkIn(await text(0, 'message.invitation.text'), 'i');
      await phone.page.goto(link);
      await expect(phone.page).toHaveURL(new RegExp(`/${language}/i/`));
      await phone.arrive(link, child.bornOn);
      await expect(phone.page.locator('td-night-path')).toBeVisible();
      await expectOwnPage(main, language, ownNames);
    });

    if (mother.email !== null) {
      const mails = await standIns.mailsLike(
        mother.email,
        wordingLike(language, 'message.calendar.subject'),
        3,
      );
      for (const { subject, body } of mails) {
        expectNeutral(`${subject} ${body}`, secrets);
        expectOwnWords(`${subject} ${body}`, language, ownNames);
      }
    }

    const board = new ThisMorningScreen(await rosa.context().newPage());
    await board.open(clinic);
    for (const [index, morning] of mornings.entries())
      await test.step(`morning ${index + 1}`, async () => {
        const before = await textsSoFar();
        await house.moveTo(instantOf({ on: addDays(morning.on, -1), time: '19:00', zone }));
        const evening = await text(before, 'message.evening.text', 'message.evening.short');
        expect(evening).toContain(child.familyLabel);
        const arrival = instantOf({ on: morning.on, time: morning.arrivalTime, zone });
        await house.moveTo(arrival - 85 * 60_000);
        await phone.page.goto(linkIn(await text(before, 'message.morning.text'), 'm'));
        await expectOwnPage(main, language, ownNames);
        await phone.answerNothing(language);
        await expect(phone.heading(wordingLike(language, 'outcome.come.heading'))).toBeVisible();
        await expectOwnPage(main, language, ownNames);
        await collect(desks, board, {
          child,
          morning,
          number: index + 1,
          broughtBy: mother.fullName,
          series,
        });
        await board.expectNeverReloaded();
      });

    const before = await test.step('results, and the letter signed and released', async () => {
      await bringResults(desks, child);
      const count = await textsSoFar();
      await releaseLetter(desks, child);
      return count;
    });

    await test.step('the family reads the letter with a fresh code', async () => {
      await phone.page.goto(linkIn(await text(before, 'message.letter-waits.text'), ''));
      const code = await phone.typeFreshCode(standIns, number, language);
      expectNeutral(code, secrets);
      expectOwnWords(code, language, ownNames);
      const letter = await phone.openNewLetter();
      await expectOwnPage(letter, language, ownNames);
      const notRuledOut = words['letter.sentence.does-not-rule-out'] ?? '';
      await expect(letter).toContainText(notRuledOut.replace('{name}', child.callMe));
      const pdf = (await phone.fetchPdf()).toString('latin1');
      expect(pdf.slice(0, 5)).toBe('%PDF-');
      expect(pdf.includes(`/Lang (${language})`), 'the file says its language').toBe(true);
      await toScreen(okafor, 'Letters');
      const row = okafor.locator('li.letter').filter({ hasText: child.fullName });
      await expect(row.getByText(say(okafor, '{} opened it {}', mother.fullName))).toBeVisible();
    });
  });
