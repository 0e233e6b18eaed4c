import type { Sequelize } from 'sequelize';
import type { Closing } from '../../shared/contracts/closing';
import { compareDays, type Day, type Instant } from '../../shared/domain/day';
import { dayOf } from '../../shared/domain/zone';
import { familyDay } from '../../shared/languages/family-time';
import { record, type Actor } from '../access-record/record';
import type { StaffMember } from '../auth/current-user';
import type { Context } from '../context';
import { select } from '../database/connection';
import { invalid } from '../http/problem';
import { siteParams } from '../messages/tell-member';
import type { MorningPlan } from '../series/morning-plans';
import { siteOf, type Site } from '../sites/sites';
import { clinicWording, clinicWords, type ClinicWords } from '../wording/clinic-words';
import {
  closingCalls,
  closingKind,
  closingOfDay,
  keptClosing,
  textKeyOf,
  type FamilyOfDay,
  type KeptClosing,
} from './closing-of-day';

/** What closing this day would do, or has done: who is told how, and with whom a person speaks. */
export async function showClosing(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  on: Day,
): Promise<Closing> {
  const { db, clock } = context;
  const now = clock.now();
  const site = await siteOf(db, staff.siteId);
  const isToday = refusePast(on, site, now);
  const [kept, day] = [
    await keptClosing(db, site.id, on),
    await closingOfDay(db, { siteId: site.id, on, isToday, now }),
  ];
  const words = clinicWords(staff.language);
  const shown = [...day.open.flatMap(({ plans }) => plans), ...day.apart, ...day.closed];
  await record(db, undefined, actor, {
    action: 'seen',
    matter: 'closing',
    childIds: shown.map(({ childId }) => childId),
    detail: { on },
    at: now,
  });
  const wording = await clinicWording(db, staff.language);
  const told = familyDay(on, wording.profile);
  return {
    on,
    isToday,
    siteName: site.name,
    zone: site.zone,
    closed: kept && {
      at: kept.at.toISOString(),
      by: kept.by,
      reason: kept.reason,
      reasonSays: reasonSays(words, kept),
    },
    families: [
      ...day.open.map((family) => openFamily(words, family, now)),
      ...(await closedFamilies(db, words, day.closed)),
    ].sort((left, right) => firstArrival(left).localeCompare(firstArrival(right))),
    apart: day.apart.map((plan) => ({
      morningId: plan.morningId,
      childId: plan.childId,
      fullName: plan.fullName,
      arrivalTime: plan.arrivalTime,
      says: words.text(`clinic.closing.apart.${plan.state}`),
      isOnTheWay: plan.state === 'planned',
    })),
    textSays: day.open.some(({ hears }) => hears.textAt !== null)
      ? wording.text(textKeyOf(isToday), {
          ...siteParams(site),
          weekday: told.weekday,
          date: told.date,
        })
      : null,
  };
}

type Family = Closing['families'][number];
const firstArrival = ({ children }: Family): string => children[0]?.arrivalTime ?? '';

function openFamily(
  words: ClinicWords,
  { householdId, plans, hears }: FamilyOfDay,
  now: Instant,
): Family {
  const { how, textAt, hearings, whyCall } = hears;
  const zone = plans[0]?.zone ?? 'UTC';
  const who = words.list(
    hearings.filter((one) => one.textAt !== null).map(({ recipient }) => recipient.fullName),
  );
  const text =
    textAt === null
      ? ''
      : textAt === now
        ? words.text('clinic.closing.text-now', { who })
        : words.text('clinic.closing.text-later', { who, time: words.clock(textAt, zone) });
  const call = whyCall === null ? '' : words.text(`clinic.closing.call.${whyCall}`);
  return {
    householdId,
    children: childrenOf(plans),
    how,
    textAt: textAt === null ? null : new Date(textAt).toISOString(),
    says: [text, call].filter((part) => part !== '').join(' '),
    isClosed: false,
  };
}

/** What became of telling a family whose mornings were closed. */
async function closedFamilies(
  db: Sequelize,
  words: ClinicWords,
  closed: readonly MorningPlan[],
): Promise<Family[]> {
  const householdIds = [...new Set(closed.map(({ householdId }) => householdId))];
  const on = closed[0]?.on;
  if (on === undefined) return [];
  const texts = await select<{ householdId: number; hasGone: 0 | 1 }>(
    db,
    `SELECT household_id AS householdId, MAX(state IN ('sent', 'delivered')) AS hasGone FROM messages
     WHERE household_id IN (:householdIds) AND morning_on = :on AND kind = :closingKind
       AND state NOT IN ('failed', 'given-up', 'withdrawn')
     GROUP BY household_id`,
    { householdIds, on, closingKind },
  );
  const calls = await select<{ householdId: number }>(
    db,
    `SELECT DISTINCT household_id AS householdId FROM call_tasks
     WHERE household_id IN (:householdIds) AND done_at IS NULL AND reason IN (:closingCalls)`,
    { householdIds, closingCalls },
  );
  return householdIds.map((householdId) => {
    const text = texts.find((row) => row.householdId === householdId);
    const says = [
      ...(text
        ? [`clinic.closing.done.${Number(text.hasGone) === 1 ? 'text-gone' : 'text-waits'}`]
        : []),
      ...(calls.some((row) => row.householdId === householdId) ? ['clinic.closing.done.call'] : []),
    ];
    return {
      householdId,
      children: childrenOf(closed.filter((plan) => plan.householdId === householdId)),
      how: null,
      textAt: null,
      says: (says.length > 0 ? says : ['clinic.closing.done.told'])
        .map((key) => words.text(key))
        .join(' '),
      isClosed: true,
    };
  });
}

const childrenOf = (plans: readonly MorningPlan[]): Family['children'] =>
  plans.map(({ morningId, fullName, arrivalTime }) => ({ morningId, fullName, arrivalTime }));

export function reasonSays(
  words: ClinicWords,
  { reason, says }: Pick<KeptClosing, 'reason' | 'says'>,
): string {
  const word = words.text(`clinic.closing.reason.${reason}`);
  if (says === null) return word;
  return reason === 'other' ? says : words.text('clinic.closing.reason-and-more', { word, says });
}

/** @returns whether it is today. @throws Problem 422 for a day that is past. */
export function refusePast(on: Day, { zone }: Pick<Site, 'zone'>, now: Instant): boolean {
  const ahead = compareDays(on, dayOf(now, zone));
  if (ahead < 0)
    throw invalid([{ path: 'on', message: 'This day is past; nothing can be closed any more.' }]);
  return ahead === 0;
}
