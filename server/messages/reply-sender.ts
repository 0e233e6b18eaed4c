import type { Sequelize, Transaction } from 'sequelize';
import { select } from '../database/connection';
import { morningPlansOf, type MorningPlan } from '../series/morning-plans';
import { recipientsOf, type Recipient } from './recipients';

/** Who wrote, and the night that an answer can be about. */
export interface ReplySender {
  readonly recipient: Recipient;
  /** The household's next planned mornings of one day, or those of today; empty when nothing is near. */
  readonly plans: readonly MorningPlan[];
}

/** A reply is about a morning within this time, or about one whose arrival is past by less. */
const aheadMs = 36 * 3_600_000;
const behindMs = 4 * 3_600_000;

/**
 * The family member of a number. Several people, even of several households, may share a phone: the one whose household
 * waits for an answer comes first.
 */
export async function senderOf(
  db: Sequelize,
  from: string,
  now: number,
  transaction: Transaction,
): Promise<ReplySender | null> {
  const members = await select<{ id: number }>(
    db,
    'SELECT id FROM family_members WHERE phone = :from ORDER BY id',
    { from },
    transaction,
  );
  const recipients = await recipientsOf(
    db,
    { familyMemberIds: members.map(({ id }) => id) },
    transaction,
  );
  const senders: ReplySender[] = [];
  for (const recipient of recipients) {
    const all = await morningPlansOf(db, { householdId: recipient.householdId }, transaction);
    const near = all.filter(
      ({ state, arrivalAt }) =>
        (state === 'planned' || state === 'here') &&
        arrivalAt > now - behindMs &&
        arrivalAt < now + aheadMs,
    );
    senders.push({ recipient, plans: near.filter(({ on }) => on === near[0]?.on) });
  }
  return (
    senders.find(({ plans }) => isAsked(plans, now)) ?? senders.find(hasPlans) ?? senders[0] ?? null
  );
}

const hasPlans = ({ plans }: ReplySender): boolean => plans.length > 0;
const isAsked = (plans: readonly MorningPlan[], now: number): boolean =>
  plans.some(({ state, arrivalAt }) => state === 'planned' && arrivalAt > now);
