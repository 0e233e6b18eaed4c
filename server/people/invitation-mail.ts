import { randomUUID } from 'node:crypto';
import type { Transaction } from 'sequelize';
import type { ClinicLanguage } from '../../shared/languages/clinic-languages';
import { languageOf } from '../../shared/languages/languages';
import type { Context } from '../context';
import { select } from '../database/connection';
import { enqueue } from '../outbox/enqueue';
import { renderText } from '../wording/render';
import { shippedWords } from '../wording/shipped-words';

export interface InvitedStaff {
  readonly staffId: number;
  readonly fullName: string;
  readonly email: string;
  readonly invitationLink: string;
  /** Of the one who invites; nobody knows yet which one the invited person would choose. */
  readonly language: ClinicLanguage;
}

const hour = 3_600_000;
const usefulHours = 72;

/** Queues the e-mail that carries a staff member's link. Words for staff are not signed off: no family reads them. */
export async function mailStaffInvitation(
  { db, clock, settings }: Pick<Context, 'db' | 'clock' | 'settings'>,
  transaction: Transaction,
  invited: InvitedStaff,
): Promise<void> {
  const [site] = await select<{ short_name: string }>(
    db,
    'SELECT short_name FROM sites ORDER BY id LIMIT 1',
    {},
    transaction,
  );
  const params = {
    clinic: site?.short_name ?? new URL(settings.origin).hostname,
    name: invited.fullName,
    hours: usefulHours,
    url: invited.invitationLink,
  };
  const { language } = invited;
  const words = shippedWords(language);
  const { intlTag } = languageOf(language);
  const say = (key: string): string => renderText(key, words[key] ?? '', intlTag, params);
  const now = clock.now();
  await enqueue(db, transaction, {
    dedupeKey: `staff-invitation:${invited.staffId}:${randomUUID()}`,
    kind: 'staff-invitation',
    channel: 'mail',
    householdId: null,
    familyMemberId: null,
    staffId: invited.staffId,
    address: invited.email,
    language,
    wordingVersions: {},
    subject: say('staff.invitation.subject'),
    body: say('staff.invitation.mail'),
    callReason: null,
    dueAt: now,
    lastUsefulAt: now + usefulHours * hour,
    createdAt: now,
  });
}
