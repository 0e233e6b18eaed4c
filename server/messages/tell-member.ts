import type { Transaction } from 'sequelize';
import type { Context } from '../context';
import { inShortAlphabet } from '../../shared/domain/message-segments';
import { afterQuietHours } from '../../shared/domain/quiet-hours';
import { raiseCall } from '../calls/calls';
import { announce } from '../live/announce';
import { enqueue } from '../outbox/enqueue';
import { siteOf, type Site } from '../sites/sites';
import { select } from '../database/connection';
import { canSpeak, loadWording, type WordingParams } from '../wording/render';
import { noting } from './draft-message';
import type { Recipient } from './recipients';
import { shownPhone } from './shown-phone';

export interface Telling {
  readonly kind: string;
  /** Wording keys begin with this: `<prefix>.text`, `<prefix>.subject`, `<prefix>.mail`. */
  readonly prefix: string;
  /** Beside clinic, phone and emergency, which every text has. */
  readonly params: WordingParams;
  /** Makes doubles impossible, together with the person and the channel. */
  readonly dedupe: string;
  /** Reason of the call when no message can go, or none arrives. */
  readonly callReason: string;
  readonly childId?: number | null;
  readonly morningOn?: string | null;
  /** Sent now, whatever the hour: it answers something this person has just done. */
  readonly isAnswer?: boolean;
  /** Cannot wait for 8 in the morning: goes before it to who agreed to early texts, and is a call for the rest. */
  readonly isUrgent?: boolean;
  /** A person tells it first to who does not read; this is that call's reason. */
  readonly personFirst?: string;
  readonly usefulForMs: number;
  /** The instant at which it is of no use any more, where that is earlier. */
  readonly lastUsefulAt?: number;
}

export interface ToldBy {
  readonly channels: ('sms' | 'mail')[];
  readonly callReason: string | null;
}

export async function siteOfHousehold(
  { db }: Context,
  householdId: number,
  transaction?: Transaction,
): Promise<Site> {
  const [row] = await select<{ site_id: number }>(
    db,
    'SELECT site_id FROM households WHERE id = :householdId',
    { householdId },
    transaction,
  );
  return siteOf(db, row?.site_id ?? 0, transaction);
}

/** What every text may say about its site. */
export const siteParams = (site: Site): Record<string, string> => ({
  clinic: site.shortName,
  phone: shownPhone(site.phone, site.country),
  emergency: site.emergencyNumber,
  door: site.door,
  address: site.address,
});

/**
 * Writes to one person by every channel agreed to, in a language that is signed off, outside the quiet hours; where
 * that cannot be, somebody calls.
 */
export async function tellMember(
  context: Context,
  transaction: Transaction,
  recipient: Recipient,
  telling: Telling,
): Promise<ToldBy> {
  const { db, clock } = context;
  const now = clock.now();
  const site = await siteOfHousehold(context, recipient.householdId, transaction);
  const raise = (reason: string): Promise<boolean> =>
    raiseCall(db, transaction, {
      reason,
      openKey: `${reason}:${telling.dedupe}:${recipient.familyMemberId}`,
      householdId: recipient.householdId,
      childId: telling.childId ?? null,
      familyMemberId: recipient.familyMemberId,
      isForClinician: false,
      urgentAt: now,
      now,
    });
  const call = async (callReason: string): Promise<ToldBy> => {
    await raise(callReason);
    return { channels: [], callReason };
  };
  if (recipient.readsHow === 'no' && telling.personFirst) await raise(telling.personFirst);
  if (!recipient.mayText && !recipient.mayMail) return call(telling.callReason);
  if (!canSpeak(recipient.language)) return call('language-not-signed');
  const wording = await loadWording(db, recipient.language, transaction);
  const textKeys = [`${telling.prefix}.text`];
  const mailKeys = [`${telling.prefix}.subject`, `${telling.prefix}.mail`];
  const textAt = telling.isAnswer
    ? now
    : afterQuietHours(now, site.zone, telling.isUrgent === true && recipient.mayTextEarly);
  const endsAt = telling.lastUsefulAt ?? Infinity;
  const textIsInTime = textAt < endsAt;
  const ways = [
    {
      channel: 'sms',
      address: recipient.mayText && textIsInTime ? recipient.phone : null,
      keys: textKeys,
      dueAt: textAt,
    },
    {
      channel: 'mail',
      address: recipient.mayMail ? recipient.email : null,
      keys: mailKeys,
      dueAt: now,
    },
  ] as const;
  const open = ways.filter(({ address }) => address !== null);
  if (open.length === 0) return call(telling.callReason);
  // An e-mail alone may be read too late.
  if (recipient.mayText && !textIsInTime) await raise(telling.callReason);
  if (!wording.isSignedOff(open.flatMap(({ keys }) => [...keys])))
    return call('language-not-signed');
  const params = { ...siteParams(site), ...telling.params };
  for (const [index, { channel, address, keys, dueAt }] of open.entries()) {
    const noted = noting(wording);
    const [subjectOrBody, body] = keys.map((key) => noted.text(key, params));
    await enqueue(db, transaction, {
      dedupeKey: `${telling.dedupe}:${recipient.familyMemberId}:${channel}`,
      kind: telling.kind,
      channel,
      householdId: recipient.householdId,
      familyMemberId: recipient.familyMemberId,
      address: address ?? '',
      language: recipient.language,
      isWithoutConsent: channel === 'sms' && recipient.isWithoutConsent && !telling.isAnswer,
      wordingVersions: wording.versions(noted.used()),
      subject: channel === 'mail' ? subjectOrBody : null,
      body: channel === 'mail' ? (body ?? '') : inShortAlphabet(subjectOrBody ?? ''),
      // One call for one person, also when text and e-mail both fail to arrive.
      callReason: index === 0 ? telling.callReason : null,
      morningOn: telling.morningOn ?? null,
      dueAt,
      lastUsefulAt: Math.min(dueAt + telling.usefulForMs, endsAt),
      createdAt: now,
    });
  }
  await announce(db, transaction, 'messages');
  return { channels: open.map(({ channel }) => channel), callReason: null };
}
