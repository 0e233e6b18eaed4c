import { letterPage } from '../../../server/letters/letter-page';
import type { LetterFacts } from '../../../server/letters/letter-parts';
import { letterBody } from '../../../server/letters/sign-letter';
import { chooseLetter, type SpecimenResults } from '../../../shared/domain/letter-choice';
import { addDays } from '../../../shared/domain/day';
import type { LanguageId } from '../../../shared/languages/languages';
import { wordingIn } from '../../support/words';

const recipients: Partial<Record<LanguageId, string>> = {
  en: 'Elif Aksoy',
  es: 'Lucía Ocampo',
  ar: 'سلمى الخطيب',
};
const children: Partial<Record<LanguageId, string>> = { en: 'Deniz', es: 'Mateo', ar: 'يزن' };

const negative: SpecimenResults = {
  state: 'reported',
  finality: 'final',
  smear: 'negative',
  amplification: 'not-detected',
  culture: 'negative-final',
};
const waiting: SpecimenResults = {
  ...negative,
  state: 'awaiting',
  finality: 'preliminary',
  culture: 'no-growth-yet',
};
const contaminated: SpecimenResults = { ...negative, culture: 'contaminated' };

const chosen = {
  medicines: 'start-on' as const,
  medicinesOn: '2027-05-27',
  // Half past ten in the clinic.
  nextVisitAt: '2027-06-09T15:30:00.000Z',
  leftOut: [],
};

function facts(language: LanguageId, specimens: readonly SpecimenResults[]): LetterFacts {
  return {
    choice: chooseLetter({ specimens, isClosedEarly: false }),
    callMe: children[language] ?? '',
    zone: 'America/Chicago',
    today: '2027-05-26',
    mornings: specimens.map((_, index) => ({
      number: index + 1,
      on: addDays('2027-04-13', index),
    })),
    specimens,
    planned: specimens.length,
    lastAnswerOn: '2027-06-08',
    clinicName: 'Alder Street',
    clinicPhone: '312-555-0142',
    emergencyNumber: '911',
    signer: 'Dr. Ines Okafor',
  };
}

const page = (language: LanguageId, specimens: readonly SpecimenResults[]): string =>
  letterPage({
    body: letterBody(wordingIn(language), facts(language, specimens), chosen),
    language,
    recipient: recipients[language] ?? '',
    letterhead: ['Alder Street', '48 Alder Street, Chicago, IL 60601', '312-555-0142'],
  });

/** All three mornings done, nothing found: what most families get. */
export const usualLetter = (language: LanguageId): string =>
  page(language, [negative, negative, negative]);

/** Interim news that says most of what a letter can say. */
export const fullLetter = (language: LanguageId): string =>
  page(language, [negative, contaminated, waiting]);

/** As many mornings as a child has whose series was begun anew again and again. */
export const longLetter = (language: LanguageId): string =>
  page(language, [...Array<SpecimenResults>(15).fill(negative), contaminated, waiting]);
