import type { LinkDescription } from '../../../../shared/contracts/family-session';
import type { FamilyFailure } from '../../../common/api/family/family-failure';

const byCode: Record<string, LinkDescription['state'] | 'wrong-date' | undefined> = {
  'birth-date-wrong': 'wrong-date',
  'link-expired': 'expired',
  'link-used': 'used',
  'link-locked': 'locked',
  'link-unknown': 'unknown',
};

/** What a refusal says about the link; null when it is about something else (no signal, too often, a fault). */
export function linkState(failure: FamilyFailure): LinkDescription['state'] | 'wrong-date' | null {
  return failure.kind === 'refused' || failure.kind === 'signed-out'
    ? (byCode[failure.code] ?? null)
    : null;
}
