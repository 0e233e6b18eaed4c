import { messageSegments } from '../../shared/domain/message-segments';
import { fastingPlan } from '../../shared/domain/fasting-plan';
import { startingProtocol } from '../../shared/domain/fasting-protocol';
import { addDays, instantOf } from '../../shared/domain/zone';
import { drafted, planOfNight, type NightPlans } from '../../server/messages/night-messages';
import type { Recipient } from '../../server/messages/recipients';
import type { MorningPlan } from '../../server/series/morning-plans';
import { shippedLanguages, wordingIn } from '../support/words';
import { toAvoid } from '../support/words-to-avoid';

const zone = 'America/Chicago';
/** A plausible clinic: its own domain, and a link as the server makes it (16 characters, 96 bits). */
const url = 'https://threedawn.example.org/m/AbCdEfGhIjKlMnOp';
const site = {
  ...{ shortName: 'Alder Street', zone, country: 'US', door: 'Door B', address: '48 Alder Street' },
  ...{ phone: '+13125550142', emergencyNumber: '911', eveningTextTime: '18:30' },
  ...{ morningQuestionMinutesBefore: 90, callListMinutesBefore: 60, nudgeMinutesBefore: 75 },
  ...{ aheadTextDays: 3, aheadTextTime: '10:00' },
};

/** The demo families' children, and what families in each language may call theirs. */
const families = [
  [{ bornOn: '2026-05-01', label: 'Baby', feeding: 'breast', callMe: 'Noor Rahimi' }],
  [{ bornOn: '2022-07-01', label: 'The big one', feeding: 'family-food', callMe: 'Yonas Gebre' }],
  [
    { bornOn: '2026-05-01', label: 'Baby', feeding: 'breast', callMe: 'Noor Rahimi' },
    { bornOn: '2024-10-01', label: 'Big brother', feeding: 'family-food', callMe: 'Sami Rahimi' },
  ],
] as const;
const ownLabels: Readonly<Record<string, readonly [string, string]>> = {
  es: ['Bebé', 'La niña'],
  ar: ['الصغير', 'الكبيرة'],
};

/** A Wednesday in September and a Saturday: the longest names of days and months. */
const days = ['2026-12-09', '2027-09-22', '2027-09-25'];
const arrivals = ['06:00', '07:00', '08:40'];

function nightOf(
  language: string,
  family: (typeof families)[number],
  on: string,
  arrivalTime: string,
): NightPlans {
  const plans = family.map((child, place): MorningPlan => {
    const arrivalAt = instantOf({ on, time: arrivalTime, zone }) + place * 20 * 60_000;
    const told = {
      arrivalAt,
      zone,
      bornOn: child.bornOn,
      feeding: child.feeding,
      cautions: [],
      travelMinutes: 45,
      readyMinutes: 30,
    };
    return {
      ...told,
      ...{ site, on, callMe: child.callMe, fullName: child.callMe },
      familyLabel: ownLabels[language]?.[place] ?? child.label,
      plan: fastingPlan({ ...told, protocol: startingProtocol }),
      ...{ escortFamilyMemberId: null, nightCarerFamilyMemberId: null },
    } as unknown as MorningPlan;
  });
  return plans as unknown as NightPlans;
}

const recipient = (early: boolean): Recipient => ({
  ...{ familyMemberId: 1, householdId: 1, fullName: 'Laila Haddad', language: 'en' },
  ...{ phone: '+13125550150', email: 'laila@example.org', readsHow: 'well', isGuardian: true },
  ...{ seesResults: true, mayText: true, mayTextEarly: early, mayTextLetters: true },
  ...{ mayMail: true, mayMailLetters: true, isWithoutConsent: false },
});

interface Written {
  readonly kind: string;
  readonly channel: string;
  readonly text: string;
}

function everyMessage(language: string): Written[] {
  const wording = wordingIn(language as 'en');
  return families.flatMap((family) =>
    days.flatMap((on) =>
      arrivals.flatMap((time) =>
        [true, false].flatMap((early) => {
          const plans = nightOf(language, family, on, time);
          const who = recipient(early);
          const more = { isAnswered: false, followsMorning: false };
          const { messages, moments } = planOfNight(plans, [who], more);
          const night = { recipient: who, wording, url, plans, moments };
          return messages.flatMap((planned): Written[] => {
            const { kind, channel, subject, body, bodyOfNews } = drafted(planned, night);
            const first = { kind, channel, text: `${subject ? `${subject}\n` : ''}${body}` };
            return bodyOfNews === null ? [first] : [first, { kind, channel, text: bodyOfNews }];
          });
        }),
      ),
    ),
  );
}

describe.each(shippedLanguages)('every message of a night in %s', (language) => {
  const all = everyMessage(language);
  const isShort = language === 'en' || language === 'es';

  test('is there: all kinds, by text and by e-mail', () => {
    const kinds = new Set(all.map(({ kind, channel }) => `${kind} ${channel}`));
    expect([...kinds].sort()).toEqual([
      'ahead mail',
      'ahead sms',
      'evening mail',
      'evening sms',
      'morning mail',
      'morning sms',
      'nudge sms',
      'reminder sms',
    ]);
  });

  test('costs two parts in the short alphabet, three in another script', () => {
    const dear = all
      .filter(({ channel }) => channel === 'sms')
      .map(({ text }) => ({ text, ...messageSegments(text) }))
      .filter(({ encoding, segments }) =>
        isShort ? encoding !== 'gsm-7' || segments > 2 : segments > 3,
      )
      .map(({ text, units }) => `${units}: ${text}`);
    expect([...new Set(dear)]).toEqual([]);
  });

  test('names no child, disease, test, result or birth date', () => {
    const names = /Noor|Rahimi|Yonas|Gebre|Sami|Laila|Haddad/;
    const bornOn = /20(?:22|24|26)/;
    const bad = all.filter(
      ({ text }) =>
        names.test(text) || bornOn.test(text) || toAvoid(language, 'medical').test(text),
    );
    expect(bad).toEqual([]);
  });

  test('says no word that switches texts off or on', () => {
    expect(all.filter(({ text }) => toAvoid(language, 'commands').test(text))).toEqual([]);
  });

  test('links to the clinic’s own domain alone', () => {
    const links = all.flatMap(({ text }) => text.match(/https?:\S+/g) ?? []);
    expect(new Set(links)).toEqual(new Set([url]));
  });
});

test('a link token carries 96 bits', () => {
  const token = url.slice(url.lastIndexOf('/') + 1);
  expect(token.length * 6).toBeGreaterThanOrEqual(96);
  expect(addDays('2026-12-09', 1)).toBe('2026-12-10');
});
