import type { Sequelize, Transaction } from 'sequelize';
import type { OutcomeKind } from '../../shared/contracts/family-morning';
import type { Day, Instant } from '../../shared/domain/day';
import { closeCalls, raiseCall } from '../calls/calls';
import { notAnsweredKey } from '../calls/unanswered-calls';

interface HouseholdDay {
  readonly householdId: number;
  readonly on: Day;
}

const reasons = [
  'call-us',
  'stay-we-call',
  'said-feed',
  'not-sure',
  'feed-now-and-call',
  'late',
  'ill',
  'emergency',
  'not-coming',
] as const;
type Reason = (typeof reasons)[number];

const keyOf = (reason: Reason, { householdId, on }: HouseholdDay): string =>
  `${reason}:${householdId}:${on}`;

/** The family is here or has answered: nobody has to ask any more. */
export function closeUnansweredCall(
  db: Sequelize,
  transaction: Transaction,
  { householdId, on }: HouseholdDay,
  now: Instant,
): Promise<number> {
  return closeCalls(db, transaction, [notAnsweredKey(householdId, on)], { now });
}

/** The call that an outcome asks for; null when the family comes and nothing is open. */
export function callReasonFor(kind: OutcomeKind, isNotSure: boolean): Reason | null {
  switch (kind) {
    case 'call-us':
    case 'stay-we-call':
    case 'feed-now-and-call':
    case 'emergency':
    case 'not-coming':
      return kind;
    case 'food-first':
      return 'ill';
    case 'come-nurse-decides':
      return isNotSure ? 'not-sure' : 'said-feed';
    case 'come':
    case 'come-and-wait':
    case 'late-noted':
      return null;
  }
}

export interface CallOfOutcome extends HouseholdDay {
  readonly kind: OutcomeKind;
  readonly isNotSure: boolean;
  readonly childId: number;
  readonly morningId: number;
  readonly familyMemberId: number | null;
  readonly detail: string;
  /** When the family was promised a call. */
  readonly weCallBy: Instant | null;
  readonly now: Instant;
}

/** Puts the call on the list that the newest answer asks for, and takes off those of earlier answers. */
export async function keepCallsInStep(
  db: Sequelize,
  transaction: Transaction,
  call: CallOfOutcome,
): Promise<void> {
  const reason = callReasonFor(call.kind, call.isNotSure);
  const needless = reasons.filter((other) => other !== reason).map((other) => keyOf(other, call));
  // A new time alone does not say what the child ate.
  const asked = call.kind === 'late-noted' ? [] : [notAnsweredKey(call.householdId, call.on)];
  await closeCalls(db, transaction, [...needless, ...asked], { now: call.now });
  if (reason === null) return;
  await raiseCall(db, transaction, {
    reason,
    openKey: keyOf(reason, call),
    householdId: call.householdId,
    childId: call.childId,
    morningId: call.morningId,
    familyMemberId: call.familyMemberId,
    detail: call.detail,
    isForClinician: call.kind === 'emergency',
    urgentAt: call.weCallBy ?? call.now,
    now: call.now,
  });
}
