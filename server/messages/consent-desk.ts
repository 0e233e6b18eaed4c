import type { Transaction } from 'sequelize';
import type { z } from 'zod';
import type {
  AgreedAt,
  ContactConsents,
  setContactConsentsRequest,
} from '../../shared/contracts/contact-consents';
import { isLanguageId } from '../../shared/languages/languages';
import { record, type Actor } from '../access-record/record';
import type { StaffMember } from '../auth/current-user';
import { childInReach } from '../children/reach';
import type { Context } from '../context';
import { inTransaction, select } from '../database/connection';
import { notFound, Problem } from '../http/problem';
import { announce } from '../live/announce';
import { clinicWording, clinicWords, type ClinicWords } from '../wording/clinic-words';
import { canSpeak, loadWording } from '../wording/render';
import {
  agreedPurposes,
  consentHistory,
  setConsents,
  type ConsentChannel,
  type ConsentPurpose,
} from './contact-consents';
import { planComingNights } from './plan-coming-nights';
import { siteOfHousehold, siteParams } from './tell-member';
import { withdrawWaitingFor } from './withdraw-waiting';

interface MemberRow {
  id: number;
  full_name: string;
  phone: string | null;
  email: string | null;
  reads_language: string;
  household_id: number;
  child_id: number;
  child_name: string;
}

/** @throws Problem 404 for somebody of no child within reach, the same as for nobody. */
async function memberInReach(
  { db }: Context,
  staff: StaffMember,
  familyMemberId: number,
  transaction?: Transaction,
): Promise<MemberRow> {
  const rows = await select<MemberRow>(
    db,
    `SELECT member.id, member.full_name, member.phone, member.email, member.reads_language, member.household_id,
       child.id AS child_id, child.full_name AS child_name
     FROM family_members member JOIN child_family_members tie ON tie.family_member_id = member.id
     JOIN children child ON child.id = tie.child_id
     WHERE member.id = :familyMemberId ORDER BY child.id`,
    { familyMemberId },
    transaction,
  );
  const [first] = rows;
  if (!first) throw notFound('This family member');
  await childInReach(db, staff, first.child_id, transaction).catch(() => {
    throw notFound('This family member');
  });
  return first;
}

/** What this person agreed to, by which words staff ask, and everything that was said before. */
export async function consentsOf(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  familyMemberId: number,
): Promise<ContactConsents> {
  const { db, clock } = context;
  const member = await memberInReach(context, staff, familyMemberId);
  await record(db, undefined, actor, {
    action: 'seen',
    matter: 'contact-consents',
    childIds: [member.child_id],
    detail: { familyMemberId },
    at: clock.now(),
  });
  const words = clinicWords(staff.language);
  const history = await consentHistory(db, familyMemberId);
  const optOuts = await optOutsOf(context, member);
  const said = history.map((event) => ({
    at: event.at.toISOString(),
    says: words.text(`clinic.consent.${event.event}`, {
      purpose: words.text(`clinic.consent.purpose.${event.purpose}.${event.channel}`),
      address: event.address,
      how: howSays(words, event.how),
      wording: event.wordingVersion,
    }),
    by: event.recordedBy,
  }));
  return {
    familyMember: {
      id: member.id,
      fullName: member.full_name,
      childId: member.child_id,
      childName: member.child_name,
      language: member.reads_language,
    },
    ways: await waysOf(context, member),
    asked: await askedOf(context, staff, member),
    history: [...said, ...optOuts.map((row) => optOutSays(words, row))]
      .flat()
      .sort((one, other) => other.at.localeCompare(one.at)),
  };
}

const howSays = (words: ClinicWords, how: string): string =>
  ['in-person', 'by-telephone', 'on-paper'].includes(how)
    ? words.text(`clinic.consent.how.${how}`)
    : words.text('clinic.consent.how.by-staff');

interface OptOutRow {
  channel: ConsentChannel;
  address: string;
  said: string;
  since_at: Date;
  ended_at: Date | null;
}

function optOutsOf({ db }: Context, { phone, email }: MemberRow): Promise<OptOutRow[]> {
  return select<OptOutRow>(
    db,
    `SELECT channel, address, said, since_at, ended_at FROM opt_outs
     WHERE (channel = 'sms' AND address = :phone) OR (channel = 'mail' AND address = :email)
     ORDER BY id DESC LIMIT 50`,
    { phone, email },
  );
}

