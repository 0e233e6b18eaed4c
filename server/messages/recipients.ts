import type { Sequelize, Transaction } from 'sequelize';
import type { PlannedRecipient } from '../../shared/domain/message-plan';
import { select } from '../database/connection';

/** An adult of a household and the ways by which this person agreed to be written to. */
export interface Recipient extends PlannedRecipient {
  readonly householdId: number;
  readonly fullName: string;
  readonly language: string;
  readonly seesResults: boolean;
  /** Agreed to hear of letters this way; else somebody tells of them. */
  readonly mayTextLetters: boolean;
  readonly mayMailLetters: boolean;
  /** Texts go without a recorded consent, within the limits for care texts (47 CFR 64.1200(a)(9)(iv)). */
  readonly isWithoutConsent: boolean;
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
  agrees_sms: 0 | 1;
  agrees_early: 0 | 1;
  agrees_sms_letters: 0 | 1;
  agrees_mail: 0 | 1;
  agrees_mail_letters: 0 | 1;
  needs_no_consent: 0 | 1;
  opted_out_sms: 0 | 1;
  opted_out_mail: 0 | 1;
}

/** A consent belongs to the number it was given for: another number is asked again. */
const consentTo = (channel: 'sms' | 'mail', address: 'phone' | 'email', more = ''): string =>
  `EXISTS (SELECT 1 FROM contact_consents consent WHERE consent.family_member_id = member.id
     AND consent.channel = '${channel}' AND consent.withdrawn_at IS NULL
     AND (consent.address IS NULL OR consent.address = member.${address}) ${more})`;
// An opt-out belongs to the number too: it holds for everybody who shares it and for every child.
const optedOut = (channel: 'sms' | 'mail', address: 'phone' | 'email'): string =>
  `EXISTS (SELECT 1 FROM opt_outs WHERE opt_outs.channel = '${channel}' AND opt_outs.address = member.${address}
     AND opt_outs.ended_at IS NULL)`;
/** A number that the family gave, where the site uses the exemption and nobody said no. */
const needsNoConsent = `(site.texts_without_consent AND NOT EXISTS (
  SELECT 1 FROM contact_consent_events event WHERE event.family_member_id = member.id
    AND event.channel = 'sms' AND event.event = 'withdrawn' AND event.purpose = 'visits'))`;

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
       ${consentTo('sms', 'phone')} AS agrees_sms,
       ${consentTo('sms', 'phone', 'AND consent.covers_early_morning')} AS agrees_early,
       ${consentTo('sms', 'phone', 'AND consent.covers_letters')} AS agrees_sms_letters,
       ${consentTo('mail', 'email')} AS agrees_mail,
       ${consentTo('mail', 'email', 'AND consent.covers_letters')} AS agrees_mail_letters,
       ${needsNoConsent} AS needs_no_consent,
       ${optedOut('sms', 'phone')} AS opted_out_sms, ${optedOut('mail', 'email')} AS opted_out_mail
     FROM family_members member JOIN child_family_members tie ON tie.family_member_id = member.id
     JOIN households ON households.id = member.household_id JOIN sites site ON site.id = households.site_id
     WHERE ${'householdId' in wanted ? 'member.household_id = :householdId' : 'member.id IN (:familyMemberIds)'}
     GROUP BY member.id ORDER BY is_guardian DESC, member.id`,
    { ...wanted },
    transaction,
  );
  return rows.map(recipientFrom);
}

function recipientFrom(row: RecipientRow): Recipient {
  const canText = row.phone !== null && row.opted_out_sms === 0;
  const canMail = row.email !== null && row.opted_out_mail === 0;
  const agreesToTexts = row.agrees_sms === 1;
  const isWithoutConsent = canText && !agreesToTexts && row.needs_no_consent === 1;
  return {
    familyMemberId: row.id,
    householdId: row.household_id,
    fullName: row.full_name,
    phone: row.phone,
    email: row.email,
    language: row.reads_language,
    readsHow: row.reads_how,
    isGuardian: Number(row.is_guardian) === 1,
    seesResults: Number(row.sees_results) === 1,
    mayText: canText && (agreesToTexts || isWithoutConsent),
    mayTextEarly: canText && row.agrees_early === 1,
    mayTextLetters: canText && row.agrees_sms_letters === 1,
    mayMail: canMail && row.agrees_mail === 1,
    mayMailLetters: canMail && row.agrees_mail_letters === 1,
    isWithoutConsent,
  };
}
