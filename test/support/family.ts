import type { Context } from '../../server/context';
import { insert } from './insert';

export interface TestFamily {
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
  return { householdId, childId, guardianId, helperId };
}
