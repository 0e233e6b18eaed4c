import type { Transaction } from 'sequelize';
import { inShortAlphabet } from '../../shared/domain/message-segments';
import type { Context } from '../context';
import { enqueue } from '../outbox/enqueue';
import { canSpeak, loadWording, type WordingParams } from '../wording/render';
import { noting, type NotedWording } from './draft-message';
import type { IncomingText } from './incoming-text';
import type { ReplySender } from './reply-sender';
import { siteOfHousehold, siteParams } from './tell-member';

/** Older than this an answer to a text only puzzles. */
const usefulForMs = 30 * 60_000;

export interface AnswerToText {
  readonly text: IncomingText;
  readonly sender: ReplySender;
  readonly key: string;
  readonly params?: WordingParams;
  /** Lines of the answer, written from wording of their own. */
  readonly lines?: (noted: NotedWording) => string;
  /** Rendered first and handed to the answer as `todo`. */
  readonly todoKey?: string;
  /** 'opt-out-confirmation' may go to a number that has just opted out; nothing else may. */
  readonly kind?: 'reply' | 'opt-out-confirmation';
}

/**
 * Answers a text at once, whatever the hour: this person has just written. Without a signed-off wording nothing is written;
 * what has to be told is on the call list already.
 */
export async function sendAnswer(
  context: Context,
  transaction: Transaction,
  { text, sender, key, params = {}, lines, todoKey, kind = 'reply' }: AnswerToText,
): Promise<void> {
  const { db } = context;
  const { recipient } = sender;
  if (!canSpeak(recipient.language)) return;
  if (!recipient.mayText && kind !== 'opt-out-confirmation') return;
  const noted = noting(await loadWording(db, recipient.language, transaction));
  if (!noted.wording.has(key)) return;
  const site = await siteOfHousehold(context, recipient.householdId, transaction);
  const all = { ...siteParams(site), ...params };
  const todo = todoKey === undefined ? {} : { todo: noted.text(todoKey, all) };
  const body = inShortAlphabet(
    noted.text(key, { ...all, ...todo, ...(lines && { lines: lines(noted) }) }),
  );
  if (!noted.wording.isSignedOff(noted.used())) return;
  await enqueue(db, transaction, {
    dedupeKey: `${kind}:${text.providerId}`,
    kind,
    channel: 'sms',
    householdId: recipient.householdId,
    familyMemberId: recipient.familyMemberId,
    address: text.from,
    language: recipient.language,
    wordingVersions: noted.wording.versions(noted.used()),
    body,
    callReason: null,
    morningOn: null,
    dueAt: text.receivedAt,
    lastUsefulAt: text.receivedAt + usefulForMs,
    createdAt: text.receivedAt,
  });
}
