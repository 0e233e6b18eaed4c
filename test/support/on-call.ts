import type { Sequelize } from 'sequelize';
import { insert } from './insert';

export interface OnCallPerson {
  readonly name: string;
  readonly phone: string | null;
  readonly byText?: boolean;
  readonly byMail?: boolean;
  readonly language?: 'en' | 'es';
}

/** A member of the staff with a telephone, reached as said; by text when nothing is said. */
export async function addOnCallPerson(db: Sequelize, person: OnCallPerson): Promise<number> {
  return insert(db, 'staff', {
    full_name: person.name,
    email: mailOf(person.name),
    phone: person.phone,
    is_active: true,
    alerts_by_text: person.byText ?? true,
    alerts_by_mail: person.byMail ?? false,
    alerts_language: person.language ?? 'en',
    created_at: new Date('2027-01-04T17:00:00Z'),
  });
}

export const mailOf = (name: string): string =>
  `${name.toLowerCase().replace(/[^a-z]+/g, '.')}@staff.example.org`;

/** Somebody's turn on every day and at every hour. */
export async function addTurn(
  db: Sequelize,
  siteId: number,
  staffId: number,
  deputyId: number | null = null,
): Promise<void> {
  await insert(db, 'on_call_turns', {
    site_id: siteId,
    staff_id: staffId,
    deputy_staff_id: deputyId,
    weekdays: '[1,2,3,4,5,6,7]',
    from_time: '00:00',
    until_time: '00:00',
    from_on: '2026-01-01',
  });
}

/** A site as a row, for benches that have no web. */
export const onCallSite = {
  name: 'Alder Street Children’s Clinic',
  short_name: 'Alder Street',
  zone: 'America/Chicago',
  country: 'US',
  region: 'IL',
  address: '48 Alder Street',
  door: 'Door B',
  door_directions: 'Garden side.',
  phone: '+13125550142',
  emergency_number: '911',
  dawn_answers_from_time: '04:30',
  dawn_answers_until_time: '08:30',
  clinic_weekdays: '[1,2,3,4,5]',
  arrivals_from_time: '06:00',
  arrivals_until_time: '09:00',
  minutes_per_child: 20,
  places_per_morning: 5,
  staff_pairs: 1,
  lead_days: 1,
  usual_wait_minutes: 20,
  evening_text_time: '18:30',
  morning_question_minutes_before: 90,
  call_list_minutes_before: 60,
};
