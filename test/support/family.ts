import type { Context } from '../../server/context';
import { insert } from './insert';

export interface TestFamily {
  readonly siteId: number;
  readonly householdId: number;
  readonly childId: number;
  readonly guardianId: number;
  readonly helperId: number;
}

let made = 0;

/** A household with one child born on the day, a guardian who sees results, and a helper. Names are invented. */
export async function addFamily(
  { db }: Context,
  siteId: number,
  {
    bornOn = '2025-03-14',
    language = 'en',
    phone = `+1206555${String(1000 + (made % 9000)).padStart(4, '0')}`,
    email = `amina-${made}@example.org`,
  }: { bornOn?: string; language?: string; phone?: string | null; email?: string | null } = {},
): Promise<TestFamily> {
  made += 1;
  const created_at = new Date();
  const householdId = await insert(db, 'households', { site_id: siteId, created_at });
  const childId = await insert(db, 'children', {
    household_id: householdId,
    full_name: 'Yusuf Test Child',
    call_me: 'Yusuf',
    family_label: 'your son, 1 year',
    born_on: bornOn,
    record_number: `R${made}-${householdId}`,
    feeding: 'family-food',
    cautions: '[]',
    created_at,
  });
  const member = async (more: Record<string, unknown>): Promise<number> =>
    insert(db, 'family_members', {
      household_id: householdId,
      reads_language: language,
      speaks_language: 'English',
      created_at,
      ...more,
    });
  const guardianId = await member({ full_name: 'Amina Test Guardian', phone, email });
  const helperId = await member({ full_name: 'Halima Test Helper', phone: null, email: null });
  await insert(db, 'child_family_members', {
    child_id: childId,
    family_member_id: guardianId,
    standing: 'guardian',
    relationship: 'mother',
    may_consent: true,
    sees_results: true,
  });
  await insert(db, 'child_family_members', {
    child_id: childId,
    family_member_id: helperId,
    standing: 'helper',
    relationship: 'grandmother',
  });
  return { siteId, householdId, childId, guardianId, helperId };
}

/** A planned morning of the child at 7:00 on 14 April 2027, with the order, protocol and room that the tables demand. */
export async function addPlannedMorning(
  { db }: Context,
  { childId, siteId }: TestFamily,
  arrivalAt: number,
): Promise<void> {
  const at = new Date();
  const roomId = await insert(db, 'rooms', {
    site_id: siteId,
    name: 'Room 1',
    closure_minutes: 35,
  });
  const protocolId = await insert(db, 'fasting_protocols', {
    site_id: siteId,
    version: 1,
    title: 'Starting',
    effective_on: '2027-01-01',
    body: '{}',
    has_starting_values: true,
  });
  const profileId = await insert(db, 'laboratory_profiles', {
    site_id: siteId,
    version: 1,
    name: 'Laboratory',
    effective_on: '2027-01-01',
    body: '{}',
  });
  const orderId = await insert(db, 'orders', {
    child_id: childId,
    ordered_by_name: 'Test Clinician',
    answer_to: 'Test Clinic',
    reason: 'Test',
    details: '{}',
    mornings_planned: 3,
    intends_to_treat: false,
    created_by_staff_id: 1,
    created_at: at,
  });
  const seriesId = await insert(db, 'series', {
    child_id: childId,
    order_id: orderId,
    site_id: siteId,
    fasting_protocol_id: protocolId,
    laboratory_profile_id: profileId,
    mornings_planned: 3,
    created_by_staff_id: 1,
    created_at: at,
  });
  await insert(db, 'mornings', {
    series_id: seriesId,
    child_id: childId,
    site_id: siteId,
    number: 1,
    planned_on: '2027-04-14',
    arrival_time: '07:00',
    arrival_at: new Date(arrivalAt),
    room_id: roomId,
    calendar_uid: 'one@test',
  });
}
