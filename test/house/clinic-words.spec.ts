import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { clinicLanguages, type ClinicLanguage } from '../../shared/languages/clinic-languages';
import { clinicWords } from '../../server/wording/clinic-words';
import { sentenceIn } from '../../server/wording/sentences';
import {
  shippedClinicWords,
  shippedSentences,
  shippedWords,
} from '../../server/wording/shipped-words';
import { isSentence, sourcesOf, textsOf } from '../support/english-sentences';
import { parametersOf } from '../support/words';

const others = clinicLanguages.filter((language) => language !== 'en');
const english = shippedClinicWords('en');

/** Modules that say something to staff by keys alone. */
const byKeysAlone = [
  'server/calls/call-says.ts',
  'server/children/happening-sources.ts',
  'server/children/happenings.ts',
  'server/children/next-step.ts',
  'server/collections/morning-row.ts',
  'server/collections/morning-says.ts',
  'server/collections/this-morning.ts',
  'server/letters/letter-desk.ts',
  'server/letters/letter-list.ts',
  'server/messages/message-list.ts',
  'server/messages/message-says.ts',
  'server/orders/order-answer.ts',
  'server/protocols/band-words.ts',
  'server/protocols/differences.ts',
  'server/protocols/preview-night.ts',
  'server/results/current-results.ts',
  'server/results/result-says.ts',
  'server/series/family-will-hear.ts',
  'server/series/refusal-says.ts',
  'server/sites/set-up.ts',
  'server/specimens/explain-specimen.ts',
  'server/specimens/specimen-rows.ts',
  'server/specimens/specimen-says.ts',
  'server/stand-ins/moments.ts',
  'server/wording/clinic-measures.ts',
];

/** Rooms whose sentences no member of staff reads on the clinic's screens. */
const isForOthers = (file: string): boolean =>
  /^server\/(auth\/(codes|current-user|describe-family-session|family-|open-link)|bootstrap|clock\/move-clock|config|database|fasting|http\/openapi|main|people\/first-administrator|stand-ins\/text-|webhooks)/.test(
    file,
  ) || file === 'shared/contracts/family-session.ts';

const sentences = [...sourcesOf('server'), ...sourcesOf('shared/contracts')]
  .filter((file) => !isForOthers(file))
  .flatMap((file) =>
    textsOf(file)
      .filter(isSentence)
      .map((text) => ({ file, text })),
  );

describe.each(others.map((language) => [language] as [ClinicLanguage]))(
  'the clinic in %s',
  (language) => {
    const words = shippedClinicWords(language);

    test('has every key of the screens and no other', () => {
      expect(Object.keys(words).sort()).toEqual(Object.keys(english).sort());
    });

    test('has the staff’s wording: call scripts, the letter desk, invitations', () => {
      const staffKeys = Object.keys(shippedWords('en')).filter((key) =>
        /^(call|staff|letter\.(says|why|standing|reason|condition))\./.test(key),
      );
      const own = shippedWords(language);
      expect(staffKeys.length).toBeGreaterThan(100);
      expect(staffKeys.filter((key) => !(key in own))).toEqual([]);
    });

    test('keeps the parameters of every text', () => {
      const kept = (body: string) => [...parametersOf(body)].sort();
      for (const [key, body] of Object.entries(words))
        expect([key, kept(body)]).toEqual([key, kept(english[key] ?? '')]);
    });

    test('leaves nothing in English', () => {
      const same = Object.entries(words)
        .filter(([key, body]) => body === english[key] && /\p{L}{4}/u.test(withoutNames(body)))
        .map(([key]) => key);
      // Words that both languages write alike.
      expect(same).toEqual(['clinic.individual.diabetes', 'clinic.specimen.final']);
    });

    test('translates every sentence that the server and the contracts write', () => {
      expect(sentences.length).toBeGreaterThan(120);
      const untold = sentences.filter(({ text }) => sentenceIn(language, text) === text);
      expect(untold).toEqual([]);
    });

    test('invents no placeholder in a sentence', () => {
      const names = (text: string) => [...text.matchAll(/\{(\w+)\}/g)].map(([, name]) => name);
      const invented = Object.entries(shippedSentences(language)).filter(([source, told]) =>
        names(told).some((name) => !names(source).includes(name)),
      );
      expect(invented).toEqual([]);
    });
  },
);

const withoutNames = (body: string): string => body.replace(/\{\w+\}/g, '');

test('what staff reads is said by keys, not in code', () => {
  // SQL, parameters of SQL, and what a missing thing is called: "This series does not exist, ..." is told whole.
  const isOther =
    /\b(SELECT|FROM|UPDATE|ORDER BY|JSON_OBJECT)\b| (=|IN) \(?:\w|^'\w+', |^This \w+$/;
  const isWords = (text: string): boolean =>
    /\p{L}{2,} \p{L}{2,}/u.test(text) && !isOther.test(text.trim());
  const spoken = byKeysAlone.flatMap((file) =>
    textsOf(file)
      .filter(isWords)
      .map((text) => `${file}: ${text}`),
  );
  expect(spoken).toEqual([]);
});

test('the screens say every sentence of the clinic’s contracts in their own language', () => {
  const screen = readFileSync(
    join(__dirname, '../../src/common/ui/form/schema-sentences.ts'),
    'utf8',
  );
  const owed = sentences
    .filter(({ file, text }) => file.startsWith('shared/contracts/') && !text.includes('At most'))
    .map(({ text }) => text);
  expect(owed.length).toBeGreaterThan(10);
  expect(owed.filter((text) => !screen.includes(`'${text}'`))).toEqual([]);
});

describe('clinic words', () => {
  const spanish = clinicWords('es');

  test('tells days, times and lists in its language, 24 hours', () => {
    expect(spanish.day('2027-04-06')).toBe('martes, 6 de abril');
    expect(spanish.clock(Date.parse('2027-04-06T22:05:00Z'), 'America/Los_Angeles')).toBe('15:05');
    expect(spanish.list(['lunes', 'martes', 'jueves'])).toBe('lunes, martes y jueves');
    expect(spanish.text('clinic.minutes', { count: 1 })).toBe('1 minuto');
    expect(clinicWords('en').text('clinic.minutes', { count: 29 })).toBe('29 minutes');
  });

  test('finds the values of a sentence again', () => {
    expect(spanish.sentence('Somebody is calling.')).toBe('Alguien está llamando.');
    expect(spanish.sentence('At most 200 characters.')).toBe('Como máximo 200 caracteres.');
    expect(
      spanish.sentence(
        'Harbor fasting protocol, version 3. Starting values, to be confirmed by the clinic.',
      ),
    ).toBe(
      'Protocolo de ayuno de Harbor, versión 3. Valores iniciales, por confirmar por la clínica.',
    );
    expect(spanish.sentence('+12065550101: ¿Puedo dar agua?')).toBe(
      '+12065550101: ¿Puedo dar agua?',
    );
  });
});
