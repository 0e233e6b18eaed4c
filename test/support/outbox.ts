import pino from 'pino';
import type { Sequelize } from 'sequelize';
import { openMailChannel, type MailChannel } from '../../server/channels/mail/mail-channel';
import { openSmsChannel, type SmsChannel } from '../../server/channels/sms/sms-channel';
import type { Settings } from '../../server/config/settings';
import { connect, inTransaction, select } from '../../server/database/connection';
import { enqueue, type OutgoingMessage } from '../../server/outbox/enqueue';
import type { GivenUpMessage } from '../../server/outbox/give-up';
import { createSender, type Sender, type SenderParts } from '../../server/outbox/sender';
import { startStandIns, type StandIns } from '../../server/stand-ins/start-stand-ins';
import { migratedTestDatabase, type MigratedTestDatabase } from './database';
import { testSettings } from './server';

export interface MessageRow {
  id: number;
  state: string;
  attempts: number;
  provider_id: string | null;
  segments: number | null;
  failure_code: string | null;
  next_try_at: Date;
}

export interface OutboxBench {
  readonly db: Sequelize;
  readonly database: MigratedTestDatabase;
  readonly standIns: StandIns;
  readonly settings: Settings;
  readonly givenUp: GivenUpMessage[];
  /** Business clock, epoch milliseconds; add to it to let time pass. */
  now: number;
  queue(message?: Partial<OutgoingMessage>): Promise<void>;
  sender(parts?: Partial<SenderParts>): Sender;
  row(dedupeKey: string): Promise<MessageRow>;
  rows(): Promise<MessageRow[]>;
  textsTo(phone: string): string[];
  close(): Promise<void>;
}

export const account = { sid: `AC${'0'.repeat(32)}`, token: '1'.repeat(32), from: '+12065550100' };
export const familyPhone = '+12065550142';
const hour = 3_600_000;

/** A real database, the real libraries and the pretended services: everything a sender needs. */
export async function openOutboxBench({
  origin = () => 'http://127.0.0.1:9',
}: { origin?: () => string } = {}): Promise<OutboxBench> {
  const database = await migratedTestDatabase();
  const db = connect(database.url, { poolSize: 12 });
  const channels: MailChannel[] = [];
  const standIns = await startStandIns({
    account,
    origin,
    ports: { sms: 0, mail: 0, control: 0 },
    now: () => Promise.resolve(bench.now),
    file: null,
    reportPauseMs: 5,
  });
  const plain = testSettings(database.url);
  const settings: Settings = {
    ...plain,
    origin: origin(),
    sms: { ...plain.sms, standInUrl: standIns.smsUrl },
    mail: { ...plain.mail, url: standIns.mailUrl },
    standInControlUrl: standIns.controlUrl,
  };
  const givenUp: GivenUpMessage[] = [];
  const bench: OutboxBench = {
    db,
    database,
    standIns,
    settings,
    givenUp,
    now: Date.UTC(2027, 3, 12, 18),
    queue: async (message = {}) => {
      const whole: OutgoingMessage = {
        dedupeKey: `test:${Math.random()}`,
        kind: 'evening',
        channel: 'sms',
        householdId: 1,
        familyMemberId: 1,
        address: familyPhone,
        language: 'en',
        wordingVersions: {},
        subject: message.channel === 'mail' ? 'Visit tomorrow' : null,
        body: 'Visit tomorrow. Open the page for the plan of the night.',
        callReason: 'evening-text-failed',
        morningOn: '2027-04-13',
        dueAt: bench.now,
        lastUsefulAt: bench.now + 4 * hour,
        createdAt: bench.now,
        ...message,
      };
      await inTransaction(db, (transaction) => enqueue(db, transaction, whole));
    },
    sender: (parts = {}) => {
      const mail = openMailChannel(settings);
      channels.push(mail);
      const sms: SmsChannel = openSmsChannel(settings);
      return createSender({
        db,
        clock: { now: () => bench.now, refresh: () => Promise.resolve() },
        log: pino({ level: 'silent' }),
        sms,
        mail,
        giveUp: (_transaction, message) => {
          givenUp.push(message);
          return Promise.resolve();
        },
        perSecond: { sms: 500, mail: 500 },
        ...parts,
      });
    },
    row: async (dedupeKey) => {
      const [row] = await select<MessageRow>(
        db,
        'SELECT * FROM messages WHERE dedupe_key = :dedupeKey',
        { dedupeKey },
      );
      if (!row) throw new Error(`No message ${dedupeKey}`);
      return row;
    },
    rows: () => select<MessageRow>(db, 'SELECT * FROM messages ORDER BY id'),
    textsTo: (phone) =>
      standIns.store.texts
        .filter((text) => text.direction === 'out' && text.phone === phone)
        .map((text) => text.body),
    close: async () => {
      for (const mail of channels) mail.close();
      await standIns.close();
      await db.close();
    },
  };
  return bench;
}

/** Waits until the condition holds; fails with the words after 10 seconds. */
export async function until(
  says: string,
  condition: () => boolean | Promise<boolean>,
): Promise<void> {
  const giveUpAt = Date.now() + 10_000;
  while (!(await condition())) {
    if (Date.now() > giveUpAt) throw new Error(`Waited in vain until ${says}`);
    await new Promise((resolve) => setTimeout(resolve, 20));
  }
}
