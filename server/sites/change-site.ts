import { QueryTypes, type Sequelize, type Transaction } from 'sequelize';
import type { AddSiteRequest, SaveSiteRequest, SiteForm } from '../../shared/contracts/set-up';
import { record, type Actor } from '../access-record/record';
import type { Context } from '../context';
import { change, inTransaction, select } from '../database/connection';
import { addOnce } from '../http/add-once';
import { changedMeanwhile, invalid } from '../http/problem';
import { sendCalendarEntries } from '../messages/calendar-entries';
import { planComingNights } from '../messages/plan-coming-nights';
import { startSite } from './first-site';
import { checkedSite, type CheckedSite } from './site-faults';
import { siteOf, type Site } from './sites';

const columns: Readonly<Record<string, (site: CheckedSite) => unknown>> = {
  name: ({ name }) => name,
  short_name: ({ shortName }) => shortName,
  country: ({ country }) => country,
  region: ({ region }) => region,
  zone: ({ zone }) => zone,
  address: ({ address }) => address,
  door: ({ door }) => door,
  door_directions: ({ doorDirections }) => doorDirections,
  phone: ({ phone }) => phone,
  emergency_number: ({ emergencyNumber }) => emergencyNumber,
  dawn_answers_from_time: ({ dawnPhone }) => dawnPhone.from,
  dawn_answers_until_time: ({ dawnPhone }) => dawnPhone.until,
  dawn_languages: ({ dawnLanguages }) => JSON.stringify(dawnLanguages),
  clinic_weekdays: ({ clinicWeekdays }) => JSON.stringify([...clinicWeekdays].sort()),
  arrivals_from_time: ({ arrivals }) => arrivals.from,
  arrivals_until_time: ({ arrivals }) => arrivals.until,
  minutes_per_child: ({ minutesPerChild }) => minutesPerChild,
  places_per_morning: ({ placesPerMorning }) => placesPerMorning,
  staff_pairs: ({ staffPairs }) => staffPairs,
  lead_days: ({ leadDays }) => leadDays,
  ride_lead_days: ({ rideLeadDays }) => rideLeadDays,
  reporting_lead_days: ({ reportingLeadDays }) => reportingLeadDays,
  longest_gap_days: ({ longestGapDays }) => longestGapDays,
  usual_wait_minutes: ({ usualWaitMinutes }) => usualWaitMinutes,
  ahead_text_days: ({ aheadTextDays }) => aheadTextDays,
  ahead_text_time: ({ aheadTextTime }) => aheadTextTime,
  evening_text_time: ({ eveningTextTime }) => eveningTextTime,
  morning_question_minutes_before: ({ morningQuestionMinutesBefore }) =>
    morningQuestionMinutesBefore,
  nudge_minutes_before: ({ nudgeMinutesBefore }) => nudgeMinutesBefore,
  call_list_minutes_before: ({ callListMinutesBefore }) => callListMinutesBefore,
  texts_without_consent: ({ textsWithoutConsent }) => textsWithoutConsent,
};
const valuesOf = (site: CheckedSite): Record<string, unknown> =>
  Object.fromEntries(Object.entries(columns).map(([column, value]) => [column, value(site)]));

/** What no message and no time of a coming night depends on. */
const silent: ReadonlySet<keyof SiteForm> = new Set([
  'region',
  'country',
  'dawnLanguages',
  'clinicWeekdays',
  'arrivals',
  'minutesPerChild',
  'placesPerMorning',
  'staffPairs',
  'leadDays',
  'rideLeadDays',
  'reportingLeadDays',
  'longestGapDays',
]);

/**
 * Keeps what was changed about a site. What families have been told about coming mornings follows: messages that wait
 * are planned again, and where the door or the address is another one, calendar entries are sent anew.
 * @throws Problem 422, 404, 409 'changed-meanwhile'
 */
