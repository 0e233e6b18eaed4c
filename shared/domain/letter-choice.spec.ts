import { amplifications, cultures, isCritical, isPositive, smears } from './critical';
import {
  chooseLetter,
  letters,
  sentenceKeys,
  sentencesNotPositive,
  type LetterChoice,
  type SeriesResults,
  type SpecimenResults,
  type SpecimenState,
} from './letter-choice';

const states: readonly SpecimenState[] = [
  'planned',
  'not-collected',
  'rejected',
  'awaiting',
  'reported',
];

/** Every specimen there can be: 5 states, 3 smears, 5 amplifications, 7 cultures, 2 finalities. */
const everySpecimen: readonly SpecimenResults[] = states.flatMap((state) =>
  [null, ...smears].flatMap((smear) =>
    [null, ...amplifications].flatMap((amplification) =>
      [null, ...cultures].flatMap((culture) =>
        (['preliminary', 'final'] as const).map((finality) => ({
          state,
          smear,
          amplification,
          culture,
          finality,
        })),
      ),
    ),
  ),
);

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
const empty = { smear: null, amplification: null, culture: null, finality: 'preliminary' } as const;
const choose = (specimens: readonly SpecimenResults[], isClosedEarly = false): LetterChoice =>
  chooseLetter({ specimens, isClosedEarly });
const but = (change: Partial<SpecimenResults>): SpecimenResults => ({ ...negative, ...change });

/** Everything that must hold for any series; cheap, because it runs half a million times. */
function broken(series: SeriesResults): string | null {
  const choice = chooseLetter(series);
  const { letter, sentences, mustHaveHappened } = choice;
  const positive = series.specimens.some(isPositive);
  const critical = series.specimens.some(isCritical);
  if (choice.positive !== positive) return 'positive';
  if (choice.critical !== critical) return 'critical';
  if (positive !== (letter === 'positive')) return 'a positive gets the positive letter alone';
  if (positive !== mustHaveHappened.includes('call-about-positive')) return 'positive is called';
  if (critical && !mustHaveHappened.some((step) => step.startsWith('call-about-'))) {
    return 'critical is called';
  }
  const statesNotPositive = sentences.some((key) => sentencesNotPositive.includes(key));
  if (statesNotPositive && !sentences.includes('does-not-rule-out')) return 'rule out';
  if (!positive && !sentences.includes('does-not-rule-out')) return 'every other letter as well';
  if (sentences[0] !== 'medicines' || sentences[1] !== 'next-visit') return 'medicines above';
  if (!sentences.includes('whom-to-call')) return 'whom to call';
  const result = sentences.findIndex((key) => key.startsWith('result-'));
  if (result !== 2) return 'the result stands third';
  if (!positive && sentences[3] !== 'does-not-rule-out') return 'right under the result';
  if (sentences.filter((key) => key.startsWith('result-')).length !== 1) return 'one result';
  const places = sentences.map((key) => sentenceKeys.indexOf(key));
  if (places.some((place, index) => index > 0 && place <= (places[index - 1] ?? -1))) {
    return 'order';
  }
  if (letter === 'all-negative') {
    const all = series.specimens.every(
      ({ state, finality, culture, smear, amplification }) =>
        state === 'reported' &&
        finality === 'final' &&
        culture === 'negative-final' &&
        smear !== 'positive' &&
        amplification !== 'trace' &&
        amplification !== 'detected',
    );
    if (!all || series.isClosedEarly || series.specimens.length === 0) return 'all negative';
  }
  if (choice.whyNoOther.length !== letters.length - 1) return 'a reason for every other letter';
  if (choice.whyNoOther.some((other) => other.letter === letter)) return 'not for its own';
  return null;
}

