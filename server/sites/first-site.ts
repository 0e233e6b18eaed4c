import type { Sequelize, Transaction } from 'sequelize';
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

/** The first site, with starting values for the hours that the clinic confirms or changes before it plans. */
export async function insertFirstSite(
  db: Sequelize,
  transaction: Transaction,
  { name, zone, phone }: FirstSite,
): Promise<void> {
  await db.query(
    `INSERT INTO sites (name, short_name, zone, country, address, door, door_directions, phone, emergency_number,
       dawn_answers_from_time, dawn_answers_until_time, clinic_weekdays, arrivals_from_time, arrivals_until_time,
       minutes_per_child, places_per_morning, staff_pairs, lead_days, usual_wait_minutes, evening_text_time,
       morning_question_minutes_before, call_list_minutes_before)
     VALUES (:name, :shortName, :zone, 'US', '', '', '', :phone, '911', '05:00', '08:00', '[1,2,3,4,5]', '07:00',
       '08:00', 45, 4, 1, 2, 20, '18:00', 90, 60)`,
    {
      replacements: {
        name: name.trim(),
        shortName: name.trim().slice(0, longestShortName),
        zone,
        phone,
      },
      transaction,
    },
  );
}
