import type { CallList } from '../../shared/contracts/calls';
import { can, isRole } from '../../shared/access/rights';
import { record, type Actor } from '../access-record/record';
import type { StaffMember } from '../auth/current-user';
import type { Context } from '../context';
import { morningPlansOf, type MorningPlan } from '../series/morning-plans';
import { clinicWording, clinicWords } from '../wording/clinic-words';
import {
  callPeople,
  doneCallRows,
  openCallRows,
  personOf,
  type CallPerson,
  type CallRow,
} from './call-rows';
import { callSays, callScript, isAboutResults } from './call-says';

const dayMs = 24 * 3_600_000;

/** What stands on the call list for this staff member, and what was done in the last day. */
export async function listCalls(
  context: Context,
  actor: Actor,
  staff: StaffMember,
): Promise<CallList> {
  const { db, clock } = context;
  const now = clock.now();
  const [open, done, wording] = await Promise.all([
    openCallRows(db, staff),
    doneCallRows(db, staff, now - dayMs),
    clinicWording(db, staff.language),
  ]);
  const rows = [...open, ...done];
  const people = await callPeople(db, unique(rows.map((row) => row.household_id)));
  const plans = await plansOf(context, open);
  const seesResults = can(staff.roles.filter(isRole), 'results.read');
  await record(db, undefined, actor, {
    action: 'seen',
    matter: 'calls',
    childIds: unique(rows.map((row) => row.child_id)),
    at: now,
  });
  const says = (row: CallRow): string =>
    callSays(row, {
      wording,
      words: clinicWords(staff.language),
      person: personOf(row, people),
      seesResults,
    });
  return {
    open: open.map((row) => {
      const person = personOf(row, people);
      const isHidden = isAboutResults(row.reason) && !seesResults;
      return {
        id: row.id,
        reason: isHidden ? 'about-results' : row.reason,
        says: says(row),
        childId: row.child_id,
        childName: row.child_name,
        familyMember: person && personAnswer(person),
        script: callScript(row, {
          wording,
          person,
          seesResults,
          plans: plans.filter((plan) => isOfCall(plan, row, plans)),
        }),
        isForClinician: row.is_for_clinician === 1,
        urgentAt: row.urgent_at.toISOString(),
        createdAt: row.created_at.toISOString(),
        claimedBy: row.claimed_by,
      };
    }),
    done: done.map((row) => ({
      id: row.id,
      says: says(row),
      childName: row.child_name,
      outcome: row.outcome ?? 'not-needed',
      note: isAboutResults(row.reason) && !seesResults ? null : row.note,
      doneAt: (row.done_at ?? row.created_at).toISOString(),
      doneBy: row.done_by ?? clinicWords(staff.language).text('clinic.the-system'),
    })),
  };
}

/** The mornings of the families on the list that are still to come, for the scripts. */
async function plansOf(context: Context, rows: readonly CallRow[]): Promise<MorningPlan[]> {
  const now = context.clock.now();
  const plans = await Promise.all(
    unique(rows.map((row) => row.household_id)).map((householdId) =>
      morningPlansOf(context.db, { householdId }),
    ),
  );
  return plans.flat().filter((plan) => plan.state === 'planned' && plan.arrivalAt > now);
}

/** The family's next day with mornings, or the day of the morning that the task names. */
function isOfCall(plan: MorningPlan, row: CallRow, plans: readonly MorningPlan[]): boolean {
  if (plan.householdId !== row.household_id) return false;
  const named = plans.find(({ morningId }) => morningId === row.morning_id);
  const first = plans.find(({ householdId }) => householdId === row.household_id);
  return plan.on === (named ?? first)?.on;
}

const personAnswer = (
  person: CallPerson,
): NonNullable<CallList['open'][number]['familyMember']> => ({
  id: person.id,
  fullName: person.full_name,
  relationship: person.relationship,
  phone: person.phone,
  speaks: person.speaks_language,
  needsInterpreter: person.needs_interpreter === 1,
});

const unique = (ids: readonly (number | null)[]): number[] => [
  ...new Set(ids.filter((value): value is number => value !== null)),
];
