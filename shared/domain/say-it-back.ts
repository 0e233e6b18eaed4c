import type { Feeding } from './fasting-plan';
import type { Instant } from './day';

/** What a family is asked to tell in its own words before a night. */
export const sayBackQuestions = ['water', 'comfort', 'last', 'mistake'] as const;
export type SayBackQuestion = (typeof sayBackQuestions)[number];

/** The choices of each question, in the order shown. Not being sure is always one of them. */
export const sayBackChoices = {
  water: ['yes', 'no', 'unsure'],
  comfort: ['feed', 'hold', 'unsure'],
  last: ['stop', 'leave', 'arrive', 'unsure'],
  mistake: ['home', 'tell', 'silent', 'unsure'],
} as const satisfies Record<SayBackQuestion, readonly string[]>;

const right: Readonly<Record<SayBackQuestion, string>> = {
  water: 'no',
  comfort: 'hold',
  last: 'stop',
  mistake: 'tell',
};

/** A question that was missed is explained and asked once more; after that a person calls. */
export const mostTries = 2;

/**
 * Three questions for the child whose plan is the strictest. A baby at the breast wakes and wants to nurse: that is
 * asked instead of the sip of water.
 */
export function questionsFor({
  isInfant,
  feeding,
}: {
  readonly isInfant: boolean;
  readonly feeding: Feeding;
}): readonly SayBackQuestion[] {
  const isAtBreast = isInfant && (feeding === 'breast' || feeding === 'breast-and-formula');
  return [isAtBreast ? 'comfort' : 'water', 'last', 'mistake'];
}

export const isChoiceOf = (question: SayBackQuestion, choice: string): boolean =>
  (sayBackChoices[question] as readonly string[]).includes(choice);

export const isRightChoice = (question: SayBackQuestion, choice: string): boolean =>
  right[question] === choice;

const minute = 60_000;

/**
 * The moment of the night that is asked about: two hours before the arrival, and always after the last thing has
 * stopped, so that "no" is right by the plan. Null when the plan leaves no such moment.
 */
export function askedMoment(nothingAt: Instant, arriveAt: Instant): Instant | null {
  const at = Math.max(arriveAt - 120 * minute, nothingAt + 30 * minute);
  return at < arriveAt ? at : null;
}

export interface SayBackTry {
  readonly question: SayBackQuestion;
  readonly isRight: boolean;
}

export interface SayBackStanding {
  /** Still to be asked, in the order of asking: those never asked first, then those that were missed. */
  readonly pending: readonly { readonly question: SayBackQuestion; readonly tries: number }[];
  /** Missed after the explanation too. */
  readonly notUnderstood: readonly SayBackQuestion[];
}

/** @param tries what was said so far, in any order */
export function sayBackStanding(
  asked: readonly SayBackQuestion[],
  tries: readonly SayBackTry[],
): SayBackStanding {
  const counted = asked.map((question) => {
    const own = tries.filter((one) => one.question === question);
    return { question, tries: own.length, isUnderstood: own.some(({ isRight }) => isRight) };
  });
  return {
    pending: counted
      .filter((one) => !one.isUnderstood && one.tries < mostTries)
      .sort((left, later) => left.tries - later.tries)
      .map(({ question, tries: count }) => ({ question, tries: count })),
    notUnderstood: counted
      .filter((one) => !one.isUnderstood && one.tries >= mostTries)
      .map(({ question }) => question),
  };
}