describe('every series there can be', () => {
  it('of one specimen', () => {
    expect(everySpecimen).toHaveLength(5 * 3 * 5 * 7 * 2);
    for (const specimen of everySpecimen) {
      for (const isClosedEarly of [false, true]) {
        const series = { specimens: [specimen], isClosedEarly };
        expect([series, broken(series)]).toEqual([series, null]);
      }
    }
  });

  it('of two specimens', () => {
    const failures: unknown[] = [];
    everySpecimen.forEach((first, index) => {
      for (const second of everySpecimen.slice(index)) {
        const isClosedEarly = [first, second].some(({ state }) => state === 'planned');
        const series = { specimens: [first, second], isClosedEarly };
        const failure = broken(series);
        if (failure) failures.push([failure, series]);
      }
    });
    expect(failures).toEqual([]);
  });

  it('of three specimens, one of each meaning', () => {
    // One specimen of each group that the choice can tell apart, closed early or not.
    const meanings = new Map<string, SpecimenResults>();
    for (const specimen of everySpecimen) {
      const alone = [false, true].map((isClosedEarly) => choose([specimen], isClosedEarly));
      const key = JSON.stringify([alone, specimen.state]);
      if (!meanings.has(key)) meanings.set(key, specimen);
    }
    const kinds = [...meanings.values()];
    expect(kinds.length).toBeGreaterThan(15);
    const failures: unknown[] = [];
    for (const a of kinds) {
      for (const b of kinds) {
        for (const c of kinds) {
          for (const isClosedEarly of [false, true]) {
            const series = { specimens: [a, b, c], isClosedEarly };
            const failure = broken(series);
            if (failure) failures.push([failure, series]);
          }
        }
      }
    }
    expect(failures).toEqual([]);
  });

  it('of four and five specimens, drawn by a seed', () => {
    let seed = 20_270_413;
    const draw = (below: number): number => {
      seed = (Math.imul(seed, 1_664_525) + 1_013_904_223) >>> 0;
      return Math.floor((seed / 2 ** 32) * below);
    };
    for (let round = 0; round < 50_000; round += 1) {
      const specimens = Array.from(
        { length: 4 + draw(2) },
        () => everySpecimen[draw(everySpecimen.length)] ?? negative,
      );
      const series = { specimens, isClosedEarly: draw(2) === 1 };
      if (broken(series)) throw new Error(`${broken(series)}: ${JSON.stringify(series)}`);
    }
  });

  it('does not depend on the order of the specimens', () => {
    for (const specimen of everySpecimen) {
      const there = choose([specimen, negative, awaiting]);
      expect(choose([awaiting, specimen, negative])).toEqual(there);
    }
  });
});

