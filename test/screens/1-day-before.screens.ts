import { addDays } from '../../shared/domain/zone';
import { LetterDesk } from '../e2e/support/letter-desk';
import { House, password, zone } from '../e2e/support/house';
import { expect, test, toScreen } from '../e2e/support/walk';
import { dayOf } from '../../shared/domain/zone';
import { Album } from './support/album';
import { altered, broken, emptied, silent, unreached } from './support/answers';
import { FamilyVoice, linkOf, readIn } from './support/families';
import { clinicGroup, clinicGroups } from './support/clinic-screens';
import { handAndDesk, languagesOf, schemes, viewsOf, widths, zoomed } from './support/views';

const parwin = { phone: '+13125550111', child: 'Noor Rahimi' };
const salma = { phone: '+13125550121', child: 'Idris Haddad' };
const mai = { phone: '+13125550181', child: 'Trần Gia Linh' };
const ines = '+13125550151';
const family = languagesOf('family');
const home = (language: string): string => `/${language}/`;
const clinic = languagesOf('clinic');

/** By day, so that what was queued for the families has gone out. */
async function awakeHouse(): Promise<House> {
  const house = await House.open();
  await house.awake();
  return house;
}

test('the views meet every pair of width, language and scheme', () => {
  for (const languages of [family, clinic]) {
    const views = Array.from({ length: languages.length * 2 }, (_, number) =>
      viewsOf(number, languages),
    ).flat();
    const pairs = new Set(
      views.flatMap(({ width, language, scheme }) => [
        `${width} ${language}`,
        `${width} ${scheme}`,
        `${language} ${scheme}`,
      ]),
    );
    const { length } = languages;
    expect(pairs.size).toBe(widths.length * (length + schemes.length) + length * schemes.length);
  }
});

test('public pages', async ({ browser }) => {
  await Album.fill(browser, { group: 'public', languages: family }, async (album) => {
    await album.shoot({ name: 'choose-language', address: () => '/' });
    await album.shoot({ name: 'sheet', address: (language) => `/sheet/${language}` });
    await album.shoot({ name: 'sheet-print', address: (l) => `/sheet/${l}`, media: 'print' });
    await album.shoot({ name: 'not-there', address: () => '/nowhere' });
  });
});

test('a family arrives', async ({ browser }) => {
  const house = await awakeHouse();
  const link = await linkOf(house.standIns, salma.phone, 'i');
  const speak = (language: string): Promise<void> => readIn(salma.phone, language);
  await Album.fill(browser, { group: 'family-arrive', languages: family, speak }, async (album) => {
    const arrive = (language: string): string => `/${language}${link}`;
    await album.shoot({ name: 'link-open', address: arrive });
    await album.shoot({
      name: 'link-nothing-typed',
      address: arrive,
      prepare: (page) => page.locator('form button[type="submit"]').click(),
    });
    for (const state of ['used', 'expired', 'locked']) {
      await album.both((context) =>
        altered(context, '**/api/family/links/describe', (body) => ({ ...body, state })),
      );
      await album.shoot({ name: `link-${state}`, address: arrive });
      await album.both((context) => context.unrouteAll());
    }
    await album.shoot({
      name: 'link-unknown',
      address: (language) => `/${language}/i/${'x'.repeat(32)}`,
    });
    await album.shoot({ name: 'code', address: (language) => `/${language}/code` });
    await album.shoot({ name: 'signed-out', address: (language) => `/${language}/` });
    await album.shoot({ name: 'not-found', address: (language) => `/${language}/nowhere` });
    await album.both((context) => silent(context, '**/api/family/links/describe'));
    await album.shoot({ name: 'loading', address: arrive, isWaiting: true });
  });
  await house.close();
});

test('the night before, two children', async ({ browser }) => {
  const house = await awakeHouse();
  const voice = await FamilyVoice.open();
  await voice.openLink(await linkOf(house.standIns, parwin.phone, 'i'), parwin.child);
  const speak = (language: string): Promise<void> => readIn(parwin.phone, language);
  const cookies = await voice.cookies();
  await Album.fill(
    browser,
    { group: 'family-next', languages: family, cookies, speak },
    async (album) => {
      await album.shoot({ name: 'next-morning-two', address: home });
      await album.shoot({ name: 'next-morning-print', address: home, media: 'print' });
      await album.shoot({ name: 'forced-colors', address: home, hasForcedColors: true });
      await album.shoot({ name: 'text-200', address: home, textSize: 2 });
      await album.shoot({ name: 'zoom-400', address: home, views: zoomed });
      await album.shoot({ name: 'question-too-early', address: (l) => `/${l}/morning` });
      await album.shoot({ name: 'calendar', address: (l) => `/${l}/calendar` });
      await album.shoot({ name: 'letters-code', address: (l) => `/${l}/letters` });
      await album.shoot({ name: 'interpreter', address: (l) => `/${l}/interpreter` });
      // What was kept is in the language of the visit before: each language is opened with signal first.
      await album.shoot({
        name: 'offline',
        address: home,
        prepare: async (page) => {
          await unreached(page.context(), '**/api/family/**');
          await page.reload();
          await page.locator('.kept').waitFor();
          await page.context().unrouteAll();
        },
      });
    },
  );

  await Album.fill(
    browser,
    { group: 'family-trouble', languages: family, cookies, speak },
    async (album) => {
      await album.both((context) => silent(context, '**/api/family/next-morning'));
      await album.shoot({ name: 'loading', address: home, isWaiting: true });
      await album.both((context) => context.unrouteAll());
      await album.both((context) => unreached(context, '**/api/family/next-morning'));
      await album.shoot({ name: 'unreached', address: home });
      await album.both((context) => context.unrouteAll());
      await album.both((context) => broken(context, '**/api/family/next-morning'));
      await album.shoot({ name: 'error', address: home });
      await album.both((context) => context.unrouteAll());
      await album.both((context) => unreached(context, '**/api/family/calendar'));
      await album.shoot({ name: 'calendar-unreached', address: (l) => `/${l}/calendar` });
    },
  );
  await voice.close();
  await house.close();
});

