import type { Transaction } from 'sequelize';
import type { Consequences } from '../../shared/contracts/protocols';
import type { Day } from '../../shared/domain/day';
import { fastingPlan } from '../../shared/domain/fasting-plan';
import type { FastingProtocol } from '../../shared/domain/fasting-protocol';
import { millisecondsPerMinute } from '../../shared/domain/zone';
import type { Context } from '../context';
import { select } from '../database/connection';
import { planHouseholdMessages } from '../messages/plan-messages';
import { morningPlansOf, type MorningPlan } from '../series/morning-plans';
import { hoursInWords } from '../wording/clinic-measures';
import type { ClinicWords } from '../wording/clinic-words';

/** Mornings still ahead from a day on. */
async function morningsFrom(
  { db, clock }: Context,
  siteId: number,
  from: Day,
  transaction?: Transaction,
): Promise<MorningPlan[]> {
  const rows = await select<{ id: number }>(
    db,
    `SELECT id FROM mornings WHERE site_id = :siteId AND planned_on >= :from AND state = 'planned'
       AND arrival_at > :now`,
    { siteId, from, now: new Date(clock.now()) },
    transaction,
  );
  return morningPlansOf(db, { morningIds: rows.map(({ id }) => id) }, transaction);
}

interface MorningChange {
  readonly morning: MorningPlan;
  /** Negative where the stop comes earlier; null where the child gets or loses a standard plan. */
  readonly stopShiftMinutes: number | null;
  readonly becomesIndividual: boolean;
  readonly becomesStandard: boolean;
  readonly longestChanges: boolean;
}

/** The clinician's own plan for a child holds whatever the protocol says. */
function changeOf(morning: MorningPlan, protocol: FastingProtocol): MorningChange | null {
  if (morning.individualPlan) return null;
  const { plan: before, site } = morning;
  const after = fastingPlan({ ...morning, protocol, usualWaitMinutes: site.usualWaitMinutes });
  const none = { becomesIndividual: false, becomesStandard: false, longestChanges: false };
  if (before.kind !== after.kind)
    return {
      ...none,
      morning,
      stopShiftMinutes: null,
      becomesIndividual: after.kind === 'individual',
      becomesStandard: after.kind === 'standard',
    };
  if (before.kind === 'individual' || after.kind === 'individual') return null;
  const shift = (after.stopAt - before.stopAt) / millisecondsPerMinute;
  const longestChanges = after.longestMinutes !== before.longestMinutes;
  const stopsDiffer = JSON.stringify(after.stops) !== JSON.stringify(before.stops);
  if (!stopsDiffer && !longestChanges && after.eatAgainAt === before.eatAgainAt) return null;
  return { ...none, morning, stopShiftMinutes: shift, longestChanges };
}

/** Counts only: nobody's record is opened by this. */
export async function changedMornings(
  context: Context,
  words: ClinicWords,
  siteId: number,
  protocol: FastingProtocol,
): Promise<Pick<Consequences, 'mornings' | 'plannedMornings' | 'changedMornings'>> {
  const planned = await morningsFrom(context, siteId, protocol.effectiveOn);
  const changes = planned.flatMap((morning) => changeOf(morning, protocol) ?? []);
  const counts = { plannedMornings: planned.length, changedMornings: changes.length };
  const plain = (key: string) => ({
    ...counts,
    mornings: [
      { says: words.text(`clinic.signing.${key}`, { count: planned.length }), needsCare: false },
    ],
  });
  if (planned.length === 0) return plain('no-mornings');
  if (changes.length === 0) return plain('mornings-same');
  const told = await toldAlready(context, changes);
  return { ...counts, mornings: sentencesOf(words, changes, told) };
}

function sentencesOf(
  words: ClinicWords,
  changes: readonly MorningChange[],
  told: number,
): Consequences['mornings'] {
  const shifts = changes.flatMap(({ stopShiftMinutes }) => stopShiftMinutes ?? []);
  const earlier = shifts.filter((shift) => shift < 0);
  const later = shifts.filter((shift) => shift > 0);
  const individual = changes.filter(({ becomesIndividual }) => becomesIndividual).length;
  const standard = changes.filter(({ becomesStandard }) => becomesStandard).length;
  const longest = changes.filter(({ longestChanges }) => longestChanges).length;
  const sentence = (key: string, count: number, needsCare: boolean, by = 0) =>
    count === 0
      ? []
      : [
          {
            says: words.text(`clinic.signing.${key}`, { count, by: hoursInWords(words, by) }),
            needsCare,
          },
        ];
  return [
    ...sentence('stop-earlier', earlier.length, true, Math.max(0, ...earlier.map((one) => -one))),
    ...sentence('stop-later', later.length, false, Math.max(0, ...later)),
    ...sentence('longest', longest, false),
    ...sentence('becomes-individual', individual, true),
    ...sentence('becomes-standard', standard, false),
    ...sentence('told-already', told, true),
  ];
}

/** Families who have had tonight's text with the times that change. */
async function toldAlready({ db }: Context, changes: readonly MorningChange[]): Promise<number> {
  const days = new Set(changes.map(({ morning }) => `${morning.householdId} ${morning.on}`));
  const sent = await select<{ household_id: number; morning_on: Day }>(
    db,
    `SELECT DISTINCT household_id, morning_on FROM messages
     WHERE household_id IN (:households) AND morning_on IN (:days)
       AND kind = 'evening' AND state NOT IN ('queued', 'withdrawn')`,
    {
      households: [...new Set(changes.map(({ morning }) => morning.householdId))],
      days: [...new Set(changes.map(({ morning }) => morning.on))],
    },
  );
  return sent.filter((row) => days.has(`${row.household_id} ${row.morning_on}`)).length;
}

/** Plans the messages of every night from a day on again, in the transaction that changed its hours. */
export async function replanFrom(
  context: Context,
  transaction: Transaction,
  siteId: number,
  from: Day,
): Promise<void> {
  const mornings = await morningsFrom(context, siteId, from, transaction);
  const nights = new Map(
    mornings.map(({ householdId, on }) => [`${householdId} ${on}`, { householdId, on }]),
  );
  for (const night of nights.values()) await planHouseholdMessages(context, transaction, night);
}
