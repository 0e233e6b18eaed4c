import type { Transaction } from 'sequelize';
import type { AlertKind, AlertList, StaffAlert } from '../../shared/contracts/alerts';
import { record, type Actor } from '../access-record/record';
import type { StaffMember } from '../auth/current-user';
import type { Context } from '../context';
import { change, inTransaction, select } from '../database/connection';
import { notFound, Problem } from '../http/problem';
import { clinicWords, type ClinicWords } from '../wording/clinic-words';
import { turnsOf } from './alert-people';
import { withdrawMessages } from './pass-on-alerts';
import { heldAlert, keepEvent, tellNext, type AlertRow } from './tell-alert';

const dayMs = 86_400_000;

type ShownRow = AlertRow & { told: string | null; taken_by: string | null };

const opens: Record<AlertKind, StaffAlert['opens']> = {
  'texts-stuck': 'messages',
  'mails-stuck': 'messages',
  'critical-result': 'calls',
  'overdue-result': 'results',
  'not-answered': 'calls',
};

/** What is open, and what was taken or came to an end in the last day; of every site, because nothing names a child. */
export async function listAlerts({ db, clock }: Context, staff: StaffMember): Promise<AlertList> {
  const rows = await select<ShownRow>(
    db,
    `SELECT alerts.*, sites.name AS site_name, sites.short_name, sites.zone, sites.alert_wait_minutes,
       told.full_name AS told, taker.full_name AS taken_by
     FROM alerts JOIN sites ON sites.id = alerts.site_id
       LEFT JOIN staff told ON told.id = alerts.told_staff_id
       LEFT JOIN staff taker ON taker.id = alerts.taken_by_staff_id
     WHERE alerts.ended_at IS NULL OR alerts.ended_at > :since
     ORDER BY alerts.ended_at IS NOT NULL, alerts.taken_at IS NOT NULL, alerts.raised_at, alerts.id LIMIT 200`,
    { since: new Date(clock.now() - dayMs) },
  );
  const words = clinicWords(staff.language);
  const happened = await happenedTo(
    db,
    words,
    rows.map(({ id }) => id),
  );
  return { alerts: rows.map((row) => shown(row, words, staff, happened.get(row.id) ?? [])) };
}

function shown(
  row: ShownRow,
  words: ClinicWords,
  staff: StaffMember,
  happened: StaffAlert['happened'],
): StaffAlert {
  const iso = (at: Date | null): string | null => at?.toISOString() ?? null;
  return {
    id: row.id,
    kind: row.kind,
    says: words.text(`clinic.alert.${row.kind}`, { count: row.count }),
    siteName: row.site_name,
    zone: row.zone,
    opens: opens[row.kind],
    raisedAt: row.raised_at.toISOString(),
    told: row.told,
    passesOnAt: row.ended_at || row.taken_at ? null : iso(row.passes_on_at),
    takenBy: row.taken_by,
    takenAt: iso(row.taken_at),
    isMine: row.taken_by_staff_id === staff.id,
    endedAt: iso(row.ended_at),
    happened,
  };
}

async function happenedTo(
  db: Context['db'],
  words: ClinicWords,
  ids: readonly number[],
): Promise<Map<number, StaffAlert['happened']>> {
  const byAlert = new Map<number, StaffAlert['happened']>();
  if (ids.length === 0) return byAlert;
  const rows = await select<{ alert_id: number; event: string; at: Date; who: string | null }>(
    db,
    `SELECT alert_id, event, at, staff.full_name AS who FROM alert_events
     LEFT JOIN staff ON staff.id = alert_events.staff_id
     WHERE alert_id IN (:ids) ORDER BY alert_events.id`,
    { ids },
  );
  for (const { alert_id: id, event, at, who } of rows) {
    const says = words.text(`clinic.alert.event.${event}`, {
      who: who ?? words.text('clinic.the-system'),
    });
    byAlert.set(id, [...(byAlert.get(id) ?? []), { at: at.toISOString(), says }]);
  }
  return byAlert;
}

/**
 * Somebody looks after it: nobody else is told any more.
 * @throws Problem 404, 409 'already-taken' when another one was faster, 'alert-over'.
 */
export function takeAlert(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  id: number,
): Promise<AlertList> {
  return acted(context, actor, staff, { id, deed: 'taken' }, async (transaction, alert) => {
    if (alert.taken_by_staff_id === staff.id) return;
    await change(
      context.db,
      'UPDATE alerts SET taken_at = :now, taken_by_staff_id = :staffId, passes_on_at = NULL WHERE id = :id',
      { id, staffId: staff.id, now: new Date(context.clock.now()) },
      transaction,
    );
    await withdrawMessages(context, transaction, id);
    await keepEvent(context, transaction, id, 'taken', staff.id);
  });
}

/**
 * The own deputy is told at once, or the next one where there is none; also of what was taken before.
 * @throws as takeAlert.
 */
export function passAlertOn(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  id: number,
): Promise<AlertList> {
  return acted(context, actor, staff, { id, deed: 'passed-on' }, async (transaction, alert) => {
    const { db } = context;
    await change(
      db,
      'UPDATE alerts SET taken_at = NULL, taken_by_staff_id = NULL WHERE id = :id',
      { id },
      transaction,
    );
    await keepEvent(context, transaction, id, 'passed-on', staff.id);
    const turns = await turnsOf(db, alert.site_id, transaction);
    const deputies = turns.flatMap(({ staffId, deputyId }) =>
      staffId === staff.id && deputyId !== null ? [deputyId] : [],
    );
    await tellNext(context, transaction, alert, { first: deputies, not: [staff.id] });
  });
}

async function acted(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  { id, deed }: { readonly id: number; readonly deed: string },
  work: (transaction: Transaction, alert: AlertRow) => Promise<void>,
): Promise<AlertList> {
  const { db, clock } = context;
  await inTransaction(db, async (transaction) => {
    const alert = await heldAlert(context, transaction, 'id = :id', { id });
    if (!alert) throw notFound('This alert');
    if (alert.ended_at) throw new Problem(409, 'alert-over', 'This alert is over.');
    if (alert.taken_by_staff_id !== null && alert.taken_by_staff_id !== staff.id)
      throw new Problem(409, 'already-taken', 'Somebody else has taken this alert.');
    await work(transaction, alert);
    await record(db, transaction, actor, {
      action: 'changed',
      matter: 'alert',
      childIds: [],
      detail: { alertId: id, deed },
      at: clock.now(),
    });
  });
  return listAlerts(context, staff);
}
