import { QueryTypes, type Transaction } from 'sequelize';
import type { AlertKind } from '../../shared/contracts/alerts';
import { heldAlert, tellNext, type Surroundings } from './tell-alert';

export interface NewAlert {
  readonly kind: AlertKind;
  readonly siteId: number;
  /** The cause within the kind and site; one alert a cause, however many notice it. */
  readonly cause: string;
  /** Families or reports. */
  readonly count?: number;
  /** After this instant nobody is told any more, epoch milliseconds of the business clock. */
  readonly usefulUntil: number;
}

/**
 * Tells whoever is on call, in the transaction of the cause: the alert and its first message are there when the cause
 * is, or none of them.
 * @returns whether it is new.
 */
export async function raiseAlert(
  context: Surroundings,
  transaction: Transaction,
  { kind, siteId, cause, count = 1, usefulUntil }: NewAlert,
): Promise<boolean> {
  const { db, clock } = context;
  const [id, touched] = await db.query(
    `INSERT IGNORE INTO alerts (alert_key, kind, site_id, count, raised_at, useful_until)
     VALUES (:key, :kind, :siteId, :count, :now, :usefulUntil)`,
    {
      replacements: {
        key: `${kind}:${siteId}:${cause}`,
        kind,
        siteId,
        count,
        now: new Date(clock.now()),
        usefulUntil: new Date(usefulUntil),
      },
      transaction,
      type: QueryTypes.INSERT,
    },
  );
  if (touched !== 1) return false;
  const alert = await heldAlert(context, transaction, 'id = :id', { id });
  if (alert) await tellNext(context, transaction, alert);
  return true;
}