describe('the letter', () => {
  type Row = [string, readonly SpecimenResults[], boolean, LetterChoice['letter']];
  it.each<Row>([
    ['three negative', [negative, negative, negative], false, 'all-negative'],
    ['amplification not done', [but({ amplification: null, smear: null })], false, 'all-negative'],
    ['amplification invalid', [but({ amplification: 'invalid' })], false, 'all-negative'],
    ['one not in yet', [negative, negative, awaiting], false, 'still-waiting'],
    ['one still to collect', [negative, { ...empty, state: 'planned' }], false, 'still-waiting'],
    ['no specimen at all', [], false, 'still-waiting'],
    ['a preliminary negative', [but({ finality: 'preliminary' })], false, 'still-waiting'],
    ['no growth yet', [but({ culture: 'no-growth-yet' })], false, 'still-waiting'],
    ['acid-fast growth', [but({ culture: 'growing' })], false, 'still-waiting'],
    ['one contaminated', [negative, but({ culture: 'contaminated' })], false, 'some-not-usable'],
    ['one rejected', [negative, { ...empty, state: 'rejected' }], false, 'some-not-usable'],
    ['one never taken', [negative, { ...empty, state: 'not-collected' }], false, 'some-not-usable'],
    ['closed with two', [negative, { ...empty, state: 'planned' }], true, 'closed-early'],
    ['closed with none', [], true, 'closed-early'],
    ['another kind', [negative, but({ culture: 'not-tuberculous' })], false, 'not-tuberculous'],
    [
      'another kind behind a positive smear',
      [but({ smear: 'positive', culture: 'not-tuberculous' })],
      false,
      'not-tuberculous',
    ],
    ['a trace and no growth', [but({ amplification: 'trace' }), negative], false, 'unclear'],
    ['a positive smear and no growth', [but({ smear: 'positive' }), negative], false, 'unclear'],
    ['detected, others awaited', [but({ amplification: 'detected' }), awaiting], false, 'positive'],
    [
      'identified in one of three',
      [negative, negative, but({ culture: 'mtb-complex' })],
      false,
      'positive',
    ],
    [
      'detected in a specimen rejected later',
      [{ ...empty, state: 'rejected', amplification: 'detected' }],
      true,
      'positive',
    ],
  ])('for %s', (_, specimens, isClosedEarly, letter) => {
    expect(choose(specimens, isClosedEarly).letter).toBe(letter);
  });

  it('with three negatives says the medicines first and that nothing is ruled out', () => {
    expect(choose([negative, negative, negative])).toEqual({
      letter: 'all-negative',
      sentences: [
        'medicines',
        'next-visit',
        'result-all-negative',
        'does-not-rule-out',
        'mornings-collected',
        'when-to-call',
        'whom-to-call',
      ],
      mustHaveHappened: ['medicines-stated', 'next-visit-set'],
      critical: false,
      positive: false,
      whyNoOther: [
        { letter: 'positive', reason: 'no-answer-is-positive' },
        { letter: 'still-waiting', reason: 'every-answer-is-final' },
        { letter: 'unclear', reason: 'no-answer-is-unclear' },
        { letter: 'not-tuberculous', reason: 'no-other-bacteria-found' },
        { letter: 'closed-early', reason: 'series-was-not-closed-early' },
        { letter: 'some-not-usable', reason: 'every-answer-is-usable' },
      ],
    });
  });

  it('with a positive waits for the call and says nothing of the others', () => {
    const choice = choose([but({ amplification: 'detected' }), negative, negative]);
    expect(choice.mustHaveHappened).toContain('call-about-positive');
    expect(choice.sentences.filter((key) => key.startsWith('result-'))).toEqual([
      'result-positive',
    ]);
    expect(choice.whyNoOther.every(({ reason }) => reason === 'an-answer-is-positive')).toBe(true);
  });

  it('while waiting tells apart no news, good news so far and unclear news', () => {
    const resultOf = (specimen: SpecimenResults): string | undefined =>
      choose([specimen, awaiting]).sentences.find((key) => key.startsWith('result-'));
    expect(resultOf(awaiting)).toBe('result-none-yet');
    expect(resultOf(negative)).toBe('result-negative-so-far');
    expect(resultOf(but({ amplification: 'trace' }))).toBe('result-unclear');
    // Neither positive nor negative: not "not found so far".
    expect(resultOf({ ...awaiting, amplification: 'invalid' })).toBe('result-none-yet');
    expect(resultOf({ ...awaiting, culture: 'contaminated' })).toBe('result-none-yet');
    expect(choose([awaiting]).sentences).toContain('last-answer-expected');
  });

  it.each([
    ['typed by hand and final', but({ isHandEntered: true }), true],
    ['typed by hand, preliminary', but({ isHandEntered: true, finality: 'preliminary' }), false],
    ['changed in meaning', but({ hasChangedMeaning: true }), true],
    ['imported', negative, false],
  ])('a result %s: second look', (_, specimen, isNeeded) => {
    expect(choose([specimen]).mustHaveHappened.includes('second-look')).toBe(isNeeded);
  });

  it('asks what becomes of a morning that was lost, or why it was closed', () => {
    const lost: SpecimenResults = { ...empty, state: 'not-collected' };
    expect(choose([negative, lost]).mustHaveHappened).toContain('decide-on-missing-morning');
    const closed = choose([negative, lost], true);
    expect(closed.mustHaveHappened).toContain('reason-for-closing-early');
    expect(closed.mustHaveHappened).not.toContain('decide-on-missing-morning');
    expect(closed.sentences).toContain('series-closed-early');
  });
});
