import type { Sequelize, Transaction } from 'sequelize';
import { can, isRole } from '../../shared/access/rights';
import type { FamilyMember as FamilyMemberAnswer } from '../../shared/contracts/children';
import { record, type Actor } from '../access-record/record';
import type { StaffMember } from '../auth/current-user';
import type { Context } from '../context';
import { inTransaction, select } from '../database/connection';
import { invalid, Problem } from '../http/problem';
import { announce } from '../live/announce';
import { agreedPurposes, setConsents, type ConsentPurpose } from '../messages/contact-consents';
import { planComingNights } from '../messages/plan-coming-nights';
import { siteOf } from '../sites/sites';
import { checkedFamilyMember, type FamilyMemberDetails } from './contact-details';
import { ChildFamilyMember, FamilyMember } from './family-member-model';
import { childInReach, type ReachedChild } from './reach';

/** How consents to being written to were asked; the sentence that staff read out, by version. */
const consentAsked = { how: 'asked by staff', wordingVersion: 'contact-consent 1' } as const;

/** Adds an adult to a child. One whom the household has already, by the same name and number, is not doubled. */
export async function addFamilyMember(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  childId: number,
  details: FamilyMemberDetails,
): Promise<void> {
  const { db, clock } = context;
  const now = clock.now();
  await inTransaction(db, async (transaction) => {
    const child = await childInReach(db, staff, childId, transaction);
    const site = await siteOf(db, child.siteId, transaction);
    const { member, errors } = checkedFamilyMember(details, site.country);
    if (errors.length > 0) throw invalid(errors);
    await refuseStanding(transaction, staff, child, member);
    const familyMemberId = await linkFamilyMember(transaction, {
      childId,
      householdId: child.householdId,
      staffId: staff.id,
      member,
      now,
    });
    await planComingNights(context, transaction, child.householdId);
    const detail = { familyMemberId };
    await record(db, transaction, actor, {
      action: 'changed',
      matter: 'family-members',
      childIds: [childId],
      detail,
      at: now,
    });
    await announce(db, transaction, 'children', childId);
  });
}

/**
 * Who keeps contact details adds helpers and changes nobody's standing: whoever is a guardian, consents or sees results
 * is for those to say who keep the child's record. Else a number added at the front desk could read the letters.
 * @throws Problem 403 'standing-is-decided'
 */
async function refuseStanding(
  transaction: Transaction,
  staff: StaffMember,
  child: ReachedChild,
  member: FamilyMemberDetails,
): Promise<void> {
  if (can(staff.roles.filter(isRole), 'children.write')) return;
  const familyMemberId = await knownMemberId(transaction, child.householdId, member);
  const tie =
    familyMemberId === null
      ? null
      : await ChildFamilyMember.findOne({
          where: { childId: child.id, familyMemberId },
          transaction,
        });
  const isSame = tie
    ? tie.standing === member.standing &&
      tie.mayConsent === member.mayConsent &&
      tie.seesResults === member.seesResults
    : member.standing === 'helper';
  if (isSame) return;
  const message = 'The nurse or the clinician says who is a guardian and who sees results.';
  throw new Problem(403, 'standing-is-decided', message, {
    errors: [{ path: 'standing', message }],
  });
}

export interface NewFamilyMember {
  readonly childId: number;
  readonly householdId: number;
  readonly staffId: number;
  readonly member: FamilyMemberDetails;
  readonly now: number;
}

/** @returns the id of the family member, known or new. */
export async function linkFamilyMember(
  transaction: Transaction,
  { childId, householdId, staffId, member, now }: NewFamilyMember,
): Promise<number> {
  const familyMemberId =
    (await knownMemberId(transaction, householdId, member)) ??
    (
      await FamilyMember.create(
        {
          householdId,
          fullName: member.fullName,
          phone: member.phone,
          email: member.email,
          readsLanguage: member.readsLanguage,
          readsHow: member.readsHow,
          speaksLanguage: member.speaksLanguage,
          needsInterpreter: member.needsInterpreter,
          createdAt: new Date(now),
        },
        { transaction },
      )
    ).id;
  await ChildFamilyMember.upsert(
    {
      childId,
      familyMemberId,
      standing: member.standing,
      relationship: member.relationship,
      legalBasis: member.legalBasis,
      mayConsent: member.standing === 'guardian' && member.mayConsent,
      seesResults: member.standing === 'guardian' && member.seesResults,
    },
    { transaction },
  );
  await writeContactConsents(transaction, { familyMemberId, member, staffId, now });
  return familyMemberId;
}

/** Whether this adult can consent for the child; null when it is not one of the child's adults. */
export async function mayConsentFor(
  childId: number,
  familyMemberId: number,
): Promise<boolean | null> {
  const tie = await ChildFamilyMember.findOne({ where: { childId, familyMemberId } });
  return tie && tie.standing === 'guardian' && tie.mayConsent;
}

