import type {
  FastingAnswer,
  FastingCheckRequest,
  MorningQuestion,
} from '../../../../shared/contracts/family-morning';

export type Question = MorningQuestion['questions'][number];
export interface GivenAnswer {
  answer: FastingAnswer;
  lastIntakeAt: string | null;
}
/** What was answered so far, by morning. */
export type AnswerSheet = ReadonlyMap<number, GivenAnswer>;

/** Which screen of the questions: what was eaten, or when it was finished. */
export interface QuestionStep {
  kind: 'eaten' | 'when';
  index: number;
}

/** Reads 'q2' or 'w2' of the address; null for everything else. */
export function questionStep(text: string | undefined, count: number): QuestionStep | null {
  const match = /^([qw])([1-8])$/.exec(text ?? '');
  if (!match) return null;
  const index = Number(match[2]) - 1;
  return index < count ? { kind: match[1] === 'q' ? 'eaten' : 'when', index } : null;
}

export const stepName = ({ kind, index }: QuestionStep): string =>
  (kind === 'eaten' ? 'q' : 'w') + (index + 1);

/**
 * The step that may be shown when the address asks for `wanted`: earlier questions come first, so that a reload in
 * the middle begins where answers are missing.
 */
export function reachableStep(
  wanted: QuestionStep,
  questions: readonly Question[],
  sheet: AnswerSheet,
): QuestionStep {
  const missing = questions.findIndex((question) => !sheet.has(question.morningId));
  if (missing !== -1 && missing < wanted.index) return { kind: 'eaten', index: missing };
  const question = questions[wanted.index];
  const given = question && sheet.get(question.morningId);
  return wanted.kind === 'when' && given?.answer !== 'feed'
    ? { kind: 'eaten', index: wanted.index }
    : wanted;
}

/** The screen after an answer; null when all is answered. */
export function stepAfter(
  { kind, index }: QuestionStep,
  answer: FastingAnswer,
  questions: readonly Question[],
): QuestionStep | null {
  if (kind === 'eaten' && answer === 'feed' && (questions[index]?.whenChoices.length ?? 0) > 0) {
    return { kind: 'when', index };
  }
  return index + 1 < questions.length ? { kind: 'eaten', index: index + 1 } : null;
}

export function checkRequest(
  question: Pick<MorningQuestion, 'on' | 'questions'>,
  sheet: AnswerSheet,
  submissionKey: string,
  deviceAt: string,
): FastingCheckRequest {
  return {
    submissionKey,
    on: question.on,
    deviceAt,
    answers: question.questions.flatMap(({ morningId }) => {
      const given = sheet.get(morningId);
      return given ? [{ morningId, ...given }] : [];
    }),
  };
}

export interface ToldUs {
  childId: number;
  callMe: string;
  face: Question['face'];
  /** The words that were tapped. */
  says: string[];
}

/** A waiting answer in the words it was given in, for as long as the clinic has not put it into its own. */
export function toldUs(question: MorningQuestion, request: FastingCheckRequest): ToldUs[] {
  return question.questions.flatMap((asked) => {
    const given = request.answers.find(({ morningId }) => morningId === asked.morningId);
    if (!given) return [];
    const what = asked.choices.find(({ answer }) => answer === given.answer)?.says;
    const when =
      given.answer === 'feed'
        ? asked.whenChoices.find(({ at }) => at === (given.lastIntakeAt ?? null))?.says
        : undefined;
    const says = [what, when].filter((words) => words !== undefined);
    return [{ childId: asked.childId, callMe: asked.callMe, face: asked.face, says }];
  });
}

/** True when '1' by text message would say the same. */
export const isAllNothing = (request: FastingCheckRequest): boolean =>
  request.answers.every(({ answer }) => answer === 'nothing');
