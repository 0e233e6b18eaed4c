import type { Transaction } from 'sequelize';
import type { Context } from '../context';
import { select } from '../database/connection';
import { recipientsOf, type Recipient } from './recipients';
import { tellMember } from './tell-member';

/** Until the reminder of an unread letter takes over. */
const usefulForMs = 48 * 3_600_000;

/**
 * Tells everybody for whom a letter was released that it waits. The message names nothing of what is in it; the page asks
 * for a code first.
 */
export async function tellLetterWaits(
  context: Context,
  transaction: Transaction,
  letterId: number,
): Promise<void> {
  const { db, settings } = context;
  const rows = await select<{ family_member_id: number; child_id: number }>(
    db,
    `SELECT recipient.family_member_id, letter.child_id FROM letter_recipients recipient
     JOIN letters letter ON letter.id = recipient.letter_id WHERE letter.id = :letterId`,
    { letterId },
    transaction,
  );
  const familyMemberIds = rows.map((row) => row.family_member_id);
  for (const recipient of await recipientsOf(db, { familyMemberIds }, transaction))
    await tellMember(context, transaction, forLetters(recipient), {
      kind: 'letter-waits',
      prefix: 'message.letter-waits',
      params: { url: `${settings.origin}/${recipient.language}/letters` },
      dedupe: `letter-waits:${letterId}`,
      callReason: 'letter-notice-failed',
      personFirst: 'letter-by-person',
      childId: rows[0]?.child_id ?? null,
      usefulForMs,
    });
}

/** The same person as far as letters were agreed to. */
export const forLetters = (recipient: Recipient): Recipient => ({
  ...recipient,
  mayText: recipient.mayTextLetters,
  mayMail: recipient.mayMailLetters,
});
