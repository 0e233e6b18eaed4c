/**
 * From the results of all specimens of a series: which letter may be written, what it must say in
 * which order, and what must have happened before. Nothing positive is told by a letter first; and
 * whatever is told that is not positive carries the sentence that it does not rule tuberculosis
 * out (only about 40 % of children with tuberculosis grow from three aspirates: Curry
 * International TB Center, key points).
 */
import { isCritical, isPositive, type SpecimenFindings } from './critical';

export type SpecimenState =
  /** The collection is still to come. */
  | 'planned'
  | 'not-collected'
  /** Refused by the laboratory, lost, leaked or its identity lost: there will be no answer. */
  | 'rejected'
  /** On its way or at the laboratory; results so far are preliminary. */
  | 'awaiting'
  | 'reported';

export interface SpecimenResults extends SpecimenFindings {
  readonly state: SpecimenState;
  readonly finality: 'preliminary' | 'final';
  /** A final typed by hand needs a second look. */
  readonly isHandEntered?: boolean;
  /** A correction that changed what the result means needs a second look. */
  readonly hasChangedMeaning?: boolean;
}

export interface SeriesResults {
  readonly specimens: readonly SpecimenResults[];
  /** A clinician closed the series with fewer mornings than planned. */
  readonly isClosedEarly: boolean;
}

/** In the order in which they are considered. */
export const letters = [
  'positive',
  'still-waiting',
  'unclear',
  'not-tuberculous',
  'closed-early',
  'some-not-usable',
  'all-negative',
] as const;
export type Letter = (typeof letters)[number];

/** In the order in which they stand in a letter: medicines above the result (family rule). */
export const sentenceKeys = [
  'medicines',
  'next-visit',
  'result-positive',
  'result-unclear',
  'result-not-tuberculous',
  'result-all-negative',
  'result-negative-where-usable',
  'result-negative-so-far',
  'result-none-yet',
  'result-none-usable',
  'does-not-rule-out',
  'needs-more-tests',
  'some-not-usable',
  'mornings-collected',
  'series-closed-early',
  'last-answer-expected',
  'when-to-call',
  'whom-to-call',
] as const;
export type SentenceKey = (typeof sentenceKeys)[number];

/** Every sentence about a result that is not positive; each needs `does-not-rule-out` beside it. */
export const sentencesNotPositive: readonly SentenceKey[] = [
  'result-unclear',
  'result-not-tuberculous',
  'result-all-negative',
  'result-negative-where-usable',
  'result-negative-so-far',
  'result-none-yet',
  'result-none-usable',
  'some-not-usable',
];

export type Precondition =
  | 'call-about-positive'
  | 'call-about-critical'
  | 'second-look'
  | 'medicines-stated'
  | 'next-visit-set'
  | 'decide-on-missing-morning'
  | 'reason-for-closing-early';

export type LetterReason =
  | 'an-answer-is-positive'
  | 'no-answer-is-positive'
  | 'answers-still-expected'
  | 'every-answer-is-final'
  | 'an-answer-is-unclear'
  | 'no-answer-is-unclear'
  | 'other-bacteria-found'
  | 'no-other-bacteria-found'
  | 'series-was-closed-early'
  | 'series-was-not-closed-early'
  | 'an-answer-is-not-usable'
  | 'every-answer-is-usable'
  | 'every-answer-is-negative';

export interface LetterChoice {
  readonly letter: Letter;
  readonly sentences: readonly SentenceKey[];
  readonly mustHaveHappened: readonly Precondition[];
  readonly critical: boolean;
  readonly positive: boolean;
  readonly whyNoOther: readonly { readonly letter: Letter; readonly reason: LetterReason }[];
}

type Answer =
  | 'positive'
  | 'waiting'
  | 'unclear'
  | 'not-tuberculous'
  | 'not-usable'
  /** No specimen was taken. */
  | 'not-taken'
  | 'negative';

interface Facts {
  readonly answers: readonly Answer[];
  readonly states: readonly SpecimenState[];
  readonly isClosedEarly: boolean;
  readonly hasInterimNews: boolean;
  readonly critical: boolean;
  readonly needsSecondLook: boolean;
}

interface Rule {
  readonly letter: Letter;
  readonly applies: (facts: Facts) => boolean;
  /** Why this letter goes before all later ones. */
  readonly because: LetterReason;
  readonly unless: LetterReason;
  readonly sentences: (facts: Facts) => readonly SentenceKey[];
}

const has = (facts: Facts, answer: Answer): boolean => facts.answers.includes(answer);
const negativeWhereUsable = (facts: Facts): SentenceKey =>
  has(facts, 'negative') ? 'result-negative-where-usable' : 'result-none-usable';

