import {
  chooseLetter,
  type LetterReason,
  type SentenceKey,
  type SpecimenResults,
} from './letter-choice';

const negative: SpecimenResults = {
  state: 'reported',
  finality: 'final',
  smear: 'negative',
  amplification: 'not-detected',
  culture: 'negative-final',
};
const awaiting: SpecimenResults = {
  state: 'awaiting',
  finality: 'preliminary',
  smear: null,
  amplification: null,
  culture: null,
};
const but = (change: Partial<SpecimenResults>): SpecimenResults => ({ ...negative, ...change });
const choose = (specimens: readonly SpecimenResults[], isClosedEarly = false) =>
  chooseLetter({ specimens, isClosedEarly });
const rejected: SpecimenResults = { ...awaiting, state: 'rejected' };
const never: SpecimenResults = { ...awaiting, state: 'not-collected' };

/** What stands in each letter; a family reads every one of these sentences. */
describe('the sentences of a letter', () => {
  const usual: readonly SentenceKey[] = [
    'medicines',
    'next-visit',
    'mornings-collected',
    'when-to-call',
    'whom-to-call',
  ];
  const detected = but({ amplification: 'detected' });
  type Row = [string, readonly SpecimenResults[], boolean, readonly SentenceKey[]];
  it.each<Row>([
    ['positive', [detected, negative], false, ['result-positive']],
    [
      'positive, others awaited',
      [detected, awaiting],
      false,
      ['result-positive', 'last-answer-expected', 'needs-more-tests'],
    ],
    ['positive beside one not usable', [detected, rejected], false, ['result-positive']],
    [
      'waiting, no news',
      [awaiting],
      false,
      ['result-none-yet', 'does-not-rule-out', 'last-answer-expected'],
    ],
    [
      'waiting, unclear so far',
      [{ ...awaiting, smear: 'positive' }],
      false,
      ['result-unclear', 'needs-more-tests', 'does-not-rule-out', 'last-answer-expected'],
    ],
    [
      'unclear',
      [but({ amplification: 'trace' }), negative],
      false,
      ['result-unclear', 'needs-more-tests', 'does-not-rule-out'],
    ],
    [
      'unclear and another kind of bacteria: the trace is not explained by it',
      [but({ amplification: 'trace', culture: 'not-tuberculous' })],
      false,
      ['result-unclear', 'needs-more-tests', 'does-not-rule-out'],
    ],
    [
      'another kind of bacteria',
      [but({ culture: 'not-tuberculous' })],
      false,
      ['result-not-tuberculous', 'does-not-rule-out'],
    ],
    [
      'one not usable',
      [negative, rejected],
      false,
      ['result-negative-where-usable', 'some-not-usable', 'does-not-rule-out'],
    ],
    [
      'one contaminated',
      [negative, but({ culture: 'contaminated' })],
      false,
      ['result-negative-where-usable', 'some-not-usable', 'does-not-rule-out'],
    ],
    [
      'none usable',
      [rejected, rejected],
      false,
      ['result-none-usable', 'some-not-usable', 'does-not-rule-out'],
    ],
    [
      'one never taken',
      [negative, never],
      false,
      ['result-negative-where-usable', 'does-not-rule-out'],
    ],
    [
      'closed early',
      [negative, never],
      true,
      ['result-negative-where-usable', 'series-closed-early', 'does-not-rule-out'],
    ],
    ['all negative', [negative, negative], false, ['result-all-negative', 'does-not-rule-out']],
  ])('%s', (_, specimens, isClosedEarly, own) => {
    expect([...choose(specimens, isClosedEarly).sentences].sort()).toEqual(
      [...usual, ...own].sort(),
    );
  });

  it.each<[string, Partial<SpecimenResults>, SentenceKey]>([
    ['a negative smear', { smear: 'negative' }, 'result-negative-so-far'],
    ['nothing amplified', { amplification: 'not-detected' }, 'result-negative-so-far'],
    ['no growth yet', { culture: 'no-growth-yet' }, 'result-negative-so-far'],
    ['no growth at the end', { culture: 'negative-final' }, 'result-negative-so-far'],
    ['a contaminated culture', { culture: 'contaminated' }, 'result-none-yet'],
    ['an amplification that failed', { amplification: 'invalid' }, 'result-none-yet'],
  ])('%s alone, while waiting', (_, found, sentence) => {
    const { letter, sentences } = choose([{ ...awaiting, ...found }]);
    expect(letter).toBe('still-waiting');
    expect(sentences).toContain(sentence);
  });
});

describe('why no other letter', () => {
  const reasons = (specimens: readonly SpecimenResults[], isClosedEarly = false) =>
    choose(specimens, isClosedEarly).whyNoOther.map(({ reason }) => reason);
  const none: readonly LetterReason[] = [
    'no-answer-is-positive',
    'every-answer-is-final',
    'no-answer-is-unclear',
    'no-other-bacteria-found',
    'series-was-not-closed-early',
    'every-answer-is-usable',
  ];
  const then = (before: number, reason: LetterReason): LetterReason[] => [
    ...none.slice(0, before),
    ...Array<LetterReason>(6 - before).fill(reason),
  ];

  it.each<[string, readonly SpecimenResults[], boolean, readonly LetterReason[]]>([
    ['positive', [but({ amplification: 'detected' })], false, then(0, 'an-answer-is-positive')],
    ['waiting', [awaiting], false, then(1, 'answers-still-expected')],
    ['unclear', [but({ smear: 'positive' })], false, then(2, 'an-answer-is-unclear')],
    ['another kind', [but({ culture: 'not-tuberculous' })], false, then(3, 'other-bacteria-found')],
    ['closed early', [negative], true, then(4, 'series-was-closed-early')],
    ['one not usable', [rejected], false, then(5, 'an-answer-is-not-usable')],
    ['all negative', [negative], false, none],
  ])('%s', (_, specimens, isClosedEarly, expected) => {
    expect(reasons(specimens, isClosedEarly)).toEqual(expected);
  });
});

describe('a specimen that there will be no answer to, with a sign that is not negative', () => {
  it.each<[string, SpecimenResults, string]>([
    ['rejected', { ...rejected, smear: 'positive' }, 'unclear'],
    ['never collected, it says', { ...never, amplification: 'trace' }, 'unclear'],
    ['still at the laboratory', { ...awaiting, smear: 'positive' }, 'still-waiting'],
    ['reported, not final', but({ smear: 'positive', finality: 'preliminary' }), 'still-waiting'],
  ])('%s', (_, specimen, letter) => {
    expect(choose([specimen, negative]).letter).toBe(letter);
  });

  it('needs a second look for one specimen among others', () => {
    const { mustHaveHappened } = choose([negative, but({ hasChangedMeaning: true })]);
    expect(mustHaveHappened).toContain('second-look');
  });
});
