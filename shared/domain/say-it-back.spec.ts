import {
  askedMoment,
  isChoiceOf,
  isRightChoice,
  questionsFor,
  sayBackChoices,
  sayBackQuestions,
  sayBackStanding,
} from './say-it-back';

describe('which questions', () => {
  it.each([
    ['a baby at the breast', true, 'breast', 'comfort'],
    ['a baby with breast and bottle', true, 'breast-and-formula', 'comfort'],
    ['a baby with bottles', true, 'formula', 'water'],
    ['a baby who eats', true, 'family-food', 'water'],
    ['a toddler who nurses', false, 'breast', 'water'],
    ['a child who eats', false, 'family-food', 'water'],
  ] as const)('%s', (_who, isInfant, feeding, first) => {
    expect(questionsFor({ isInfant, feeding })).toEqual([first, 'last', 'mistake']);
  });

  it('has one right answer each, and not being sure is never wrong to say', () => {
    for (const question of sayBackQuestions) {
      const choices = sayBackChoices[question];
      expect(choices.filter((choice) => isRightChoice(question, choice))).toHaveLength(1);
      expect(choices).toContain('unsure');
      expect(isRightChoice(question, 'unsure')).toBe(false);
      expect(isChoiceOf(question, 'perhaps')).toBe(false);
    }
    expect(isChoiceOf('last', 'yes')).toBe(false);
  });
});

describe('the moment asked about', () => {
  const hour = 3_600_000;
  it.each([
    ['two hours before the arrival', 0, 7 * hour, 5 * hour],
    ['half an hour after the last stop when that is later', 6 * hour, 7 * hour, 6.5 * hour],
    ['never in a plan without time for it', 6.6 * hour, 7 * hour, null],
  ])('%s', (_case, nothingAt, arriveAt, at) => {
    expect(askedMoment(nothingAt, arriveAt)).toBe(at);
  });
});

describe('how it stands', () => {
  const asked = ['water', 'last', 'mistake'] as const;
  const said = (question: (typeof asked)[number], isRight: boolean) => ({ question, isRight });

  it('asks everything first, then once more what was missed', () => {
    expect(sayBackStanding(asked, []).pending.map(({ question }) => question)).toEqual(asked);
    const missed = sayBackStanding(asked, [said('water', false)]);
    expect(missed.pending).toEqual([
      { question: 'last', tries: 0 },
      { question: 'mistake', tries: 0 },
      { question: 'water', tries: 1 },
    ]);
    expect(missed.notUnderstood).toEqual([]);
  });

  it('ends when each is understood, also after an explanation', () => {
    const tries = [
      said('water', false),
      said('last', true),
      said('mistake', true),
      said('water', true),
    ];
    expect(sayBackStanding(asked, tries)).toEqual({ pending: [], notUnderstood: [] });
  });

  it('is not understood when it is missed after the explanation', () => {
    const standing = sayBackStanding(asked, [said('last', false), said('last', false)]);
    expect(standing.notUnderstood).toEqual(['last']);
    expect(standing.pending.map(({ question }) => question)).toEqual(['water', 'mistake']);
  });
});
