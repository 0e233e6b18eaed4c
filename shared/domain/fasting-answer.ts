/** The words of the fasting check: what a family answers, what it means, what the family is told. */
import type { Explanation } from './explanation';
import type { FastingPlan } from './fasting-plan';
import type { Item } from './fasting-protocol';
import type { Instant } from './day';

export type FastingAnswerKind = 'nothing' | 'sip' | 'feed' | 'unsure';

export interface FastingAnswer {
  readonly kind: FastingAnswerKind;
  /** What was last taken, where the family said so; otherwise everything that it can have been. */
  readonly item?: Item;
  readonly lastIntakeAt?: Instant;
  /** The last meal or feed, where it is known besides a sip: hunger goes on from there. */
  readonly lastMealAt?: Instant;
  /** Both readings of a wall-clock time that occurred twice or never. */
  readonly readings?: { readonly earlier: Instant; readonly later: Instant };
}

export interface DawnPhone {
  readonly answersFrom: Instant;
  readonly answersUntil: Instant;
}

export interface FastingCheckRequest {
  readonly answer: FastingAnswer;
  readonly plan: FastingPlan;
  readonly now: Instant;
  readonly arrivalAt: Instant;
  readonly likelyCollectionAt: Instant;
  readonly dawnPhone: DawnPhone | null;
  /** When the clinic promises to call back; by default when its telephone opens, if still ahead. */
  readonly weCallBy?: Instant | null;
  readonly lastRoomStartAt: Instant | null;
  readonly laboratoryCutOffAt: Instant | null;
}

export type FastingVerdict = 'long-enough' | 'not-long-enough' | 'cannot-tell';

export type FastingOutcome =
  | 'come'
  | 'come-and-wait'
  | 'call-us'
  | 'come-nurse-decides'
  | 'stay-we-call'
  | 'feed-now-and-call';

export type ExplainKey =
  | 'nothing-since-the-stop'
  | 'long-enough-at-arrival'
  | 'ready-after-arrival'
  | 'time-not-known'
  | 'not-sure'
  | 'a-sip'
  | 'item-not-known'
  | 'contradictory'
  | 'clock-change-two-readings'
  | 'longest-fast-would-pass'
  | 'after-last-room-start'
  | 'after-laboratory-cut-off'
  | 'individual-plan'
  | 'nobody-answers-the-phone';

export interface FastedMinutes {
  readonly now: number;
  readonly atArrival: number;
  readonly atCollection: number;
}

export interface FastingCheck {
  readonly ok: true;
  readonly verdict: FastingVerdict;
  /** When the least hours are over, by the later reading; null when the time is not known. */
  readonly readyAt: Instant | null;
  /** By the later reading. */
  readonly fastedMinutes: FastedMinutes | null;
  readonly outcome: FastingOutcome;
  /** Set with come-and-wait. */
  readonly waitUntil: Instant | null;
  /** Set with stay-we-call, and with feed-now-and-call while nobody answers yet. */
  readonly weCallBy: Instant | null;
  readonly phoneAnswers: boolean;
  readonly explain: readonly ExplainKey[];
  readonly explanation: Explanation;
}

export type FastingCheckError = 'intake-in-the-future' | 'intake-too-long-ago';
export type FastingCheckResult =
  FastingCheck | { readonly ok: false; readonly error: FastingCheckError };
