import type { Sequelize, Transaction } from 'sequelize';
import { select } from '../database/connection';

/** An adult of a household and the ways by which this person agreed to be written to. */
export interface Recipient {
  readonly familyMemberId: number;
  readonly householdId: number;
  readonly fullName: string;
  readonly phone: string | null;
  readonly email: string | null;
  readonly language: string;
  readonly readsHow: 'well' | 'little' | 'no';
  readonly isGuardian: boolean;
  readonly seesResults: boolean;
  /** Agreed to texts and has not opted out. */
  readonly mayText: boolean;
  /** Agreed to texts before 8 in the morning as well. */
  readonly mayTextEarly: boolean;
  readonly mayMail: boolean;
}

interface RecipientRow {
  id: number;
  household_id: number;
  full_name: string;
  phone: string | null;
  email: string | null;
  reads_language: string;
  reads_how: Recipient['readsHow'];
  is_guardian: 0 | 1;
  sees_results: 0 | 1;
  may_text: 0 | 1;
  may_text_early: 0 | 1;
  may_mail: 0 | 1;
}

const consentTo = (channel: 'sms' | 'mail', more = ''): string =>
  `EXISTS (SELECT 1 FROM contact_consents consent WHERE consent.family_member_id = member.id
     AND consent.channel = '${channel}' AND consent.withdrawn_at IS NULL ${more})`;
// An opt-out belongs to the number: it holds for everybody who shares it and for every child.
const optedOut = (channel: 'sms' | 'mail', address: string): string =>
  `EXISTS (SELECT 1 FROM opt_outs WHERE opt_outs.channel = '${channel}' AND opt_outs.address = member.${address}
     AND opt_outs.ended_at IS NULL)`;

/** The adults of a household, guardians first, or only those named. */
export async function recipientsOf(
  db: Sequelize,
  wanted: { readonly householdId: number } | { readonly familyMemberIds: readonly number[] },
  transaction?: Transaction,
): Promise<Recipient[]> {
  if ('familyMemberIds' in wanted && wanted.familyMemberIds.length === 0) return [];
  const rows = await select<RecipientRow>(
    db,
    `SELECT member.id, member.household_id, member.full_name, member.phone, member.email, member.reads_language,
       member.reads_how,
       MAX(tie.standing = 'guardian') AS is_guardian, MAX(tie.sees_results) AS sees_results,
       (member.phone IS NOT NULL AND ${consentTo('sms')} AND NOT ${optedOut('sms', 'phone')}) AS may_text,
       (member.phone IS NOT NULL AND ${consentTo('sms', 'AND consent.covers_early_morning')}
         AND NOT ${optedOut('sms', 'phone')}) AS may_text_early,
       (member.email IS NOT NULL AND ${consentTo('mail')} AND NOT ${optedOut('mail', 'email')}) AS may_mail
     FROM family_members member JOIN child_family_members tie ON tie.family_member_id = member.id
     WHERE ${'householdId' in wanted ? 'member.household_id = :householdId' : 'member.id IN (:familyMemberIds)'}
     GROUP BY member.id ORDER BY is_guardian DESC, member.id`,
    { ...wanted },
    transaction,
  );
  return rows.map((row) => ({
    familyMemberId: row.id,
    householdId: row.household_id,
    fullName: row.full_name,
    phone: row.phone,
    email: row.email,
    language: row.reads_language,
    readsHow: row.reads_how,
    isGuardian: Number(row.is_guardian) === 1,
    seesResults: Number(row.sees_results) === 1,
    mayText: row.may_text === 1,
    mayTextEarly: row.may_text_early === 1,
    mayMail: row.may_mail === 1,
  }));
}

const canBeReached = ({ mayText, mayMail }: Recipient): boolean => mayText || mayMail;

/**
 * Who hears about a night or a morning: the people named for it, and where nobody is named or can be written to, the
 * first adult who can be, texts before e-mail and guardians before helpers. One person a moment, unless several are named.
 */
export function chosenFor(
  named: readonly (number | null)[],
  household: readonly Recipient[],
): Recipient[] {
  const those = household.filter(
    (recipient) => named.includes(recipient.familyMemberId) && canBeReached(recipient),
  );
  if (those.length > 0) return those;
  const first =
    household.find((recipient) => recipient.mayText) ??
    household.find((recipient) => recipient.mayMail);
  return first ? [first] : [];
}
