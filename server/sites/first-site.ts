import { QueryTypes, type Sequelize, type Transaction } from 'sequelize';
import { startingProtocol } from '../../shared/domain/fasting-protocol';
import { validateZone } from '../../shared/domain/zone';

export interface FirstSite {
  readonly name: string;
  /** IANA zone of the clinic's clocks. */
  readonly zone: string;
  /** E.164. */
  readonly phone: string;
}

/** What cannot be used, each with its reason; empty when the site can be made. */
export function firstSiteFaults({ name, zone, phone }: FirstSite): string[] {
  const faults: string[] = [];
  if (name.trim().length === 0 || name.length > 120) faults.push('the name is empty or too long');
  if (!/^\+[1-9]\d{6,14}$/.test(phone)) faults.push('the phone must look like +12065550110');
  try {
    validateZone(zone);
  } catch {
    faults.push(`there is no zone ${zone}`);
  }
  return faults;
}

const longestShortName = 40;

/** The starting protocol as the `body` column holds it. */
export const protocolBody = {
  usualWaitMinutes: startingProtocol.usualWaitMinutes,
  eatAgainAfterMinutes: startingProtocol.eatAgainAfterMinutes,
  allowedItems: startingProtocol.allowedItems,
  individualPlanCautions: startingProtocol.individualPlanCautions,
  wakeToCollectionMinutes: startingProtocol.wakeToCollectionMinutes,
  bands: startingProtocol.bands,
};

/**
 * The first site of a real clinic: hours that the clinic confirms or changes, one room, and the starting protocol,
 * unsigned. No morning can be planned before a clinician has signed a protocol and a laboratory profile.
 */
export async function insertFirstSite(
  db: Sequelize,
  transaction: Transaction,
  { name, zone, phone }: FirstSite,
): Promise<number> {
  const [siteId] = await db.query(
    `INSERT INTO sites (name, short_name, zone, country, address, door, door_directions, phone, emergency_number,
       dawn_answers_from_time, dawn_answers_until_time, clinic_weekdays, arrivals_from_time, arrivals_until_time,
       minutes_per_child, places_per_morning, staff_pairs, lead_days, usual_wait_minutes, evening_text_time,
       morning_question_minutes_before, call_list_minutes_before)
     VALUES (:name, :shortName, :zone, 'US', '', '', '', :phone, '911', '05:00', '08:00', '[1,2,3,4,5]', '06:00',
       '09:00', 30, 5, 1, 2, :usualWaitMinutes, '18:30', 90, 60)`,
    {
      type: QueryTypes.INSERT,
      transaction,
      replacements: {
        name: name.trim(),
        shortName: name.trim().slice(0, longestShortName),
        zone,
        phone,
        usualWaitMinutes: startingProtocol.usualWaitMinutes,
      },
    },
  );
  await startSite(db, transaction, siteId);
  return siteId;
}

/** What every new site starts with: one room, and the starting protocol, unsigned. */
export async function startSite(
  db: Sequelize,
  transaction: Transaction,
  siteId: number,
): Promise<void> {
  // Curry International TB Center, step 1: a room is closed for an hour where its air changes are not known.
  await db.query(
    "INSERT INTO rooms (site_id, name, closure_minutes) VALUES (:siteId, 'Room 1', 60)",
    { transaction, replacements: { siteId } },
  );
  await db.query(
    `INSERT INTO fasting_protocols (site_id, version, title, effective_on, body, has_starting_values)
     VALUES (:siteId, 1, :title, :effectiveOn, :body, TRUE)`,
    {
      transaction,
      replacements: {
        siteId,
        title: startingProtocol.title,
        effectiveOn: startingProtocol.effectiveOn,
        body: JSON.stringify(protocolBody),
      },
    },
  );
}
