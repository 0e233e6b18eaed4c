import type { Transaction } from 'sequelize';
import type { Context } from '../context';
import type { AlertKind } from '../../shared/contracts/alerts';
import { change, select } from '../database/connection';
import { announce } from '../live/announce';
import { enqueue } from '../outbox/enqueue';
import { channelHealth, type Channel } from '../outbox/health';
import { peopleToTell, type AlertPerson } from './alert-people';
import { alertWords } from './alert-words';

export type Surroundings = Pick<Context, 'db' | 'clock' | 'settings'>;

export interface AlertRow {
  id: number;
  kind: AlertKind;
  site_id: number;
  count: number;
  raised_at: Date;
  useful_until: Date;
  told_staff_id: number | null;
  passes_on_at: Date | null;
  taken_at: Date | null;
  taken_by_staff_id: number | null;
  ended_at: Date | null;
  site_name: string;
  short_name: string;
  zone: string;
  alert_wait_minutes: number;
}

const alertColumns = `alerts.*, sites.name AS site_name, sites.short_name, sites.zone, sites.alert_wait_minutes
  FROM alerts JOIN sites ON sites.id = alerts.site_id`;

async function alertOf(
  { db }: Surroundings,
  transaction: Transaction,
  id: number | undefined,
): Promise<AlertRow | undefined> {
  if (id === undefined) return undefined;
  const [alert] = await select<AlertRow>(
    db,
    `SELECT ${alertColumns} WHERE alerts.id = :id`,
    { id },
    transaction,
  );
  return alert;
}

type Condition = Readonly<Record<string, unknown>>;

/** The alert whose row is held until the end of the transaction. Its site's row stays free for others. */
export async function heldAlert(
  context: Surroundings,
  transaction: Transaction,
  condition: string,
  values: Condition,
): Promise<AlertRow | undefined> {
  const [row] = await select<{ id: number }>(
    context.db,
    `SELECT id FROM alerts WHERE ${condition} FOR UPDATE`,
    values,
    transaction,
  );
  return alertOf(context, transaction, row?.id);
}

/** The first such alert that nobody else holds. */
export async function freeAlert(
  context: Surroundings,
  transaction: Transaction,
  condition: string,
  values: Condition,
): Promise<AlertRow | undefined> {
  const [row] = await select<{ id: number }>(
    context.db,
    `SELECT id FROM alerts WHERE ${condition} ORDER BY id LIMIT 1 FOR UPDATE SKIP LOCKED`,
    values,
    transaction,
  );
  return alertOf(context, transaction, row?.id);
}

type AlertEvent = 'told' | 'not-taken' | 'undelivered' | 'passed-on' | 'taken' | 'nobody' | 'over';

/** So often each one is told at the most while nobody takes it; then it stands on the screens alone. */
const roundsAtMost = 3;
const minute = 60_000;

export async function keepEvent(
  { db, clock }: Surroundings,
  transaction: Transaction,
  alertId: number,
  event: AlertEvent,
  staffId: number | null,
): Promise<void> {
  await db.query(
    'INSERT INTO alert_events (alert_id, event, staff_id, at) VALUES (:alertId, :event, :staffId, :at)',
    { replacements: { alertId, event, staffId, at: new Date(clock.now()) }, transaction },
  );
  await announce(db, transaction, 'alerts', alertId);
}

/**
 * Tells the next one: who has been told least, in the order of the list. The caller holds the alert's row.
 * @param first who comes first whatever the order, such as a deputy to whom it was passed on.
 */
export async function tellNext(
  context: Surroundings,
  transaction: Transaction,
  alert: AlertRow,
  {
    first = [],
    not = [],
  }: { readonly first?: readonly number[]; readonly not?: readonly number[] } = {},
): Promise<void> {
  const { db, clock } = context;
  const now = clock.now();
  const site = { id: alert.site_id, zone: alert.zone };
  const all = await peopleToTell(db, site, now, transaction);
  const people = all.filter(({ id }) => !not.includes(id));
  const times = await timesTold(context, transaction, alert.id);
  const told = ({ id }: AlertPerson): number => times.get(id) ?? 0;
  const least = Math.min(...people.map(told));
  const next =
    first.flatMap((id) => people.find((one) => one.id === id) ?? [])[0] ??
    people.find((one) => told(one) === least);
  if (!next || told(next) >= roundsAtMost) {
    await moveOn(context, transaction, alert.id, { told: null, passesOnAt: null });
    await keepEvent(context, transaction, alert.id, 'nobody', null);
    return;
  }
  await queueFor(context, transaction, alert, next, told(next) + 1);
  await moveOn(context, transaction, alert.id, {
    told: next.id,
    passesOnAt: now + alert.alert_wait_minutes * minute,
  });
  await keepEvent(context, transaction, alert.id, 'told', next.id);
}

