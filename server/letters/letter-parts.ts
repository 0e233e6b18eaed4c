import type { Paragraph } from '../../shared/contracts/letters';
import { isCritical, isPositive } from '../../shared/domain/critical';
import { addDays } from '../../shared/domain/day';
import type { LetterChoice, SentenceKey, SpecimenResults } from '../../shared/domain/letter-choice';
import { dayOf } from '../../shared/domain/zone';
import { familyDay, familyTime } from '../../shared/languages/family-time';
import type { Wording } from '../wording/render';

export type Medicines = 'keep-giving' | 'start-on' | 'none-now' | 'decided-on';

export interface ChosenParts {
  readonly medicines: Medicines | null;
  readonly medicinesOn: string | null;
  readonly nextVisitAt: string | null;
  readonly leftOut: readonly string[];
}

export interface LetterFacts {
  readonly choice: LetterChoice;
  readonly callMe: string;
  readonly zone: string;
  readonly today: string;
  readonly mornings: readonly { readonly number: number; readonly on: string }[];
  readonly specimens: readonly SpecimenResults[];
  readonly planned: number;
  readonly lastAnswerOn: string | null;
  readonly clinicName: string;
  readonly clinicPhone: string;
  readonly emergencyNumber: string;
  readonly signer: string;
}

export type Tone = 'do' | 'plain' | 'calm' | 'danger' | 'soft';

/** A part of a letter in one language. `text` is null while a choice is missing. */
export interface LetterPart {
  readonly key: string;
  readonly heading: string | null;
  readonly text: string | null;
  readonly tone: Tone;
  readonly standing: Paragraph['standing'];
}

/** May be left out by the clinician; every other part stays. */
const optional: readonly SentenceKey[] = ['needs-more-tests', 'mornings-collected'];

const headings: Partial<Record<SentenceKey, string>> = {
  medicines: 'medicines',
  'next-visit': 'next-visit',
  'mornings-collected': 'mornings',
  'last-answer-expected': 'still-waiting',
  'when-to-call': 'when-to-call',
};

const tones: Partial<Record<SentenceKey, Tone>> = {
  medicines: 'do',
  'next-visit': 'do',
  'does-not-rule-out': 'calm',
};

/** How one morning is told. A series with a positive answer lists its positive mornings only. */
function morningKey(specimen: SpecimenResults): string {
  if (isPositive(specimen)) return 'positive';
  if (specimen.state !== 'reported' && specimen.state !== 'awaiting') return specimen.state;
  if (specimen.state === 'awaiting') return isCritical(specimen) ? 'unclear' : 'waiting';
  if (specimen.culture === 'contaminated' || specimen.culture === 'not-tuberculous')
    return specimen.culture;
  if (isCritical(specimen)) return 'unclear';
  return specimen.culture === 'negative-final' ? 'negative' : 'waiting';
}

const toldMornings = ({ mornings, specimens, choice }: LetterFacts) =>
  mornings.flatMap(({ number, on }, index) => {
    const specimen = specimens[index];
    if (!specimen || (choice.positive && !isPositive(specimen))) return [];
    return [{ number, on, specimen }];
  });

const morningLines = (wording: Wording, facts: LetterFacts): string[] =>
  toldMornings(facts).map(({ number, on, specimen }) =>
    wording.text(`letter.morning.${morningKey(specimen)}`, {
      day: familyDay(on, wording.profile).text,
      number,
    }),
  );

function medicinesText(wording: Wording, facts: LetterFacts, chosen: ChosenParts): string | null {
  const { medicines, medicinesOn } = chosen;
  if (medicines === null) return null;
  const needsDay = medicines === 'start-on' || medicines === 'decided-on';
  if (needsDay && medicinesOn === null) return null;
  return wording.text(`letter.medicines.${medicines}`, {
    name: facts.callMe,
    nextCallDay: familyDay(addDays(facts.today, 7), wording.profile).text,
    ...(needsDay && medicinesOn ? { day: familyDay(medicinesOn, wording.profile).text } : {}),
  });
}

function nextVisitText(wording: Wording, facts: LetterFacts, chosen: ChosenParts): string | null {
  if (chosen.nextVisitAt === null) return null;
  const at = Date.parse(chosen.nextVisitAt);
  const time = familyTime(at, facts.zone, wording.profile);
  return wording.text('letter.next-visit', {
    dayText: familyDay(dayOf(at, facts.zone), wording.profile).text,
    time: time.time,
    name: facts.callMe,
  });
}