export async function saveSite(
  context: Context,
  actor: Actor,
  siteId: number,
  { version, ...form }: SaveSiteRequest,
): Promise<void> {
  const { db, clock } = context;
  const { site, errors } = checkedSite(form);
  if (errors.length > 0) throw invalid(errors);
  await inTransaction(db, async (transaction) => {
    const before = await siteOf(db, siteId, transaction);
    const changed = changedFields(before, site);
    if (changed.includes('zone')) await refuseMorningsToCome(context, transaction, siteId);
    const kept = await change(
      db,
      `UPDATE sites SET ${Object.keys(columns)
        .map((column) => `${column} = :${column}`)
        .join(', ')}, version = version + 1 WHERE id = :siteId AND version = :version`,
      { ...valuesOf(site), siteId, version },
      transaction,
    );
    if (kept === 0) throw changedMeanwhile();
    await record(db, transaction, actor, {
      action: 'changed',
      matter: 'site',
      childIds: [],
      detail: { siteId, changed },
      at: clock.now(),
    });
    if (changed.some((field) => !silent.has(field)))
      await tellAgain(context, transaction, siteId, {
        hasMoved: changed.includes('door') || changed.includes('address'),
      });
  });
}

/** Another site of the organisation, with one room and the starting protocol, unsigned. */
export async function addSite(
  { db, clock }: Context,
  actor: Actor,
  { submissionKey, ...form }: AddSiteRequest,
): Promise<number> {
  const { site, errors } = checkedSite(form);
  if (errors.length > 0) throw invalid(errors);
  const now = clock.now();
  const added = await addOnce(
    db,
    { matter: 'site', key: submissionKey, at: now },
    async (transaction) => {
      const siteId = await insertSite(db, transaction, site);
      await startSite(db, transaction, siteId);
      await record(db, transaction, actor, {
        action: 'changed',
        matter: 'site-added',
        childIds: [],
        detail: { siteId, name: site.name },
        at: now,
      });
      return siteId;
    },
  );
  return added.id;
}

async function insertSite(
  db: Sequelize,
  transaction: Transaction,
  site: CheckedSite,
): Promise<number> {
  const names = Object.keys(columns);
  const [id] = await db.query(
    `INSERT INTO sites (${names.join(', ')}) VALUES (${names.map((name) => `:${name}`).join(', ')})`,
    { type: QueryTypes.INSERT, replacements: valuesOf(site), transaction },
  );
  return Number(id);
}

function changedFields(before: Site, after: CheckedSite): (keyof SiteForm)[] {
  const fields = Object.keys(after) as (keyof SiteForm)[];
  return fields.filter((field) => JSON.stringify(before[field]) !== JSON.stringify(after[field]));
}

/** Arrivals are kept as instants: by another clock every one of them would be wrong. */
async function refuseMorningsToCome(
  { db, clock }: Context,
  transaction: Transaction,
  siteId: number,
): Promise<void> {
  const [morning] = await select<{ id: number }>(
    db,
    `SELECT id FROM mornings WHERE site_id = :siteId AND state = 'planned' AND arrival_at > :now LIMIT 1`,
    { siteId, now: new Date(clock.now()) },
    transaction,
  );
  if (morning)
    throw invalid([
      {
        path: 'zone',
        message: 'Mornings are planned by this clock. It stays until they are over.',
      },
    ]);
}

async function tellAgain(
  context: Context,
  transaction: Transaction,
  siteId: number,
  { hasMoved }: { readonly hasMoved: boolean },
): Promise<void> {
  const { db, clock } = context;
  const toCome = await select<{ id: number; householdId: number }>(
    db,
    `SELECT mornings.id, children.household_id AS householdId FROM mornings
     JOIN children ON children.id = mornings.child_id
     WHERE mornings.site_id = :siteId AND mornings.state = 'planned' AND mornings.arrival_at > :now
     ORDER BY mornings.id`,
    { siteId, now: new Date(clock.now()) },
    transaction,
  );
  for (const householdId of new Set(toCome.map((row) => row.householdId)))
    await planComingNights(context, transaction, householdId);
  if (!hasMoved || toCome.length === 0) return;
  const morningIds = toCome.map(({ id }) => id);
  await change(
    db,
    'UPDATE mornings SET calendar_sequence = calendar_sequence + 1, version = version + 1 WHERE id IN (:morningIds)',
    { morningIds },
    transaction,
  );
  await sendCalendarEntries(context, transaction, morningIds, 'REQUEST');
}