/** A shared phone alone does not make two people one: the name counts too. */
async function knownMemberId(
  transaction: Transaction,
  householdId: number,
  { fullName, phone, email }: FamilyMemberDetails,
): Promise<number | null> {
  const sameName = await FamilyMember.findAll({ where: { householdId, fullName }, transaction });
  const known = sameName.find(
    (member) =>
      (phone !== null && member.phone === phone) || (email !== null && member.email === email),
  );
  return known?.id ?? null;
}

async function writeContactConsents(
  transaction: Transaction,
  consents: {
    familyMemberId: number;
    member: FamilyMemberDetails;
    staffId: number | null;
    now: number;
  },
): Promise<void> {
  const { familyMemberId, member, staffId, now } = consents;
  const db = FamilyMember.sequelize;
  if (!db) throw new Error('The models are not open');
  const add = async (
    channel: 'sms' | 'mail',
    address: string | null,
    more: readonly ConsentPurpose[],
  ): Promise<void> => {
    if (address === null) return;
    const said = {
      ...{ familyMemberId, channel, address, staffId, ...consentAsked },
      language: member.readsLanguage,
      at: now,
    };
    // What was agreed to before is not taken back by a form that adds another child.
    const before = await agreedPurposes(db, transaction, said);
    await setConsents(db, transaction, said, new Set([...before, 'visits', 'letters', ...more]));
  };
  if (member.agreesToTexts)
    await add('sms', member.phone, member.agreesToEarlyTexts ? ['early-morning'] : []);
  if (member.agreesToMail) await add('mail', member.email, []);
}

type FamilyMemberRow = Omit<
  FamilyMemberAnswer,
  | 'mayConsent'
  | 'seesResults'
  | 'needsInterpreter'
  | 'agreesToTexts'
  | 'agreesToEarlyTexts'
  | 'agreesToMail'
  | 'hasOptedOut'
> & {
  mayConsent: 0 | 1;
  seesResults: 0 | 1;
  needsInterpreter: 0 | 1;
  agreesToTexts: 0 | 1;
  agreesToEarlyTexts: 0 | 1;
  agreesToMail: 0 | 1;
  hasOptedOut: 0 | 1;
};

/** The adults of one child, guardians first. */
export async function familyMembersOf(
  db: Sequelize,
  childId: number,
): Promise<FamilyMemberAnswer[]> {
  const agrees = (channel: string, early = ''): string =>
    `EXISTS (SELECT 1 FROM contact_consents consent WHERE consent.family_member_id = member.id
       AND consent.channel = '${channel}' AND consent.withdrawn_at IS NULL ${early})`;
  const rows = await select<FamilyMemberRow>(
    db,
    `SELECT member.id, member.full_name AS fullName, tie.standing, tie.relationship,
       tie.legal_basis AS legalBasis, tie.may_consent AS mayConsent, tie.sees_results AS seesResults,
       member.phone, member.email, member.reads_language AS readsLanguage, member.reads_how AS readsHow,
       member.speaks_language AS speaksLanguage, member.needs_interpreter AS needsInterpreter,
       ${agrees('sms')} AS agreesToTexts,
       ${agrees('sms', 'AND consent.covers_early_morning')} AS agreesToEarlyTexts,
       ${agrees('mail')} AS agreesToMail,
       EXISTS (SELECT 1 FROM opt_outs WHERE opt_outs.ended_at IS NULL AND (
         (opt_outs.channel = 'sms' AND opt_outs.address = member.phone) OR
         (opt_outs.channel = 'mail' AND opt_outs.address = member.email))) AS hasOptedOut,
       CASE
         WHEN EXISTS (SELECT 1 FROM family_links link WHERE link.family_member_id = member.id
           AND link.kind = 'invitation' AND link.used_at IS NOT NULL) THEN 'used'
         WHEN EXISTS (SELECT 1 FROM family_links link WHERE link.family_member_id = member.id
           AND link.kind = 'invitation') THEN 'sent'
         ELSE 'none' END AS invitation
     FROM child_family_members tie JOIN family_members member ON member.id = tie.family_member_id
     WHERE tie.child_id = :childId
     ORDER BY tie.standing, member.id`,
    { childId },
  );
  return rows.map((row) => ({
    ...row,
    mayConsent: row.mayConsent === 1,
    seesResults: row.seesResults === 1,
    needsInterpreter: row.needsInterpreter === 1,
    agreesToTexts: row.agreesToTexts === 1,
    agreesToEarlyTexts: row.agreesToEarlyTexts === 1,
    agreesToMail: row.agreesToMail === 1,
    hasOptedOut: row.hasOptedOut === 1,
  }));
}