async function timesTold(
  { db }: Surroundings,
  transaction: Transaction,
  alertId: number,
): Promise<Map<number, number>> {
  const rows = await select<{ staff_id: number; times: number }>(
    db,
    `SELECT staff_id, COUNT(*) AS times FROM alert_events
     WHERE alert_id = :alertId AND event = 'told' GROUP BY staff_id`,
    { alertId },
    transaction,
  );
  return new Map(rows.map((row) => [row.staff_id, row.times]));
}

async function moveOn(
  { db }: Surroundings,
  transaction: Transaction,
  id: number,
  { told, passesOnAt }: { readonly told: number | null; readonly passesOnAt: number | null },
): Promise<void> {
  await change(
    db,
    'UPDATE alerts SET told_staff_id = COALESCE(:told, told_staff_id), passes_on_at = :at WHERE id = :id',
    { id, told, at: passesOnAt === null ? null : new Date(passesOnAt) },
    transaction,
  );
}

const channels = ['sms', 'mail'] as const;

/** By what they asked for; where that stands still, by the other way. */
function waysTo(person: AlertPerson, standsStill: ReadonlySet<Channel>): readonly Channel[] {
  const possible = channels.filter((channel) => addressOf(person, channel) !== null);
  const wanted = possible.filter((channel) => (channel === 'sms' ? person.byText : person.byMail));
  const first = wanted.length > 0 ? wanted : possible;
  const going = first.filter((channel) => !standsStill.has(channel));
  if (going.length > 0) return going;
  const others = possible.filter((channel) => !standsStill.has(channel));
  // Where both stand still, whichever recovers first carries it; the outside heartbeat is silent by then.
  return others.length > 0 ? others : possible;
}

export const addressOf = (person: AlertPerson, channel: Channel): string | null =>
  channel === 'sms' ? person.phone : person.email;

async function queueFor(
  context: Surroundings,
  transaction: Transaction,
  alert: AlertRow,
  person: AlertPerson,
  time: number,
): Promise<void> {
  const health = await channelHealth(context.db, context.clock.now(), transaction);
  const standsStill = new Set(
    channels.filter(
      (channel) => health[channel].lateMessageId !== null || health[channel].isRefused,
    ),
  );
  if (alert.kind === 'texts-stuck') standsStill.add('sms');
  if (alert.kind === 'mails-stuck') standsStill.add('mail');
  for (const channel of waysTo(person, standsStill))
    await queueAlert(context, transaction, alert, { person, channel, time });
}

/** @param time how often this person has been told of it, with this one; makes doubles impossible. */
export async function queueAlert(
  { db, clock, settings }: Surroundings,
  transaction: Transaction,
  alert: AlertRow,
  { person, channel, time }: { person: AlertPerson; channel: Channel; time: number },
): Promise<boolean> {
  const now = clock.now();
  const words = alertWords(settings.origin, person.language, {
    kind: alert.kind,
    siteShortName: alert.short_name,
    count: alert.count,
    waitMinutes: alert.alert_wait_minutes,
  });
  return enqueue(db, transaction, {
    dedupeKey: `${messageKeyOf(alert.id)}${person.id}:${time}:${channel}`,
    kind: 'alert',
    channel,
    householdId: null,
    familyMemberId: null,
    staffId: person.id,
    address: addressOf(person, channel) ?? '',
    language: person.language,
    wordingVersions: {},
    subject: channel === 'mail' ? words.subject : null,
    body: channel === 'mail' ? words.mail : words.text,
    callReason: alertUndelivered,
    dueAt: now,
    lastUsefulAt: alert.useful_until.getTime(),
    createdAt: now,
    goesFirst: true,
  });
}

/** What the sender says of an alert that it gave up: no call, but the other way or the next one. */
export const alertUndelivered = 'alert-undelivered';
export const messageKeyOf = (alertId: number): string => `alert:${alertId}:`;
