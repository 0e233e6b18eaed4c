import type { MorningOutcome, MorningQuestion } from '../../../../shared/contracts/family-morning';
import type {
  ReceivedOutcome,
  RefusedAnswer,
  WaitingAnswer,
} from '../../../common/session/family-answers';
import { questionStep, reachableStep, type AnswerSheet, type QuestionStep } from './answer-sheet';

export type ChangeKind = 'ill' | 'late' | 'not-coming';

export type MorningView =
  | { kind: 'asking'; step: QuestionStep }
  | { kind: 'change'; change: ChangeKind }
  | { kind: 'changes' }
  | { kind: 'sending' }
  | { kind: 'saved'; waiting: WaitingAnswer }
  | { kind: 'refused'; refused: RefusedAnswer }
  | { kind: 'outcome'; outcome: MorningOutcome }
  | { kind: 'not-open' };

export interface MorningFacts {
  question: MorningQuestion;
  /** From the address: 'q1', 'w1', 'ill', 'late', 'not-coming', 'other' or nothing. */
  step: string | undefined;
  /** Open by the clinic's clock; the kept question may be older than its own opening. */
  isOpen: boolean;
  sheet: AnswerSheet;
  waiting: readonly WaitingAnswer[];
  isSending: boolean;
  /** The last attempt to send failed. */
  hasFailed: boolean;
  refused: RefusedAnswer | null;
  outcome: MorningOutcome | null;
}

const isChange = (step: string | undefined): step is ChangeKind =>
  step === 'ill' || step === 'late' || step === 'not-coming';

/**
 * The newest outcome known for the day: the one just received, unless somebody else of the household has answered
 * since.
 */
export function newestOutcome(
  question: MorningQuestion,
  received: ReceivedOutcome | null,
): MorningOutcome | null {
  const here = received?.on === question.on ? received.outcome : null;
  const there = question.outcome;
  if (here === null || there === null) return here ?? there;
  return Date.parse(there.receivedAt) > Date.parse(here.receivedAt) ? there : here;
}

/**
 * What the page shows. While anything waits on this phone no outcome is shown, whatever was said before: the clinic
 * may not know the newest answer.
 */
export function morningView(facts: MorningFacts): MorningView {
  const { question, step, sheet } = facts;
  const asked = questionStep(step, question.questions.length);
  if (asked && facts.isOpen) {
    return { kind: 'asking', step: reachableStep(asked, question.questions, sheet) };
  }
  if (isChange(step)) return { kind: 'change', change: step };
  if (step === 'other') return { kind: 'changes' };
  const waiting = facts.waiting.at(-1);
  if (waiting) {
    return facts.isSending && !facts.hasFailed ? { kind: 'sending' } : { kind: 'saved', waiting };
  }
  if (facts.refused?.waiting.request.on === question.on)
    return { kind: 'refused', refused: facts.refused };
  if (facts.outcome) return { kind: 'outcome', outcome: facts.outcome };
  return facts.isOpen && question.questions.length > 0
    ? { kind: 'asking', step: { kind: 'eaten', index: 0 } }
    : { kind: 'not-open' };
}
