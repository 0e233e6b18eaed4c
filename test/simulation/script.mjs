// Writes what every family of a run will do, from the seed alone: the same seed, the same families.
import { chanceOf, dealer } from './chance.mjs';

// Numbers that are kept for stories, 555-0100 to 555-0199 of each area; 206 and 312 have the clinic's own.
const areas = [
  ...[212, 213, 214, 215, 216, 301, 302, 303, 304, 305, 307, 401, 402, 404, 405],
  ...[406, 410, 412, 413, 414, 415, 501, 502, 503, 504],
];
const mostPhones = areas.length * 100;

/** How a family can be written to, of twenty. */
const ways = {
  'texts-early': 7,
  'texts-by-day': 4,
  'texts-and-mail': 2,
  'mail-only': 2,
  nothing: 2,
  'unsigned-language': 2,
  'reads-not': 1,
};

/** What a family does on a morning, of twenty-five; 'called-off' is the clinic's doing. */
const doings = {
  web: 5,
  digit: 5,
  forgets: 3,
  twice: 2,
  'changes-mind': 2,
  'other-phone': 1,
  'unknown-number': 1,
  ate: 1,
  unclear: 1,
  'not-coming': 1,
  'too-early': 1,
  late: 1,
  'called-off': 1,
};

const languages = { en: 4, es: 3, ar: 3 };
const unsigned = ['vi', 'so', 'my'];
const stopWords = ['STOP', 'Stop.', 'quit', 'revoke', 'opt out', 'Alto', 'توقف', 'unsubscribe'];
const names = ['Maple', 'Birch', 'Rowan', 'Hazel', 'Linden', 'Aspen', 'Cedar', 'Juniper'];
const syllables = ['da', 'ri', 'no', 'ka', 'lu', 'me', 'sa', 'vo', 'ti', 'be'];
const labels = {
  en: ['Baby', 'Big one'],
  es: ['Bebé', 'Mayor'],
  ar: ['الصغير', 'الكبير'],
};

/**
 * @param families how many @param days how long the run is @param seed any text
 * @param clinicDays indexes of days on which families come to be enrolled, from 0
 */
export function writeScript({ families, seed, clinicDays }) {
  if (families * 3 > mostPhones) throw new RangeError('There are not enough numbers of stories.');
  const chance = chanceOf(seed, 'script');
  const deal = {
    way: dealer(chance, ways),
    doing: dealer(chance, doings),
    language: dealer(chance, languages),
    mornings: dealer(chance, { 3: 5, 2: 2, 1: 1 }),
    children: dealer(chance, { 1: 4, 2: 1 }),
    helper: dealer(chance, { yes: 1, no: 3 }),
    optOut: dealer(chance, { yes: 1, no: 4 }),
    consent: dealer(chance, { same: 6, 'no-early': 1, 'no-texts': 1 }),
  };
  let phones = 0;
  const phone = () => {
    const number = phones;
    phones += 1;
    return `+1${areas[number % areas.length]}5550${100 + Math.floor(number / areas.length)}`;
  };
  const last = Math.max(1, clinicDays.length);
  return Array.from({ length: families }, (_, index) => {
    const own = chanceOf(seed, 'family', index);
    const way = deal.way();
    const language = way === 'unsigned-language' ? own.pick(unsigned) : deal.language();
    const surname = `${own.pick(names)}${own.pick(syllables)}${own.pick(syllables)}`;
    const mayText = /^texts|unsigned|reads-not/.test(way);
    const children = childrenOf(own, Number(deal.children()), surname, language);
    const hasHelper = deal.helper() === 'yes';
    const morningsPlanned = Number(deal.mornings());
    return {
      number: index,
      way,
      language,
      surname,
      enrolsOn: clinicDays[Math.floor((index * last) / families)],
      enrolsMinute: own.int(10 * 60, 15 * 60),
      // Area 10.0.0.0/8 stands for the networks of the families; the web believes its proxy.
      network: `10.${1 + (index >> 8)}.${index & 255}.${own.int(1, 250)}`,
      adults: [
        guardianOf({ way, language, surname, phone: phone() }),
        ...(hasHelper ? [helperOf({ own, language, surname, phone: phone() })] : []),
      ],
      strangePhone: phone(),
      children,
      morningsPlanned,
      mornings: Array.from({ length: morningsPlanned }, () => ({
        doing: deal.doing(),
        afterMinutes: own.int(2, 25),
        helperBrings: hasHelper && own.happens(0.5),
        comesAnyway: own.happens(0.7),
        isCollected: own.happens(0.85),
      })),
      optOut:
        mayText && deal.optOut() === 'yes'
          ? {
              beforeMorning: own.int(0, morningsPlanned - 1),
              hoursBefore: own.int(3, 40),
              word: own.pick(stopWords),
              againAfterHours: own.happens(0.5) ? own.int(2, 20) : null,
            }
          : null,
      consent: mayText
        ? { becomes: deal.consent(), beforeMorning: own.int(0, morningsPlanned - 1) }
        : null,
      uuid: own.uuid,
    };
  });
}

function childrenOf(own, count, surname, language) {
  const known = labels[language] ?? labels.en;
  return Array.from({ length: count }, (_, index) => ({
    fullName: `${own.pick(syllables)}${own.pick(syllables)}${own.pick(syllables)}`
      .replace(/^./, (letter) => letter.toUpperCase())
      .concat(` ${surname}`),
    label: known[index],
    // The first is the younger one; babies have their own reminder.
    ageDays: index === 0 ? own.int(130, 1100) : own.int(1200, 1700),
  }));
}

function guardianOf({ way, language, surname, phone }) {
  const hasMail = way === 'mail-only' || way === 'texts-and-mail';
  return {
    fullName: `Parent ${surname}`,
    standing: 'guardian',
    phone,
    email: hasMail ? `${surname.toLowerCase()}.${phone.slice(-7)}@example.org` : null,
    language,
    readsHow: way === 'reads-not' ? 'no' : 'well',
    texts: way !== 'nothing' && way !== 'mail-only',
    early: !['nothing', 'mail-only', 'texts-by-day'].includes(way),
    mail: hasMail,
  };
}

function helperOf({ own, language, surname, phone }) {
  const texts = own.happens(0.8);
  return {
    fullName: `Helper ${surname}`,
    standing: 'helper',
    phone,
    email: null,
    language,
    readsHow: 'well',
    texts,
    early: texts && own.happens(0.6),
    mail: false,
  };
}
