import type { LetterDesk } from '../../shared/contracts/letters';
import type { Precondition } from '../../shared/domain/letter-choice';
import type { Wording } from '../wording/render';
import type { Choices, LetterCase } from './letter-case';

interface ConditionsRequest {
  readonly one: LetterCase;
  readonly choices: Choices;
  readonly now: number;
  readonly today: string;
  readonly unsigned: readonly string[];
  readonly wording: Wording;
}

/**
 * Whether the clinician's choice about the medicines is complete: a start or a decision needs its day, and a letter that
 * says that the child has tuberculosis cannot say that no medicine is needed.
 */
function areMedicinesStated(
  { medicines, medicinesOn }: Choices,
  today: string,
  isPositive: boolean,
): boolean {
  if (medicines === null || (isPositive && medicines === 'none-now')) return false;
  if (medicines === 'keep-giving' || medicines === 'none-now') return true;
  return medicinesOn !== null && medicinesOn >= today;
}

const fields: Partial<Record<Precondition, string>> = {
  'medicines-stated': 'medicines',
  'next-visit-set': 'nextVisitAt',
};

/** What must have happened before this letter can be signed, met or not. */
export function letterConditions(request: ConditionsRequest): LetterDesk['conditions'] {
  const { one, choices, now, today, unsigned, wording } = request;
  const isMet: Record<Precondition, () => boolean> = {
    'call-about-positive': () => one.hasToldDanger,
    'call-about-critical': () => one.hasToldDanger,
    'second-look': () => !one.series.hasOpenSecondLook,
    'medicines-stated': () => areMedicinesStated(choices, today, one.choice.positive),
    'next-visit-set': () => choices.nextVisitAt !== null && Date.parse(choices.nextVisitAt) > now,
    'decide-on-missing-morning': () => false,
    'reason-for-closing-early': () => one.series.closeReason !== null,
  };
  return [
    ...one.choice.mustHaveHappened.map((key) => ({
      key,
      says: wording.text(`letter.condition.${key}`),
      isMet: isMet[key](),
      field: fields[key] ?? null,
    })),
    {
      key: 'wording-signed-off',
      says: wording.text('letter.condition.wording-signed-off'),
      isMet: one.recipients.length > 0 && unsigned.length === 0,
      field: null,
    },
  ];
}
