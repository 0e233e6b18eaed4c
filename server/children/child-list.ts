import type { ChildList } from '../../shared/contracts/children';
import type { Day } from '../../shared/domain/day';
import { dayOf } from '../../shared/domain/zone';
import { record, type Actor } from '../access-record/record';
import type { StaffMember } from '../auth/current-user';
import type { Context } from '../context';
import { select } from '../database/connection';
import { siteOf } from '../sites/sites';
import { clinicWords } from '../wording/clinic-words';
import { latestOrders, nextStep } from './next-step';
import { withinReach } from './reach';

const longestList = 100;

interface ChildRow {
  id: number;
  fullName: string;
  bornOn: Day;
  recordNumber: string | null;
  languages: string | null;
}

/**
 * Children whose name holds every word of the search, in any order, accents and case aside, or whose record number
 * begins with it. The newest first, at most 100; `total` counts all.
 */
export async function listChildren(
  { db, clock }: Context,
  actor: Actor,
  staff: StaffMember,
  search: string,
): Promise<ChildList> {
  const reach = withinReach(staff);
  const words = search.split(/\s+/).filter((word) => word !== '');
  const byName = words.map((_, index) => `children.full_name LIKE :word${index}`);
  const where =
    words.length === 0
      ? reach.sql
      : `${reach.sql} AND ((${byName.join(' AND ')}) OR children.record_number LIKE :recordNumber)`;
  const replacements = {
    ...reach.replacements,
    ...Object.fromEntries(words.map((word, index) => [`word${index}`, `%${literal(word)}%`])),
    recordNumber: `${literal(search.trim())}%`,
  };
  const from = 'FROM children JOIN households ON households.id = children.household_id';
  const rows = await select<ChildRow>(
    db,
    `SELECT children.id, children.full_name AS fullName, children.born_on AS bornOn,
       children.record_number AS recordNumber,
       (SELECT GROUP_CONCAT(DISTINCT member.speaks_language ORDER BY member.speaks_language SEPARATOR '\\n')
        FROM child_family_members tie JOIN family_members member ON member.id = tie.family_member_id
        WHERE tie.child_id = children.id) AS languages
     ${from} WHERE ${where} ORDER BY children.id DESC LIMIT ${longestList}`,
    replacements,
  );
  const [count] = await select<{ total: number }>(
    db,
    `SELECT COUNT(*) AS total ${from} WHERE ${where}`,
    replacements,
  );
  const childIds = rows.map((row) => row.id);
  const today = dayOf(clock.now(), (await siteOf(db, staff.siteId)).zone);
  const orders = await latestOrders(db, childIds, today);
  await record(db, undefined, actor, {
    action: 'seen',
    matter: 'children',
    childIds,
    at: clock.now(),
  });
  return {
    children: rows.map((row) => ({
      ...row,
      languages: row.languages?.split('\n') ?? [],
      next: nextStep(clinicWords(staff.language), orders.get(row.id), today),
    })),
    total: count?.total ?? 0,
  };
}

/** Text for LIKE without its wildcards. */
const literal = (text: string): string => text.replace(/[\\%_]/g, '\\$&');
