import { startingProtocol } from '../../shared/domain/fasting-protocol';
import { demoLaboratoryProfile } from '../../shared/domain/specimen-clocks';
import { instantOf } from '../../shared/domain/zone';
import { seedWording } from '../../server/wording/seed-wording';
import { insert } from './insert';
import type { TestServer } from './server';

export interface NightMember {
  readonly fullName?: string;
  readonly standing?: 'guardian' | 'helper';
  readonly phone?: string | null;
  readonly email?: string | null;
  readonly language?: string;
  readonly readsHow?: 'well' | 'little' | 'no';
  readonly needsInterpreter?: boolean;
  /** Consents: 'early' is texts before 8 as well. */
  readonly texts?: 'none' | 'day' | 'early';
  readonly mail?: boolean;
}

export interface NightChild {
  readonly bornOn: string;
  readonly label: string;
  readonly callMe?: string;
  readonly feeding?: 'breast' | 'formula' | 'breast-and-formula' | 'family-food';
  readonly cautions?: readonly string[];
  readonly arrivalTime?: string;
}

export interface NightFamily {
  readonly siteId: number;
  readonly householdId: number;
  readonly memberIds: number[];
  readonly childIds: number[];
  readonly morningIds: number[];
}

/** A Wednesday in the demo zone, on standard time. */
export const nightOn = '2026-12-09';
export const zone = 'America/Los_Angeles';
export const localInstant = (on: string, time: string): number => instantOf({ on, time, zone });

let made = 0;

/** Signs the shipped English words by a new clinician, as the demo clinic does. */
export async function signWords(server: TestServer): Promise<void> {
  const { id } = await server.addStaff(['clinician']);
  const at = server.context.clock.now();
  await seedWording(server.context.db, { language: 'en', signedBy: { staffId: id, at }, now: at });
}

/** A household whose children all come on one morning. Every name and number is invented. */
export async function addNight(
  { context: { db }, siteId: siteOf }: TestServer,
  {
    members = [{ texts: 'early' }],
    children = [{ bornOn: '2025-07-01', label: 'Big boy' }],
    on = nightOn,
  }: {
    members?: readonly NightMember[];
    children?: readonly NightChild[];
    on?: string;
  } = {},
): Promise<NightFamily> {
  made += 1;
  const siteId = await siteOf();
  const created_at = new Date('2026-12-01T12:00:00Z');
  const householdId = await insert(db, 'households', { site_id: siteId, created_at });
  const memberIds: number[] = [];
  for (const [index, member] of members.entries()) {
    const phone = member.phone === undefined ? `+1206555${8000 + made * 10 + index}` : member.phone;
    const id = await insert(db, 'family_members', {
      household_id: householdId,
      full_name: member.fullName ?? `Amina Omar Hadi ${index}`,
      phone,
      email: member.email ?? (member.mail ? `family-${made}-${index}@example.org` : null),
      reads_language: member.language ?? 'en',
      reads_how: member.readsHow ?? 'well',
      speaks_language: 'English',
      needs_interpreter: member.needsInterpreter ?? false,
      created_at,
    });
    memberIds.push(id);
    const consent = {
      family_member_id: id,
      how: 'asked by staff',
      wording_version: '1',
      given_at: created_at,
    };
    if ((member.texts ?? 'none') !== 'none')
      await insert(db, 'contact_consents', {
        ...consent,
        channel: 'sms',
        covers_early_morning: member.texts === 'early',
      });
    if (member.mail) await insert(db, 'contact_consents', { ...consent, channel: 'mail' });
  }
  const protocolId = await insert(db, 'fasting_protocols', {
    site_id: siteId,
    version: 100 + made,
    title: startingProtocol.title,
    effective_on: startingProtocol.effectiveOn,
    body: JSON.stringify(startingProtocol),
    has_starting_values: true,
  });
  const profileId = await insert(db, 'laboratory_profiles', {
    site_id: siteId,
    version: 100 + made,
    name: demoLaboratoryProfile.name,
    effective_on: demoLaboratoryProfile.effectiveOn,
    body: JSON.stringify(demoLaboratoryProfile),
  });
  const roomId = await insert(db, 'rooms', {
    site_id: siteId,
    name: 'Room 1',
    closure_minutes: 60,
  });
  const childIds: number[] = [];
  const morningIds: number[] = [];
  for (const [index, child] of children.entries()) {
    const childId = await insert(db, 'children', {
      household_id: householdId,
      full_name: `${child.callMe ?? 'Yusuf'} Omar Hadi`,
      call_me: child.callMe ?? 'Yusuf',
      family_label: child.label,
      born_on: child.bornOn,
      record_number: `N${made}-${index}`,
      feeding: child.feeding ?? 'family-food',
      cautions: JSON.stringify(child.cautions ?? []),
      created_at,
    });
    childIds.push(childId);
    for (const [position, id] of memberIds.entries())
      await insert(db, 'child_family_members', {
        child_id: childId,
        family_member_id: id,
        standing: members[position]?.standing ?? 'guardian',
        relationship: 'mother',
        may_consent: true,
        sees_results: true,
      });
    const orderId = await insert(db, 'orders', {
      child_id: childId,
      ordered_by_name: 'Dr. Test',
      answer_to: 'here',
      reason: 'contact',
      details: '{}',
      mornings_planned: 3,
      intends_to_treat: false,
      created_by_staff_id: 1,
      created_at,
    });
    const seriesId = await insert(db, 'series', {
      child_id: childId,
      order_id: orderId,
      site_id: siteId,
      fasting_protocol_id: protocolId,
      laboratory_profile_id: profileId,
      mornings_planned: 3,
      created_by_staff_id: 1,
      created_at,
    });
    const arrivalTime = child.arrivalTime ?? '07:00';
    morningIds.push(
      await insert(db, 'mornings', {
        series_id: seriesId,
        child_id: childId,
        site_id: siteId,
        number: 1,
        planned_on: on,
        arrival_time: arrivalTime,
        arrival_at: new Date(localInstant(on, arrivalTime)),
        room_id: roomId,
        calendar_uid: `uid-${made}-${index}@example.org`,
      }),
    );
  }
  return { siteId, householdId, memberIds, childIds, morningIds };
}
