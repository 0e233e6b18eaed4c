import type { Context } from '../../server/context';
import { seedWording } from '../../server/wording/seed-wording';
import { startingProtocol } from '../../shared/domain/fasting-protocol';
import { demoLaboratoryProfile } from '../../shared/domain/specimen-clocks';
import { instantOf } from '../../shared/domain/zone';
import { insert } from './insert';

/** A Tuesday; the zone is the test site's. The next two days make the series complete. */
export const morningDay = '2027-04-13';
export const zone = 'America/Los_Angeles';

export const at = (time: string, on = morningDay): number => instantOf({ on, time, zone });
export const iso = (time: string, on = morningDay): string => new Date(at(time, on)).toISOString();

export interface TestChild {
  readonly childId: number;
  readonly seriesId: number;
  readonly morningIds: readonly number[];
  /** Of `morningDay`. */
  readonly morningId: number;
}

export interface TestClinic {
  readonly siteId: number;
  readonly roomIds: readonly [number, number];
  readonly staffId: number;
  readonly protocolId: number;
  readonly profileId: number;
}

export interface TestHousehold {
  readonly householdId: number;
  readonly motherId: number;
  readonly grandmotherId: number;
  readonly children: readonly TestChild[];
}

/** Rooms, the starting protocol and the demo laboratory profile, all and every English text, all signed. */
export async function addClinic({ db }: Context, siteId: number): Promise<TestClinic> {
  const signed_at = new Date('2027-01-04T17:00:00Z');
  const staffId = await insert(db, 'staff', {
    full_name: 'Dr. Lena Okafor',
    email: `lena-${siteId}@example.org`,
    created_at: signed_at,
  });
  const room = (name: string): Promise<number> =>
    insert(db, 'rooms', { site_id: siteId, name, closure_minutes: 60 });
  const roomIds = [await room('Room 1'), await room('Room 2')] as const;
  const { usualWaitMinutes, eatAgainAfterMinutes, bands } = startingProtocol;
  const protocolId = await insert(db, 'fasting_protocols', {
    site_id: siteId,
    version: 3,
    title: 'Starting values',
    effective_on: '2027-01-01',
    body: JSON.stringify({ usualWaitMinutes, eatAgainAfterMinutes, bands }),
    has_starting_values: true,
    signed_by_staff_id: staffId,
    signed_at,
  });
  const profileId = await insert(db, 'laboratory_profiles', {
    site_id: siteId,
    version: 2,
    name: demoLaboratoryProfile.name,
    effective_on: '2027-01-01',
    body: JSON.stringify(demoLaboratoryProfile),
    signed_by_staff_id: staffId,
    signed_at,
  });
  await seedWording(db, {
    language: 'en',
    signedBy: { staffId, at: signed_at.getTime() },
    now: signed_at.getTime(),
  });
  return { siteId, roomIds, staffId, protocolId, profileId };
}

export interface NewChild {
  readonly callMe: string;
  readonly bornOn: string;
  readonly arrivalTime: string;
  readonly feeding?: string;
  readonly cautions?: readonly string[];
}

/** A mother, a grandmother who brings the children, and the children with three mornings each. */
export async function addHousehold(
  { db }: Context,
  clinic: TestClinic,
  children: readonly NewChild[],
): Promise<TestHousehold> {
  const created_at = new Date('2027-04-01T17:00:00Z');
  const householdId = await insert(db, 'households', {
    site_id: clinic.siteId,
    travel_minutes: 30,
    ready_minutes: 45,
    created_at,
  });
  const member = (full_name: string, phone: string): Promise<number> =>
    insert(db, 'family_members', {
      household_id: householdId,
      full_name,
      phone,
      reads_language: 'en',
      speaks_language: 'Somali',
      needs_interpreter: true,
      created_at,
    });
  const motherId = await member('Hodan Cali', '+12065550141');
  const grandmotherId = await member('Halima Nuur', '+12065550142');
  await insert(db, 'contact_consents', {
    family_member_id: motherId,
    channel: 'sms',
    covers_early_morning: true,
    how: 'in person',
    wording_version: '1',
    given_at: created_at,
  });
  const added: TestChild[] = [];
  for (const child of children) {
    const childId = await insert(db, 'children', {
      household_id: householdId,
      full_name: `${child.callMe} Nuur Cali`,
      call_me: child.callMe,
      family_label: `your child ${added.length + 1}`,
      born_on: child.bornOn,
      feeding: child.feeding ?? 'family-food',
      cautions: JSON.stringify(child.cautions ?? []),
      created_at,
    });
    await tie(childId, motherId, 'guardian', 'mother');
    await tie(childId, grandmotherId, 'helper', 'grandmother');
    added.push(await addSeries(childId, child.arrivalTime));
  }
  return { householdId, motherId, grandmotherId, children: added };

  function tie(childId: number, memberId: number, standing: string, relationship: string) {
    return insert(db, 'child_family_members', {
      child_id: childId,
      family_member_id: memberId,
      standing,
      relationship,
      may_consent: standing === 'guardian',
    });
  }

  async function addSeries(childId: number, arrivalTime: string): Promise<TestChild> {
    const orderId = await insert(db, 'orders', {
      child_id: childId,
      ordered_by_name: 'Dr. Lena Okafor',
      answer_to: '555-0117',
      reason: 'contact of a known case',
      details: '{}',
      mornings_planned: 3,
      intends_to_treat: true,
      created_by_staff_id: clinic.staffId,
      created_at,
      signed_by_staff_id: clinic.staffId,
      signed_at: created_at,
    });
    await insert(db, 'procedure_consents', {
      order_id: orderId,
      family_member_id: motherId,
      legal_basis: 'parent',
      how: 'in-person',
      language: 'en',
      form_version: '1',
      comfort_plan: 'in the mother’s arms',
      has_parent_in_room: true,
      given_at: created_at,
      recorded_by_staff_id: clinic.staffId,
    });
    const seriesId = await insert(db, 'series', {
      child_id: childId,
      order_id: orderId,
      site_id: clinic.siteId,
      fasting_protocol_id: clinic.protocolId,
      laboratory_profile_id: clinic.profileId,
      mornings_planned: 3,
      created_by_staff_id: clinic.staffId,
      created_at,
    });
    const morningIds: number[] = [];
    for (const [index, on] of ['2027-04-13', '2027-04-14', '2027-04-15'].entries())
      morningIds.push(
        await insert(db, 'mornings', {
          series_id: seriesId,
          child_id: childId,
          site_id: clinic.siteId,
          number: index + 1,
          planned_on: on,
          arrival_time: arrivalTime,
          arrival_at: new Date(at(arrivalTime, on)),
          room_id: clinic.roomIds[0],
          place_key: `${clinic.siteId}:${on}:${arrivalTime}:${childId}`,
          escort_family_member_id: grandmotherId,
          night_carer_family_member_id: motherId,
          calendar_uid: `morning-${seriesId}-${index + 1}@clinic.example.org`,
        }),
      );
    return { childId, seriesId, morningIds, morningId: morningIds[0] ?? 0 };
  }
}

/** An infant and a toddler: Maryam's stop is at 3:00, Yusuf's at 1:15. */
export const maryamAndYusuf: readonly NewChild[] = [
  { callMe: 'Maryam', bornOn: '2026-08-20', arrivalTime: '07:00', feeding: 'formula' },
  { callMe: 'Yusuf', bornOn: '2025-06-02', arrivalTime: '07:15' },
];
