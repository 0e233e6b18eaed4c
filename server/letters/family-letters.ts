import type { FamilyLetter, FamilyLetterList } from '../../shared/contracts/family-letters';
import { dayOf } from '../../shared/domain/zone';
import { familyDay, familyTime } from '../../shared/languages/family-time';
import { record, type Actor } from '../access-record/record';
import type { FamilyVisitor } from '../auth/current-user';
import type { Context } from '../context';
import { change, inTransaction, select } from '../database/connection';
import { notFound } from '../http/problem';
import { announce } from '../live/announce';
import { loadWording, type Wording } from '../wording/render';
import { letterCaseOf } from './letter-case';
import type { LetterBody } from './sign-letter';

/** Only a guardian who may see results at this moment, and only what was released to this person. */
const mayRead = `letters.state = 'released' AND letter_recipients.family_member_id = :familyMemberId
  AND child_family_members.standing = 'guardian' AND child_family_members.sees_results = TRUE`;
const joined = `letters JOIN letter_recipients ON letter_recipients.letter_id = letters.id
  JOIN child_family_members ON child_family_members.child_id = letters.child_id
    AND child_family_members.family_member_id = letter_recipients.family_member_id
  JOIN series ON series.id = letters.series_id JOIN sites ON sites.id = series.site_id`;

async function stillWaiting(
  context: Context,
  visitor: FamilyVisitor,
  wording: Wording,
): Promise<{ childIds: number[]; waiting: FamilyLetterList['waiting'] }> {
  const series = await select<{ id: number; child_id: number; site_id: number; call_me: string }>(
    context.db,
    `SELECT series.id, series.child_id, series.site_id, children.call_me
     FROM series JOIN children ON children.id = series.child_id
       JOIN child_family_members ON child_family_members.child_id = children.id
     WHERE child_family_members.family_member_id = :familyMemberId AND child_family_members.standing = 'guardian'
       AND child_family_members.sees_results = TRUE AND series.state <> 'closed'
       AND NOT EXISTS (SELECT 1 FROM letters WHERE letters.series_id = series.id AND letters.is_final = TRUE
         AND letters.state = 'released')
     ORDER BY children.born_on DESC`,
    { familyMemberId: visitor.familyMemberId },
  );
  const waiting: FamilyLetterList['waiting'] = [];
  for (const { id, site_id, call_me } of series) {
    const one = await letterCaseOf(context.db, site_id, id);
    if (!one) continue;
    const by = one.facts.lastAnswerOn;
    waiting.push({
      title: wording.text('letter.list.waiting-title', { name: call_me }),
      says:
        by === null
          ? wording.text('letter.list.waiting-no-date')
          : wording.text('letter.list.waiting', { day: familyDay(by, wording.profile).text }),
    });
  }
  return { childIds: series.map(({ child_id }) => child_id), waiting };
}

export async function listFamilyLetters(
  context: Context,
  actor: Actor,
  visitor: FamilyVisitor,
): Promise<FamilyLetterList> {
  const wording = await loadWording(context.db, visitor.language);
  const rows = await select<{
    id: number;
    child_id: number;
    body: LetterBody;
    released_at: Date;
    first_opened_at: Date | null;
  }>(
    context.db,
    `SELECT letters.id, letters.child_id, letter_recipients.body, letters.released_at, letter_recipients.first_opened_at
     FROM ${joined} WHERE ${mayRead} ORDER BY letters.released_at DESC`,
    { familyMemberId: visitor.familyMemberId },
  );
  const { childIds, waiting } = await stillWaiting(context, visitor, wording);
  await record(context.db, undefined, actor, {
    action: 'seen',
    matter: 'family-letters',
    childIds: [...new Set([...rows.map((row) => row.child_id), ...childIds])],
    at: context.clock.now(),
  });
  return {
    letters: rows.map((row) => ({
      id: row.id,
      title: row.body.title,
      dateSays: row.body.dateSays,
      releasedAt: row.released_at.toISOString(),
      isNew: row.first_opened_at === null,
    })),
    waiting,
  };
}

/** Opens a letter; that it was opened, and when, is kept and seen by the clinic. @throws Problem 404. */
export async function openFamilyLetter(
  context: Context,
  actor: Actor,
  visitor: FamilyVisitor,
  letterId: number,
): Promise<FamilyLetter> {
  const now = context.clock.now();
  const wording = await loadWording(context.db, visitor.language);
  return inTransaction(context.db, async (transaction) => {
    const [row] = await select<{ child_id: number; body: LetterBody; zone: string }>(
      context.db,
      `SELECT letters.child_id, letter_recipients.body, sites.zone FROM ${joined}
       WHERE ${mayRead} AND letters.id = :letterId`,
      { familyMemberId: visitor.familyMemberId, letterId },
      transaction,
    );
    if (!row) throw notFound('This letter');
    await change(
      context.db,
      `UPDATE letter_recipients SET first_opened_at = COALESCE(first_opened_at, :now), last_opened_at = :now
       WHERE letter_id = :letterId AND family_member_id = :familyMemberId`,
      { now: new Date(now), letterId, familyMemberId: visitor.familyMemberId },
      transaction,
    );
    await record(context.db, transaction, actor, {
      action: 'seen',
      matter: 'letter-opened',
      childIds: [row.child_id],
      detail: { letterId },
      at: now,
    });
    await announce(context.db, transaction, 'letters', letterId);
    const opened = familyTime(now, row.zone, wording.profile);
    return {
      id: letterId,
      title: row.body.title,
      clinicName: row.body.clinicName,
      dateSays: row.body.dateSays,
      paragraphs: row.body.paragraphs.map((part) => ({ ...part })),
      openedSays: wording.text('letter.opened', {
        dayText: familyDay(dayOf(now, row.zone), wording.profile).text,
        time: opened.time,
      }),
    };
  });
}
