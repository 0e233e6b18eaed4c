import type { RehearsalReplyRequest, RehearsalState } from '../../shared/contracts/rehearsal';
import type { Actor } from '../access-record/record';
import { recordViewOnce } from '../access-record/record-view-once';
import type { StaffMember } from '../auth/current-user';
import type { Context } from '../context';
import { select } from '../database/connection';
import { notFound, Problem } from '../http/problem';
import { clinicWords } from '../wording/clinic-words';
import { momentsOf, plannedDays } from './moments';
import type { StandInClient, StandInState } from './stand-in-client';

interface Person {
  readonly id: number;
  readonly fullName: string;
  readonly phone: string | null;
  readonly email: string | null;
}

interface Tie {
  readonly familyMemberId: number;
  readonly childId: number;
  readonly callMe: string;
  readonly relationship: string;
}

/** The phones and mailboxes of the demo families and what the pretended services delivered to them. */
export async function rehearsalState(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  standIns: StandInClient,
): Promise<RehearsalState> {
  const { db, clock } = context;
  await clock.refresh();
  const now = clock.now();
  const [held, people, colleagues, ties, days] = await Promise.all([
    standIns.state(),
    select<Person>(
      db,
      'SELECT id, full_name AS fullName, phone, email FROM family_members ORDER BY id',
    ),
    select<Person>(db, 'SELECT id, full_name AS fullName, phone, email FROM staff ORDER BY id'),
    select<Tie>(
      db,
      `SELECT t.family_member_id AS familyMemberId, t.child_id AS childId, c.call_me AS callMe, t.relationship
       FROM child_family_members t JOIN children c ON c.id = t.child_id ORDER BY c.born_on, c.id`,
    ),
    plannedDays(db, now),
  ]);
  const childIds = [...new Set(ties.map((tie) => tie.childId))];
  await recordViewOnce(context, actor, { matter: 'rehearsal', childIds, at: now });
  return {
    now: new Date(now).toISOString(),
    offsetMinutes: Math.round((now - Date.now()) / 60_000),
    moments: momentsOf(days, now, clinicWords(staff.language)),
    phones: phonesOf(people, ties, held),
    mailboxes: [
      ...mailboxesOf(people, held),
      // A member of staff has a mailbox once something came, such as the invitation to sign in.
      ...mailboxesOf(colleagues, held).filter(({ mails }) => mails.length > 0),
    ],
  };
}

function phonesOf(
  people: readonly Person[],
  ties: readonly Tie[],
  held: StandInState,
): RehearsalState['phones'] {
  return people.flatMap((person) => {
    const { phone } = person;
    if (phone === null) return [];
    const own = ties.filter((tie) => tie.familyMemberId === person.id);
    return {
      phone,
      name: person.fullName,
      relationship: own[0]?.relationship ?? '',
      children: own.map((tie) => tie.callMe),
      texts: held.texts
        .filter((text) => text.phone === phone)
        .map(({ id, direction, at, body, status }) => ({
          id,
          direction,
          at: new Date(at).toISOString(),
          body,
          status,
        })),
    };
  });
}

function mailboxesOf(people: readonly Person[], held: StandInState): RehearsalState['mailboxes'] {
  return people.flatMap(({ email, fullName }) => {
    if (email === null) return [];
    const seen = new Set<string>();
    return {
      email,
      name: fullName,
      mails: held.mails
        // A mail that was sent again under the same Message-ID is one mail, as in any mailbox.
        .filter((mail) => {
          if (mail.to.toLowerCase() !== email.toLowerCase() || seen.has(mail.messageId))
            return false;
          seen.add(mail.messageId);
          return true;
        })
        .map(({ id, at, subject, body, attachments }) => ({
          id,
          at: new Date(at).toISOString(),
          subject,
          body,
          attachments: attachments.map((attachment) => ({ ...attachment })),
        })),
    };
  });
}

/** A text from a demo family's phone, as if somebody had typed it there. */
export async function replyFromPhone(
  context: Context,
  standIns: StandInClient,
  { phone, body }: RehearsalReplyRequest,
): Promise<{ done: true }> {
  const [known] = await select(
    context.db,
    'SELECT id FROM family_members WHERE phone = :phone LIMIT 1',
    { phone },
  );
  if (!known) throw notFound('This phone');
  const isTaken = await standIns.reply(phone, body);
  if (!isTaken)
    throw new Problem(502, 'reply-not-taken', 'The clinic did not take this text. Try again.');
  return { done: true };
}
