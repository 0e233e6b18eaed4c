import type { Transaction } from 'sequelize';
import type { Context } from '../context';
import { change, select } from '../database/connection';
import type { HouseholdNight } from '../fasting/household-night';
import type { NotedWording } from './draft-message';
import type { IncomingText } from './incoming-text';
import type { ReplySender } from './reply-sender';

/** 1, 2 and 3 keep their meaning: a family may still change its answer. */
const firstChoice = 4;
const lastChoice = 9;

const plannedOf = (night: HouseholdNight) =>
  night.children.filter(({ state }) => state === 'planned');

/**
 * Notes that this person is asked which child it was, once a morning.
 * @returns how the family calls the children, in the order of the digits; null where it is not asked.
 */
export async function askWhichChild(
  { db }: Context,
  transaction: Transaction,
  { text, sender }: { readonly text: IncomingText; readonly sender: ReplySender },
  night: HouseholdNight,
): Promise<string[] | null> {
  const children = plannedOf(night);
  // One more digit stands for all of them.
  if (children.length < 2 || firstChoice + children.length > lastChoice) return null;
  const asked = await change(
    db,
    `INSERT IGNORE INTO reply_questions (family_member_id, morning_on, morning_ids, asked_at)
     VALUES (:familyMemberId, :on, :morningIds, :at)`,
    {
      familyMemberId: sender.recipient.familyMemberId,
      on: night.on,
      morningIds: JSON.stringify(children.map(({ morningId }) => morningId)),
      at: new Date(text.receivedAt),
    },
    transaction,
  );
  return asked === 0 ? null : children.map(({ familyLabel }) => familyLabel);
}

export function choiceLines(noted: NotedWording, labels: readonly string[]): string {
  const number = (place: number): string => String(firstChoice + place);
  return [
    ...labels.map((label, place) =>
      noted.text('message.which-child.line', { number: number(place), label }),
    ),
    noted.text('message.which-child.all', { number: number(labels.length) }),
  ].join('\n');
}

/** The mornings that a digit chose, of the question that this person was asked; null when none was or the digit is none. */
export async function chosenMornings(
  { db }: Context,
  transaction: Transaction,
  sender: ReplySender,
  on: string,
  choice: number,
): Promise<{ readonly chosen: readonly number[]; readonly all: readonly number[] } | null> {
  const [row] = await select<{ morning_ids: number[] }>(
    db,
    `SELECT morning_ids FROM reply_questions WHERE family_member_id = :familyMemberId AND morning_on = :on`,
    { familyMemberId: sender.recipient.familyMemberId, on },
    transaction,
  );
  if (!row) return null;
  const all = row.morning_ids;
  const place = choice - firstChoice;
  if (place === all.length) return { chosen: all, all };
  const one = all[place];
  return one === undefined ? null : { chosen: [one], all };
}

export async function noteChoice(
  { db }: Context,
  transaction: Transaction,
  sender: ReplySender,
  on: string,
  at: number,
): Promise<void> {
  await change(
    db,
    `UPDATE reply_questions SET answered_at = :at WHERE family_member_id = :familyMemberId AND morning_on = :on`,
    { familyMemberId: sender.recipient.familyMemberId, on, at: new Date(at) },
    transaction,
  );
}
