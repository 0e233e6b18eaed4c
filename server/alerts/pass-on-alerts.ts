import type { Transaction } from 'sequelize';
import { change, inTransaction, select } from '../database/connection';
import {
  addressOf,
  freeAlert,
  heldAlert,
  keepEvent,
  messageKeyOf,
  queueAlert,
  tellNext,
  type Surroundings,
} from './tell-alert';
import { activeStaff } from './alert-people';

/**
 * Alerts that nobody took in time go to the next one; those whose time has passed end. By the business clock, as
 * everything that families and staff wait for.
 * @returns how many were passed on.
 */
export async function passOnAlerts(context: Surroundings): Promise<number> {
  await endPastAlerts(context);
  const now = new Date(context.clock.now());
  let passed = 0;
  for (;;) {
    const isDone = await inTransaction(context.db, async (transaction) => {
      const alert = await freeAlert(
        context,
        transaction,
        'passes_on_at <= :now AND taken_at IS NULL AND ended_at IS NULL',
        { now },
      );
      if (!alert) return true;
      await keepEvent(context, transaction, alert.id, 'not-taken', alert.told_staff_id);
      await tellNext(context, transaction, alert);
      return false;
    });
    if (isDone) return passed;
    passed += 1;
  }
}

/** What was taken, or is of no use any more, leaves the list; a critical one that nobody took stays until somebody does. */
async function endPastAlerts(context: Surroundings): Promise<void> {
  const now = new Date(context.clock.now());
  for (;;) {
    const isDone = await inTransaction(context.db, async (transaction) => {
      const alert = await freeAlert(
        context,
        transaction,
        `ended_at IS NULL AND useful_until <= :now AND (taken_at IS NOT NULL OR kind <> 'critical-result')`,
        { now },
      );
      if (!alert) return true;
      await endAlert(context, transaction, alert.id);
      return false;
    });
    if (isDone) return;
  }
}

export async function endAlert(
  context: Surroundings,
  transaction: Transaction,
  id: number,
): Promise<void> {
  await change(
    context.db,
    'UPDATE alerts SET ended_at = :now, passes_on_at = NULL WHERE id = :id AND ended_at IS NULL',
    { id, now: new Date(context.clock.now()) },
    transaction,
  );
  await withdrawMessages(context, transaction, id);
  await keepEvent(context, transaction, id, 'over', null);
}

/** What has not gone out need not: somebody looks after it, or it is over. */
export async function withdrawMessages(
  { db, clock }: Surroundings,
  transaction: Transaction,
  alertId: number,
): Promise<void> {
  await change(
    db,
    `UPDATE messages SET state = 'withdrawn', ended_at = :now
     WHERE dedupe_key LIKE :like AND state = 'queued'`,
    { like: `${messageKeyOf(alertId)}%`, now: new Date(clock.now()) },
    transaction,
  );
}

/** An alert that the sender gave up: the same person by the other way, or else the next one at once. */
export async function alertInstead(
  context: Surroundings,
  transaction: Transaction,
  message: {
    readonly id: number;
    readonly channel: 'sms' | 'mail';
    readonly staffId: number | null;
  },
): Promise<void> {
  const { db, clock } = context;
  const [row] = await select<{ dedupe_key: string }>(
    db,
    'SELECT dedupe_key FROM messages WHERE id = :id',
    { id: message.id },
    transaction,
  );
  const [, alertId, staffId, time] = row?.dedupe_key.split(':').map(Number) ?? [];
  const alert = await heldAlert(
    context,
    transaction,
    'id = :alertId AND taken_at IS NULL AND ended_at IS NULL',
    { alertId },
  );
  if (!alert || time === undefined || clock.now() > alert.useful_until.getTime()) return;
  await keepEvent(context, transaction, alert.id, 'undelivered', message.staffId);
  const other = message.channel === 'sms' ? 'mail' : 'sms';
  const staff = await activeStaff(db, transaction);
  const person = staff.find((one) => one.id === staffId);
  if (
    person &&
    addressOf(person, other) !== null &&
    (await queueAlert(context, transaction, alert, { person, channel: other, time }))
  )
    return;
  // The other way was tried as well; does it still wait, it decides.
  const [waiting] = await select(
    db,
    `SELECT id FROM messages WHERE dedupe_key LIKE :like AND id <> :id AND state NOT IN ('failed', 'given-up') LIMIT 1`,
    { like: `${messageKeyOf(alert.id)}${staffId}:${time}:%`, id: message.id },
    transaction,
  );
  if (!waiting && alert.told_staff_id === staffId)
    await change(
      db,
      'UPDATE alerts SET passes_on_at = LEAST(COALESCE(passes_on_at, :now), :now) WHERE id = :id',
      { id: alert.id, now: new Date(clock.now()) },
      transaction,
    );
}
