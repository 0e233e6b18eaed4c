import type { Transaction } from 'sequelize';
import { raiseCall } from '../calls/calls';
import type { Context } from '../context';
import type { FamilyLink } from './links';

/** A person calls a family whose link locked: it may be a mistaken birth date, or somebody else with the link. */
export async function callAboutLockedLink(
  { db, clock }: Context,
  transaction: Transaction,
  link: FamilyLink,
): Promise<void> {
  const now = clock.now();
  await raiseCall(db, transaction, {
    reason: 'link-locked',
    openKey: `link-locked:${link.id}`,
    householdId: link.householdId,
    familyMemberId: link.familyMemberId,
    isForClinician: false,
    urgentAt: now,
    now,
  });
}
