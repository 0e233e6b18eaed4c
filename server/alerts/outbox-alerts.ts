import type { AlertKind } from '../../shared/contracts/alerts';
import { inTransaction, select } from '../database/connection';
import { channelHealth, type Channel } from '../outbox/health';
import { raiseAlert } from './raise-alert';
import { endAlert } from './pass-on-alerts';
import type { Surroundings } from './tell-alert';

const kinds = { sms: 'texts-stuck', mail: 'mails-stuck' } as const satisfies Record<
  Channel,
  AlertKind
>;
const usefulForMs = 7 * 86_400_000;

/** The late message that was seen at the look before, by channel. */
export type LateBefore = Readonly<Record<Channel, number | null>>;
export const noneLate: LateBefore = { sms: null, mail: null };

/**
 * Looks whether each way out goes on. It stands still when the same message was late at two looks, so that a clock that
 * was moved raises nothing, or when the service refuses everybody. When it goes again the alert is over.
 */
export async function lookAtOutbox(
  context: Surroundings,
  before: LateBefore,
): Promise<{ readonly late: LateBefore; readonly isHealthy: boolean }> {
  const health = await channelHealth(context.db, context.clock.now());
  let isHealthy = true;
  for (const channel of ['sms', 'mail'] as const) {
    const { lateMessageId, isRefused } = health[channel];
    const isLate = lateMessageId !== null;
    const standsStill = (isLate && before[channel] === lateMessageId) || isRefused;
    if (isLate || isRefused) isHealthy = false;
    if (standsStill) await raiseEverywhere(context, kinds[channel]);
    else if (!isLate) await endEverywhere(context, kinds[channel]);
  }
  return {
    late: { sms: health.sms.lateMessageId, mail: health.mail.lateMessageId },
    isHealthy,
  };
}

/** Every site with an on-call list hears of it; where none has one, the first site does. */
async function raiseEverywhere(context: Surroundings, kind: AlertKind): Promise<void> {
  const { db, clock } = context;
  const sites = await select<{ id: number; lastId: number | null; isOpen: 0 | 1 }>(
    db,
    `SELECT sites.id, (SELECT MAX(id) FROM alerts WHERE site_id = sites.id AND kind = :kind) AS lastId,
       EXISTS (SELECT 1 FROM alerts WHERE site_id = sites.id AND kind = :kind AND ended_at IS NULL) AS isOpen
     FROM sites
     WHERE EXISTS (SELECT 1 FROM on_call_turns WHERE site_id = sites.id)
       OR sites.id = (SELECT MIN(id) FROM sites) AND NOT EXISTS (SELECT 1 FROM on_call_turns)`,
    { kind },
  );
  for (const { id, lastId, isOpen } of sites)
    if (isOpen === 0)
      await inTransaction(db, (transaction) =>
        raiseAlert(context, transaction, {
          kind,
          siteId: id,
          // Two senders that see it at once name the same cause.
          cause: `after-${lastId ?? 0}`,
          usefulUntil: clock.now() + usefulForMs,
        }),
      );
}

async function endEverywhere(context: Surroundings, kind: AlertKind): Promise<void> {
  const { db } = context;
  const open = await select<{ id: number }>(
    db,
    'SELECT id FROM alerts WHERE kind = :kind AND ended_at IS NULL',
    { kind },
  );
  for (const { id } of open)
    await inTransaction(db, async (transaction) => {
      const [still] = await select(
        db,
        'SELECT id FROM alerts WHERE id = :id AND ended_at IS NULL FOR UPDATE',
        { id },
        transaction,
      );
      if (still) await endAlert(context, transaction, id);
    });
}
