import type { LetterList } from '../../shared/contracts/letters';
import { record, type Actor } from '../access-record/record';
import type { StaffMember } from '../auth/current-user';
import { withinReach } from '../children/reach';
import type { Context } from '../context';
import { select } from '../database/connection';
import { clinicWording } from '../wording/clinic-words';
import { letterCaseOf } from './letter-case';

interface LetterRow {
  readonly id: number;
  readonly series_id: number;
  readonly kind: string;
  readonly state: 'signed' | 'released';
  readonly signed_at: Date;
  readonly released_at: Date | null;
}

interface RecipientRow {
  readonly letter_id: number;
  readonly full_name: string;
  readonly first_opened_at: Date | null;
}

type Item = LetterList['letters'][number];

async function writtenLetters(
  context: Context,
  siteId: number,
): Promise<{ letters: LetterRow[]; recipients: RecipientRow[] }> {
  const letters = await select<LetterRow>(
    context.db,
    `SELECT letters.id, letters.series_id, letters.kind, letters.state, letters.signed_at, letters.released_at
     FROM letters JOIN series ON series.id = letters.series_id
     WHERE series.site_id = :siteId AND letters.state <> 'withdrawn' ORDER BY letters.id DESC LIMIT 200`,
    { siteId },
  );
  if (letters.length === 0) return { letters, recipients: [] };
  const recipients = await select<RecipientRow>(
    context.db,
    `SELECT letter_recipients.letter_id, family_members.full_name, letter_recipients.first_opened_at
     FROM letter_recipients JOIN family_members ON family_members.id = letter_recipients.family_member_id
     WHERE letter_recipients.letter_id IN (:ids)`,
    { ids: letters.map((letter) => letter.id) },
  );
  return { letters, recipients };
}

/** Letters to write, to release, released and read or not. */
export async function listLetters(
  context: Context,
  actor: Actor,
  staff: StaffMember,
): Promise<LetterList> {
  const wording = await clinicWording(context.db, staff.language);
  const says = (letter: string): string => wording.text(`letter.says.${letter}`);
  const reach = withinReach(staff);
  const open = await select<{ id: number; child_id: number; full_name: string }>(
    context.db,
    `SELECT DISTINCT series.id, series.child_id, children.full_name
     FROM series JOIN specimens ON specimens.series_id = series.id JOIN children ON children.id = series.child_id
       JOIN households ON households.id = children.household_id
     WHERE series.site_id = :siteId AND ${reach.sql} ORDER BY series.id`,
    { ...reach.replacements, siteId: staff.siteId },
  );
  const { letters, recipients } = await writtenLetters(context, staff.siteId);
  const items: Item[] = [];
  for (const series of open) {
    const written = letters.filter((letter) => letter.series_id === series.id);
    for (const letter of written)
      items.push({
        id: letter.id,
        seriesId: series.id,
        childId: series.child_id,
        childName: series.full_name,
        letter: letter.kind,
        letterSays: says(letter.kind),
        state: letter.state,
        signedAt: letter.signed_at.toISOString(),
        releasedAt: letter.released_at?.toISOString() ?? null,
        openedBy: recipients
          .filter((to) => to.letter_id === letter.id)
          .map((to) => ({
            fullName: to.full_name,
            openedAt: to.first_opened_at?.toISOString() ?? null,
          })),
      });
    const one = await letterCaseOf(context.db, staff.siteId, series.id);
    const newest = Math.max(0, ...(one?.series.rows.map((row) => row.entered_at.getTime()) ?? []));
    const isAnswered = written.some((letter) => letter.signed_at.getTime() >= newest);
    if (!one || isAnswered) continue;
    items.unshift({
      id: null,
      seriesId: series.id,
      childId: series.child_id,
      childName: series.full_name,
      letter: one.choice.letter,
      letterSays: says(one.choice.letter),
      state: one.choice.letter === 'still-waiting' ? 'not-yet' : 'to-write',
      signedAt: null,
      releasedAt: null,
      openedBy: [],
    });
  }
  const order: Record<Item['state'], number> = {
    'to-write': 0,
    signed: 1,
    released: 2,
    'not-yet': 3,
  };
  items.sort((a, b) => order[a.state] - order[b.state]);
  await record(context.db, undefined, actor, {
    action: 'seen',
    matter: 'letters',
    childIds: items.map((item) => item.childId),
    at: context.clock.now(),
  });
  return { letters: items };
}
