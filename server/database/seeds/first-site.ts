import type { Sequelize, Transaction } from 'sequelize';
import { startingProtocol } from '../../../shared/domain/fasting-protocol';
import { select } from '../connection';
import { insertRow } from './insert-row';

/**
 * What a real clinic begins with when it has no site yet: neutral values that an administrator replaces, and the starting
 * protocol, unsigned. No morning can be planned before a clinician has signed a protocol and a laboratory profile.
 * @returns the id of the new site, or null when there is a site already
 */
export async function seedFirstSite(
  db: Sequelize,
  transaction: Transaction,
): Promise<number | null> {
  const [known] = await select<{ id: number }>(db, 'SELECT id FROM sites LIMIT 1', {}, transaction);
  if (known) return null;
  const siteId = await insertRow(db, transaction, 'sites', {
    name: 'Our clinic',
    short_name: 'Our clinic',
    zone: 'America/New_York',
    country: 'US',
    region: null,
    address: 'To be filled in',
    door: 'Main door',
    door_directions: 'To be filled in',
    phone: '+12125550100',
    emergency_number: '911',
    dawn_answers_from_time: '05:00',
    dawn_answers_until_time: '08:00',
    clinic_weekdays: [1, 2, 3, 4, 5],
    arrivals_from_time: '06:00',
    arrivals_until_time: '09:00',
    minutes_per_child: 30,
    places_per_morning: 5,
    staff_pairs: 1,
    lead_days: 2,
    usual_wait_minutes: startingProtocol.usualWaitMinutes,
    evening_text_time: '18:30',
    morning_question_minutes_before: 90,
    call_list_minutes_before: 60,
  });
  await insertRow(db, transaction, 'rooms', {
    site_id: siteId,
    name: 'Room 1',
    // Curry International TB Center, step 1: an hour where the air changes are not known.
    closure_minutes: 60,
  });
  await insertRow(db, transaction, 'fasting_protocols', {
    site_id: siteId,
    version: 1,
    title: startingProtocol.title,
    effective_on: startingProtocol.effectiveOn,
    body: protocolBody,
    has_starting_values: true,
    signed_by_staff_id: null,
    signed_at: null,
  });
  return siteId;
}

/** The starting protocol as the `body` column holds it. */
export const protocolBody = {
  usualWaitMinutes: startingProtocol.usualWaitMinutes,
  eatAgainAfterMinutes: startingProtocol.eatAgainAfterMinutes,
  bands: startingProtocol.bands,
};
