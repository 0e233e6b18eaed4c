import type { Sequelize, Transaction } from 'sequelize';
import { messageSegments } from '../../shared/domain/message-segments';
import { select } from '../database/connection';
import type { ClaimedMessage } from './claimed-message';

/**
 * Care texts to a number without a recorded consent: 160 characters, one a day, three in a week
 * (47 CFR 64.1200(a)(9)(iv); FCC 20-186).
 */
const mostADay = 1;
const mostAWeek = 3;
const dayMs = 86_400_000;

/** @param before messages of the same claim, taken a moment earlier. */
export async function exceedsCareLimit(
  db: Sequelize,
  transaction: Transaction,
  message: ClaimedMessage,
  before: readonly ClaimedMessage[],
  now: number,
): Promise<boolean> {
  if (message.isWithoutConsent === 0) return false;
  if (messageSegments(message.body).segments > 1) return true;
  const isSame = (other: ClaimedMessage): boolean =>
    other.address === message.address && other.isWithoutConsent === 1;
  const claimed = before.filter(isSame).length;
  const [row] = await select<{ day: number; week: number }>(
    db,
    `SELECT COUNT(CASE WHEN sent_at > :dayAgo OR state = 'sending' THEN 1 END) AS day, COUNT(*) AS week FROM messages
     WHERE address = :address AND is_without_consent AND id <> :id
       AND (sent_at > :weekAgo OR state = 'sending')`,
    {
      address: message.address,
      id: message.id,
      dayAgo: new Date(now - dayMs),
      weekAgo: new Date(now - 7 * dayMs),
    },
    transaction,
  );
  return (row?.day ?? 0) + claimed >= mostADay || (row?.week ?? 0) + claimed >= mostAWeek;
}