function sentenceText(
  wording: Wording,
  facts: LetterFacts,
  chosen: ChosenParts,
  key: SentenceKey,
): string | null {
  const collected = facts.specimens.filter(
    (specimen) => !['planned', 'not-collected'].includes(specimen.state),
  ).length;
  const name = facts.callMe;
  switch (key) {
    case 'medicines':
      return medicinesText(wording, facts, chosen);
    case 'next-visit':
      return nextVisitText(wording, facts, chosen);
    case 'last-answer-expected':
      return facts.lastAnswerOn === null
        ? wording.text('letter.list.waiting-no-date')
        : wording.text('letter.sentence.last-answer-expected', {
            day: familyDay(facts.lastAnswerOn, wording.profile).text,
          });
    case 'mornings-collected':
      return [
        wording.text('letter.sentence.mornings-collected', {
          name,
          collected,
          total: facts.specimens.length,
        }),
        ...morningLines(wording, facts),
      ].join('\n');
    case 'series-closed-early':
      return wording.text(`letter.sentence.${key}`, { collected, planned: facts.planned });
    case 'whom-to-call':
      return wording.text(`letter.sentence.${key}`, {
        clinic: facts.clinicName,
        phone: facts.clinicPhone,
      });
    default:
      return wording.text(`letter.sentence.${key}`, { name });
  }
}

/** The first sentence about the result carries the heading 'What we found'. */
const headingOf = (key: SentenceKey): string | null =>
  key.startsWith('result-') ? 'result' : (headings[key] ?? null);

/**
 * The letter in one language: medicines and next visit first, then the result, at once what it does not mean, the
 * mornings, when to call, danger, signature. Parts left out by the clinician are gone.
 */
export function letterParts(
  wording: Wording,
  facts: LetterFacts,
  chosen: ChosenParts,
): LetterPart[] {
  const heading = (key: SentenceKey): string | null => {
    const name = headingOf(key);
    return name === null ? null : wording.text(`letter.heading.${name}`);
  };
  const parts = facts.choice.sentences.map((key): LetterPart => {
    const text = sentenceText(wording, facts, chosen, key);
    const mayGo = optional.includes(key);
    return {
      key,
      heading: heading(key),
      text,
      tone: tones[key] ?? 'plain',
      standing: text === null ? 'still-missing' : mayGo ? 'may-be-left-out' : 'must-be-there',
    };
  });
  const fixed: LetterPart[] = [
    {
      key: 'danger',
      heading: null,
      text: wording.text('letter.danger', { emergency: facts.emergencyNumber }),
      tone: 'danger',
      standing: 'fixed',
    },
    {
      key: 'signature',
      heading: null,
      text: [
        wording.text('letter.signature', { signer: facts.signer, clinic: facts.clinicName }),
        wording.text('letter.signed-on', { date: familyDay(facts.today, wording.profile).text }),
      ].join('\n'),
      tone: 'soft',
      standing: 'fixed',
    },
  ];
  return [...parts, ...fixed];
}

export const isLeftOut = (part: LetterPart, chosen: ChosenParts): boolean =>
  part.standing === 'may-be-left-out' && chosen.leftOut.includes(part.key);

/** Every text that stands in this letter: all of them are signed off, or the letter is not sent. */
export const wordingKeysOf = (
  parts: readonly LetterPart[],
  facts: LetterFacts,
  chosen: ChosenParts,
): string[] => [
  ...new Set([
    `letter.title.${facts.choice.letter}`,
    ...(chosen.medicines ? [`letter.medicines.${chosen.medicines}`] : []),
    ...parts.flatMap(({ key }) => {
      const heading = headingOf(key as SentenceKey);
      return [
        ...(heading === null ? [] : [`letter.heading.${heading}`]),
        ...textKeysOf(key, facts),
      ];
    }),
  ]),
];

function textKeysOf(key: string, facts: LetterFacts): string[] {
  switch (key) {
    case 'medicines':
      return [];
    case 'next-visit':
    case 'danger':
      return [`letter.${key}`];
    case 'signature':
      return ['letter.signature', 'letter.signed-on'];
    case 'last-answer-expected':
      return [
        facts.lastAnswerOn === null ? 'letter.list.waiting-no-date' : `letter.sentence.${key}`,
      ];
    case 'mornings-collected':
      return [
        `letter.sentence.${key}`,
        ...toldMornings(facts).map(({ specimen }) => `letter.morning.${morningKey(specimen)}`),
      ];
    default:
      return [`letter.sentence.${key}`];
  }
}
