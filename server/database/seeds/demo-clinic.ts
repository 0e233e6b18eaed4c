import type { Sequelize, Transaction } from 'sequelize';
import type { StaffRole } from '../../../shared/access/rights';
import { addDays, weekdayOf, type Day } from '../../../shared/domain/day';
import { startingProtocol } from '../../../shared/domain/fasting-protocol';
import { demoLaboratoryProfile } from '../../../shared/domain/specimen-clocks';
import { dayOf } from '../../../shared/domain/zone';
import { hashPassword } from '../../auth/passwords';
import { protocolBody } from '../../sites/first-site';
import { insertRow } from './insert-row';

export const demoZone = 'America/Chicago';
export const demoSiteName = 'Alder Street Children’s Clinic';
/** One for all invented people; printed at every start of the demo clinic. */
export const demoPassword = 'lantern before first light';

export interface DemoStaff {
  readonly key: string;
  readonly who: string;
  readonly name: string;
  readonly credentials: string | null;
  readonly email: string;
  readonly roles: readonly StaffRole[];
}

export const demoStaff: readonly DemoStaff[] = [
  person('rosa', 'Nurse coordinator', 'Rosa Delgado', 'RN', ['nurse-coordinator']),
  person('okafor', 'Lead clinician', 'Ines Okafor', 'MD', ['clinician', 'lead-clinician']),
  person('kofi', 'Nurse', 'Kofi Asante', 'RN', ['nurse-coordinator']),
  person('hanna', 'Front desk', 'Hanna Lindqvist', null, ['front-desk']),
  person('teo', 'Language reviewer', 'Teo Marchetti', null, ['language-reviewer']),
  person('grace', 'Outreach nurse', 'Grace Whitefeather', 'RN', ['outreach-nurse']),
  person('milan', 'Administrator', 'Milan Horvat', null, ['administrator']),
];

function person(
  key: string,
  who: string,
  name: string,
  credentials: string | null,
  roles: readonly StaffRole[],
): DemoStaff {
  return { key, who, name, credentials, email: `${key}@alder.example.org`, roles };
}

export interface DemoClinic {
  readonly siteId: number;
  readonly roomIds: readonly number[];
  readonly protocolId: number;
  readonly profileId: number;
  readonly staffIds: ReadonlyMap<string, number>;
}

const day = 86_400_000;

/** Site, rooms, staff, and a protocol and a profile that the invented clinician has signed. */
export async function seedDemoClinic(
  db: Sequelize,
  transaction: Transaction,
  now: number,
): Promise<DemoClinic> {
  const signedAt = new Date(now - 120 * day);
  const effectiveOn = dayOf(signedAt.getTime(), demoZone);
  const siteId = await insertRow(db, transaction, 'sites', {
    name: demoSiteName,
    short_name: 'Alder Street',
    zone: demoZone,
    country: 'US',
    region: 'IL',
    address: '48 Alder Street',
    door: 'Door B',
    door_directions: 'Door B is on the garden side, under the yellow lamp. Ring once.',
    phone: '+13125550142',
    emergency_number: '911',
    dawn_answers_from_time: '04:30',
    dawn_answers_until_time: '08:30',
    clinic_weekdays: [1, 2, 3, 4, 5],
    arrivals_from_time: '06:00',
    arrivals_until_time: '09:00',
    minutes_per_child: 20,
    places_per_morning: 5,
    staff_pairs: 1,
    lead_days: 1,
    usual_wait_minutes: startingProtocol.usualWaitMinutes,
    evening_text_time: '18:30',
    morning_question_minutes_before: 90,
    call_list_minutes_before: 60,
  });
  const roomIds: number[] = [];
  for (const name of ['Room 1', 'Room 2'])
    roomIds.push(
      await insertRow(db, transaction, 'rooms', { site_id: siteId, name, closure_minutes: 60 }),
    );
  const staffIds = await seedStaff(db, transaction, signedAt);
  const signature = { signed_by_staff_id: staffIds.get('okafor'), signed_at: signedAt };
  const protocolId = await insertRow(db, transaction, 'fasting_protocols', {
    ...signature,
    site_id: siteId,
    version: 1,
    title: startingProtocol.title,
    effective_on: effectiveOn,
    body: protocolBody,
    has_starting_values: true,
  });
  const {
    version: _version,
    name: _name,
    effectiveOn: _on,
    signedBy: _by,
    signedOn: _signedOn,
    ...body
  } = demoLaboratoryProfile;
  const profileId = await insertRow(db, transaction, 'laboratory_profiles', {
    ...signature,
    site_id: siteId,
    version: 1,
    name: 'Lakeside laboratory (invented)',
    effective_on: effectiveOn,
    body,
  });
  await insertRow(db, transaction, 'closures', {
    site_id: siteId,
    closed_on: weekdayFrom(addDays(dayOf(now, demoZone), 15)),
    reason: 'staff day',
  });
  return { siteId, roomIds, protocolId, profileId, staffIds };
}

async function seedStaff(
  db: Sequelize,
  transaction: Transaction,
  createdAt: Date,
): Promise<Map<string, number>> {
  const passwordHash = await hashPassword(demoPassword);
  const ids = new Map<string, number>();
  for (const one of demoStaff) {
    const id = await insertRow(db, transaction, 'staff', {
      full_name: one.credentials === 'MD' ? `Dr. ${one.name}` : one.name,
      credentials: one.credentials,
      email: one.email,
      phone: null,
      password_hash: passwordHash,
      is_active: true,
      created_at: createdAt,
    });
    for (const role of one.roles)
      await insertRow(db, transaction, 'staff_roles', { staff_id: id, role });
    ids.set(one.key, id);
  }
  return ids;
}

/** This day, or the Monday after when it falls on a weekend. */
function weekdayFrom(from: Day): Day {
  const weekday = weekdayOf(from);
  return weekday <= 5 ? from : addDays(from, 8 - weekday);
}