function optOutSays(words: ClinicWords, row: OptOutRow): ContactConsents['history'] {
  const { address, said } = row;
  const out = { at: row.since_at.toISOString(), by: null };
  const says = words.text('clinic.consent.opted-out', { address, said });
  if (row.ended_at === null) return [{ ...out, says }];
  const back = words.text('clinic.consent.opted-in', { address });
  return [
    { ...out, says },
    { at: row.ended_at.toISOString(), says: back, by: null },
  ];
}

async function waysOf(context: Context, member: MemberRow): Promise<AgreedAt[]> {
  const ways: AgreedAt[] = [];
  for (const [channel, address] of [
    ['sms', member.phone],
    ['mail', member.email],
  ] as const) {
    if (address === null) continue;
    const at = { familyMemberId: member.id, channel, address };
    const purposes = await agreedPurposes(context.db, undefined, at);
    const optOuts = await optOutsOf(context, member);
    ways.push({
      channel,
      address,
      visits: purposes.has('visits'),
      letters: purposes.has('letters'),
      earlyMorning: purposes.has('early-morning'),
      hasOptedOut: optOuts.some((row) => row.channel === channel && row.ended_at === null),
    });
  }
  return ways;
}

const askKeys = { sms: 'consent.ask.sms', mail: 'consent.ask.mail' } as const;

async function askedOf(
  context: Context,
  staff: StaffMember,
  member: MemberRow,
): Promise<ContactConsents['asked']> {
  const site = siteParams(await siteOfHousehold(context, member.household_id));
  const own = await clinicWording(context.db, staff.language);
  const { reads_language: language } = member;
  const family = canSpeak(language) ? await loadWording(context.db, language) : null;
  return (['sms', 'mail'] as const).map((channel) => ({
    channel,
    says: own.text(askKeys[channel], site),
    saysInFamilyLanguage: family?.isSignedOff([askKeys[channel]])
      ? family.text(askKeys[channel], site)
      : null,
  }));
}

/** Which text was read out, for the record: in the family's language where it is signed off, else by an interpreter. */
async function wordingAsked(
  { db }: Context,
  transaction: Transaction,
  { reads_language: reads }: MemberRow,
  staff: StaffMember,
  channel: ConsentChannel,
): Promise<{ readonly language: string; readonly wordingVersion: string }> {
  const key = askKeys[channel];
  const own = canSpeak(reads) ? await loadWording(db, reads, transaction) : null;
  const language = own?.isSignedOff([key]) && isLanguageId(reads) ? reads : staff.language;
  const wording = language === reads && own ? own : await loadWording(db, language, transaction);
  return { language, wordingVersion: `${key} ${wording.version(key)}` };
}

/**
 * Records what a person said when asked: for one number and each purpose, with who asked, how and in which words. A no
 * works at once: what waits is taken back and the coming nights are planned again.
 * @throws Problem 404 out of reach, 409 when the number is not this person's any more.
 */
export async function recordConsents(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  familyMemberId: number,
  request: z.output<typeof setContactConsentsRequest>,
): Promise<ContactConsents> {
  const { db, clock } = context;
  const now = clock.now();
  const { channel, address, how } = request;
  await inTransaction(db, async (transaction) => {
    // Two people who ask at once come one after the other, and the history has each answer once.
    await select(
      db,
      'SELECT id FROM family_members WHERE id = :familyMemberId FOR UPDATE',
      { familyMemberId },
      transaction,
    );
    const member = await memberInReach(context, staff, familyMemberId, transaction);
    if (address !== (channel === 'sms' ? member.phone : member.email))
      throw new Problem(409, 'another-number', 'This number was changed. Ask about the new one.');
    const wanted = new Set<ConsentPurpose>();
    if (request.visits) wanted.add('visits');
    if (request.letters) wanted.add('letters');
    if (request.earlyMorning) wanted.add('early-morning');
    const asked = await wordingAsked(context, transaction, member, staff, channel);
    const said = { familyMemberId, channel, address, how, ...asked, staffId: staff.id, at: now };
    const isChanged = await setConsents(db, transaction, said, wanted);
    if (!isChanged) return;
    if (!request.letters)
      await withdrawWaitingFor(context, transaction, {
        channel,
        address,
        familyMemberId,
        what: request.visits ? 'letters' : 'everything',
      });
    await planComingNights(context, transaction, member.household_id);
    await record(db, transaction, actor, {
      action: 'changed',
      matter: 'contact-consents',
      childIds: [member.child_id],
      detail: { familyMemberId, channel, purposes: [...wanted], how },
      at: now,
    });
    await announce(db, transaction, 'children', member.child_id);
    await announce(db, transaction, 'messages');
  });
  return consentsOf(context, actor, staff, familyMemberId);
}
