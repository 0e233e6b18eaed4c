import { record, type Actor } from '../access-record/record';
import type { FamilyVisitor, StaffMember } from '../auth/current-user';
import { childInReach } from '../children/reach';
import type { Context } from '../context';
import { select } from '../database/connection';
import { notFound } from '../http/problem';
import { shownPhone } from '../messages/shown-phone';
import { letterPage } from './letter-page';
import type { LetterBody } from './sign-letter';

interface PrintRow {
  readonly child_id: number;
  readonly language: string;
  readonly body: LetterBody;
  readonly recipient: string;
  readonly site_name: string;
  readonly address: string;
  readonly country: string;
  readonly phone: string;
}

const printColumns = `letters.child_id, letter_recipients.language, letter_recipients.body,
  family_members.full_name AS recipient, sites.name AS site_name, sites.address, sites.country, sites.phone
  FROM letters JOIN letter_recipients ON letter_recipients.letter_id = letters.id
    JOIN family_members ON family_members.id = letter_recipients.family_member_id
    JOIN series ON series.id = letters.series_id JOIN sites ON sites.id = series.site_id`;

async function printRow(
  context: Context,
  actor: Actor,
  row: PrintRow,
  letterId: number,
): Promise<Buffer> {
  await record(context.db, undefined, actor, {
    action: 'seen',
    matter: 'letter-pdf',
    childIds: [row.child_id],
    detail: { letterId },
    at: context.clock.now(),
  });
  return context.printer.print(
    letterPage({
      body: row.body,
      language: row.language,
      recipient: row.recipient,
      letterhead: [row.site_name, row.address, shownPhone(row.phone, row.country)],
    }),
  );
}

/** The letter of the first recipient as PDF, for the clinic. @throws Problem 404, 503 'no-printer'. */
export async function printLetterForClinic(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  letterId: number,
): Promise<Buffer> {
  const [row] = await select<PrintRow>(
    context.db,
    `SELECT ${printColumns} WHERE letters.id = :letterId AND series.site_id = :siteId
     ORDER BY letter_recipients.family_member_id LIMIT 1`,
    { letterId, siteId: staff.siteId },
  );
  if (!row) throw notFound('This letter');
  await childInReach(context.db, staff, row.child_id).catch(() => {
    throw notFound('This letter');
  });
  return printRow(context, actor, row, letterId);
}

/** A family member's own released letter as PDF. @throws Problem 404, 503 'no-printer'. */
export async function printLetterForFamily(
  context: Context,
  actor: Actor,
  visitor: FamilyVisitor,
  letterId: number,
): Promise<Buffer> {
  const [row] = await select<PrintRow>(
    context.db,
    `SELECT ${printColumns}
       JOIN child_family_members ON child_family_members.child_id = letters.child_id
         AND child_family_members.family_member_id = letter_recipients.family_member_id
     WHERE letters.id = :letterId AND letters.state = 'released'
       AND letter_recipients.family_member_id = :familyMemberId
       AND child_family_members.sees_results = TRUE AND child_family_members.standing = 'guardian'`,
    { letterId, familyMemberId: visitor.familyMemberId },
  );
  if (!row) throw notFound('This letter');
  return printRow(context, actor, row, letterId);
}
