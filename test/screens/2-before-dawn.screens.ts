import type { Page } from '@playwright/test';
import type { MorningOutcome, MorningQuestion } from '../../shared/contracts/family-morning';
import { House } from '../e2e/support/house';
import { expect, test } from '../e2e/support/walk';
import { Album } from './support/album';
import { unreached } from './support/answers';
import { FamilyVoice, readIn } from './support/families';
import { languagesOf } from './support/views';

const parwin = '+13125550111';
const family = languagesOf('family');
const minute = 60_000;
const morning = (language: string): string => `/${language}/morning`;

/** Goes on to where the question of the coming morning has just opened. */
async function toQuestion(house: House, voice: FamilyVoice): Promise<MorningQuestion> {
  const { question } = await voice.nextMorning();
  if (question === null) throw new Error('The demo families have no morning to come.');
  await house.moveTo(Date.parse(question.opensAt) + 10 * minute);
  return voice.question();
}

const choose = (page: Page, index: number): Promise<void> =>
  page.locator('.choices .choice').nth(index).click();

test('the morning question and all that can come of it', async ({ browser }) => {
  const house = await House.open();
  const voice = await FamilyVoice.open();
  await voice.signInByCode(house.standIns, parwin);
  const { questions } = await toQuestion(house, voice);
  expect(questions.length).toBe(2);
  await Album.fill(
    browser,
    {
      group: 'family-question',
      languages: family,
      cookies: await voice.cookies(),
      speak: (language) => readIn(parwin, language),
    },
    async (album) => {
      const step =
        (name: string) =>
        (language: string): string =>
          `/${language}/morning?step=${name}`;
      await album.shoot({ name: 'eaten-first', address: morning });
      await album.shoot({
        name: 'eaten-second',
        address: morning,
        prepare: (page) => choose(page, 0),
      });
      await album.shoot({ name: 'when', address: morning, prepare: (page) => choose(page, 2) });
      await album.shoot({ name: 'something-changed', address: step('other') });
      for (const name of ['ill', 'late', 'not-coming'])
        await album.shoot({ name, address: step(name) });
      await album.both((context) => unreached(context, '**/api/family/fasting-checks'));
      await album.shoot({
        name: 'saved-offline',
        address: morning,
        prepare: async (page) => {
          await page.locator('.choices, .outcome').first().waitFor();
          // The phone keeps an answer: from the second picture on it is there already.
          if (await page.locator('.outcome').isHidden()) {
            await choose(page, 0);
            await choose(page, 0);
          }
          await page.locator('.outcome').waitFor();
        },
      });
    },
  );
  await voice.close();
  await house.close();
});

test('the outcomes', async ({ browser }) => {
  const house = await House.open();
  const voice = await FamilyVoice.open();
  await voice.signInByCode(house.standIns, parwin);
  const { questions } = await voice.question();
  const [youngest, older] = questions;
  const times = (youngest?.whenChoices ?? []).flatMap(({ at }) => (at === null ? [] : [at]));
  const nothing = { answer: 'nothing' };
  await Album.fill(
    browser,
    {
      group: 'family-outcome',
      languages: family,
      cookies: await voice.cookies(),
      speak: (language) => readIn(parwin, language),
    },
    async (album) => {
      const seen = new Set<string>();
      // What was told is kept in the words of that moment: each language gives the answer anew.
      const shootOutcome = async (give: () => Promise<MorningOutcome>): Promise<void> => {
        const { kind } = await give();
        if (!seen.has(kind)) await album.shoot({ name: kind, address: morning, before: give });
        seen.add(kind);
      };
      for (const answers of [
        [nothing, nothing],
        [{ answer: 'feed', lastIntakeAt: times[0] }, nothing],
        [{ answer: 'feed', lastIntakeAt: times.at(-1) }, nothing],
        [nothing, { answer: 'feed', lastIntakeAt: lastTime(older) }],
        [{ answer: 'unsure' }, nothing],
        [{ answer: 'sip' }, { answer: 'sip' }],
      ])
        await shootOutcome(() => voice.answer(answers));
      const { changes } = await voice.question();
      const [late] = changes.late.choices;
      for (const change of [
        { kind: 'late', newArrivalAt: late?.at },
        { kind: 'not-coming' },
        { kind: 'ill', isAwake: true },
        { kind: 'ill', isAwake: false },
      ])
        await shootOutcome(() => voice.change(change));
      expect([...seen]).toEqual(expect.arrayContaining(['come', 'late-noted', 'not-coming']));
      // The rest of the morning is that of a family which comes.
      await voice.answer([nothing, nothing]);
    },
  );
  await readIn(parwin, 'en');
  await voice.close();
  await house.close();
});

const lastTime = (question: MorningQuestion['questions'][number] | undefined): string | null =>
  question?.whenChoices.flatMap(({ at }) => (at === null ? [] : [at])).at(-1) ?? null;