const rules: readonly Rule[] = [
  {
    letter: 'positive',
    applies: (facts) => has(facts, 'positive'),
    because: 'an-answer-is-positive',
    unless: 'no-answer-is-positive',
    sentences: (facts) =>
      has(facts, 'waiting')
        ? ['result-positive', 'last-answer-expected', 'needs-more-tests']
        : ['result-positive'],
  },
  {
    letter: 'still-waiting',
    applies: (facts) =>
      has(facts, 'waiting') || (facts.answers.length === 0 && !facts.isClosedEarly),
    because: 'answers-still-expected',
    unless: 'every-answer-is-final',
    sentences: (facts) => [
      facts.critical
        ? 'result-unclear'
        : facts.hasInterimNews
          ? 'result-negative-so-far'
          : 'result-none-yet',
      ...(facts.critical ? (['needs-more-tests'] as const) : []),
      'last-answer-expected',
    ],
  },
  {
    letter: 'unclear',
    applies: (facts) => has(facts, 'unclear'),
    because: 'an-answer-is-unclear',
    unless: 'no-answer-is-unclear',
    sentences: () => ['result-unclear', 'needs-more-tests'],
  },
  {
    letter: 'not-tuberculous',
    applies: (facts) => has(facts, 'not-tuberculous'),
    because: 'other-bacteria-found',
    unless: 'no-other-bacteria-found',
    sentences: () => ['result-not-tuberculous'],
  },
  {
    letter: 'closed-early',
    applies: (facts) => facts.isClosedEarly,
    because: 'series-was-closed-early',
    unless: 'series-was-not-closed-early',
    sentences: (facts) => [negativeWhereUsable(facts)],
  },
  {
    letter: 'some-not-usable',
    applies: (facts) => has(facts, 'not-usable') || has(facts, 'not-taken'),
    because: 'an-answer-is-not-usable',
    unless: 'every-answer-is-usable',
    sentences: (facts) => [negativeWhereUsable(facts)],
  },
  {
    letter: 'all-negative',
    applies: () => true,
    because: 'every-answer-is-negative',
    unless: 'an-answer-is-not-usable',
    sentences: () => ['result-all-negative'],
  },
];

export function chooseLetter(series: SeriesResults): LetterChoice {
  const facts = factsOf(series);
  const chosenIndex = rules.findIndex((rule) => rule.applies(facts));
  const chosen = rules[chosenIndex];
  if (!chosen) throw new Error('The last rule applies to every series.');
  return {
    letter: chosen.letter,
    sentences: sentencesOf(chosen, facts),
    mustHaveHappened: preconditions(facts),
    critical: facts.critical,
    positive: has(facts, 'positive'),
    whyNoOther: rules.flatMap((rule, index) => {
      if (rule === chosen) return [];
      const reason = index < chosenIndex ? rule.unless : chosen.because;
      return [{ letter: rule.letter, reason }];
    }),
  };
}

function factsOf({ specimens, isClosedEarly }: SeriesResults): Facts {
  return {
    answers: specimens.map((specimen) => answerOf(specimen, isClosedEarly)),
    states: specimens.map((specimen) => specimen.state),
    isClosedEarly,
    // Invalid, contaminated and another germ are neither positive nor negative: they are no "not found so far".
    hasInterimNews: specimens.some(
      ({ smear, amplification, culture }) =>
        smear === 'negative' ||
        amplification === 'not-detected' ||
        culture === 'no-growth-yet' ||
        culture === 'negative-final',
    ),
    critical: specimens.some(isCritical),
    needsSecondLook: specimens.some(
      (specimen) =>
        specimen.hasChangedMeaning || (specimen.isHandEntered && specimen.finality === 'final'),
    ),
  };
}

/** What one specimen says. A positive counts whatever else is recorded about the specimen. */
function answerOf(specimen: SpecimenResults, isClosedEarly: boolean): Answer {
  if (isPositive(specimen)) return 'positive';
  const { state, finality, culture } = specimen;
  const unclear = isCritical(specimen);
  if (state === 'planned' && !isClosedEarly) return 'waiting';
  if (unclear && state !== 'awaiting' && state !== 'reported') return 'unclear';
  if (state === 'planned' || state === 'not-collected') return 'not-taken';
  if (state === 'rejected') return 'not-usable';
  const isFinal = state === 'reported' && finality === 'final';
  // A culture that is not over keeps the specimen open, whatever the report calls itself.
  if (!isFinal || culture === 'no-growth-yet' || culture === 'growing') return 'waiting';
  // A positive smear with another kind of mycobacterium in culture is explained by it.
  if (culture === 'not-tuberculous' && specimen.amplification !== 'trace') return 'not-tuberculous';
  if (unclear) return 'unclear';
  return culture === 'negative-final' ? 'negative' : 'not-usable';
}

function sentencesOf(rule: Rule, facts: Facts): SentenceKey[] {
  const wanted = new Set<SentenceKey>([
    'medicines',
    'next-visit',
    'mornings-collected',
    'when-to-call',
    'whom-to-call',
    ...rule.sentences(facts),
  ]);
  if (facts.isClosedEarly) wanted.add('series-closed-early');
  if (has(facts, 'not-usable') && !has(facts, 'positive')) wanted.add('some-not-usable');
  if (sentencesNotPositive.some((key) => wanted.has(key))) wanted.add('does-not-rule-out');
  return sentenceKeys.filter((key) => wanted.has(key));
}

function preconditions(facts: Facts): Precondition[] {
  const isPositiveSeries = has(facts, 'positive');
  const isMissingMorning = facts.states.includes('not-collected') && !facts.isClosedEarly;
  const wanted: readonly (readonly [Precondition, boolean])[] = [
    ['call-about-positive', isPositiveSeries],
    ['call-about-critical', facts.critical && !isPositiveSeries],
    ['second-look', facts.needsSecondLook],
    ['medicines-stated', true],
    ['next-visit-set', true],
    ['decide-on-missing-morning', isMissingMorning && !isPositiveSeries],
    ['reason-for-closing-early', facts.isClosedEarly],
  ];
  return wanted.flatMap(([precondition, isNeeded]) => (isNeeded ? [precondition] : []));
}