test('a family before anything is planned', async ({ browser }) => {
  const house = await awakeHouse();
  const voice = await FamilyVoice.open();
  await voice.signInByCode(house.standIns, ines);
  await Album.fill(
    browser,
    {
      group: 'family-empty',
      languages: family,
      cookies: await voice.cookies(),
      speak: (language) => readIn(ines, language),
    },
    async (album) => {
      await album.shoot({ name: 'empty', address: home });
      await album.shoot({ name: 'calendar-empty', address: (l) => `/${l}/calendar` });
    },
  );
  await voice.close();
  await house.close();
});

test('the night before, one child', async ({ browser }) => {
  const house = await awakeHouse();
  const voice = await FamilyVoice.open();
  await voice.openLink(await linkOf(house.standIns, salma.phone, 'i'), salma.child);
  await Album.fill(
    browser,
    {
      group: 'family-one',
      languages: family,
      cookies: await voice.cookies(),
      speak: (language) => readIn(salma.phone, language),
    },
    async (album) => {
      await album.shoot({ name: 'next-morning-one', address: (language) => `/${language}/` });
    },
  );
  await readIn(salma.phone, 'en');
  await voice.close();
  await house.close();
});

for (const group of clinicGroups)
  test(`the clinic on the day before: ${group}`, async ({ browser, people }) => {
    const house = await awakeHouse();
    const { who, screens } = await clinicGroup(house, group);
    const cookies = who === null ? undefined : await (await people.staff(who)).context().cookies();
    await Album.fill(
      browser,
      { group: `clinic-${group}`, languages: clinic, cookies },
      async (album) => {
        for (const screen of screens) await album.shoot(screen);
      },
    );
    await house.close();
  });

test('the clinic with nothing in it, with a fault, and while it waits', async ({
  browser,
  people,
}) => {
  const okafor = await people.staff('okafor');
  const cookies = await okafor.context().cookies();
  await Album.fill(
    browser,
    { group: 'clinic-empty', languages: clinic, cookies },
    async (album) => {
      const matters = [
        'calls',
        'orders',
        'children',
        'specimens',
        'results',
        'letters',
        'messages',
      ];
      for (const matter of matters) {
        await album.both((context) => altered(context, `**/api/clinic/${matter}*`, emptied));
        await album.shoot({ name: `${matter}-empty`, address: (l) => `/clinic/${l}/${matter}` });
        await album.both((context) => context.unrouteAll());
      }
      for (const matter of [...matters, 'this-morning']) {
        const address = (language: string): string => `/clinic/${language}/${matter}`;
        const faults = [
          { name: 'fault', meet: broken, isWaiting: false },
          { name: 'unreached', meet: unreached, isWaiting: false },
          { name: 'waiting', meet: silent, isWaiting: true },
        ];
        for (const { name, meet, isWaiting } of faults) {
          await album.both((context) => meet(context, `**/api/clinic/${matter}*`));
          await album.shoot({ name: `${matter}-${name}`, address, isWaiting, views: handAndDesk });
          await album.both((context) => context.unrouteAll());
        }
      }
    },
  );
});

test('a letter, at the desk and on the phone', async ({ browser, people }) => {
  const house = await awakeHouse();
  const okafor = await people.staff('okafor');
  await toScreen(okafor, 'Letters');
  const desk = new LetterDesk(okafor);
  await desk.open(mai.child);
  await desk.settle({ nextVisit: addDays(dayOf(await house.now(), zone), 14), password });
  const voice = await FamilyVoice.open();
  await voice.signInByCode(house.standIns, mai.phone);
  await Album.fill(
    browser,
    {
      group: 'family-letters',
      languages: family,
      cookies: await voice.cookies(),
      speak: (language) => readIn(mai.phone, language),
    },
    async (album) => {
      await album.shoot({ name: 'letters', address: (language) => `/${language}/letters` });
      const openFirst = async (page: typeof okafor): Promise<void> => {
        await page.locator('ul.post a').first().click();
        await page.locator('article').waitFor();
      };
      const letters = (language: string): string => `/${language}/letters`;
      await album.shoot({ name: 'letter', address: letters, prepare: openFirst });
      await album.shoot({
        name: 'letter-print',
        address: letters,
        prepare: openFirst,
        media: 'print',
      });
      await album.shoot({ name: 'finished', address: (language) => `/${language}/` });
    },
  );
  await voice.close();
  await house.close();
});
