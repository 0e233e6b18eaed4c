import type { Sequelize, Transaction } from 'sequelize';
import type { CloseReason } from '../../shared/contracts/closing';
import type { Day, Instant } from '../../shared/domain/day';
import { select } from '../database/connection';
import { recipientsOf } from '../messages/recipients';
import { morningPlansOf, type MorningPlan } from '../series/morning-plans';
import { canSpeak, loadWording } from '../wording/render';
import { mayBeOnTheWay, whoHears, type FamilyHears } from './who-hears';

export interface KeptClosing {
  readonly id: number;
  readonly reason: CloseReason;
  readonly says: string | null;
  readonly at: Date;
  readonly by: string;
}

export interface FamilyOfDay {
  readonly householdId: number;
  /** In order of arrival. */
  readonly plans: readonly MorningPlan[];
  readonly hears: FamilyHears;
}

export interface ClosingOfDay {
  /** Families whose mornings can be closed. */
  readonly open: readonly FamilyOfDay[];
  /** Families to whom a person speaks: on the way, here, or the collection has begun. */
  readonly apart: readonly MorningPlan[];
  /** Mornings that were lost because the clinic was closed. */
  readonly closed: readonly MorningPlan[];
}

/** What `lost_reason` begins with on a morning that the clinic closed; never the family's fault. */
export const clinicClosed = 'clinic closed';

/** Kind of the text, and the calls that stand for it. */
export const closingKind = 'clinic-closed';
export const closingCalls = ['clinic-closed', 'visit-cancelled', 'clinic-closed-on-the-way'];

/** The text of a morning that is closed on its own day, and of one that is closed before. */
export const textKeyOf = (isToday: boolean): string =>
  isToday ? 'message.clinic-closed.text' : 'message.visit-cancelled.text';

export async function keptClosing(
  db: Sequelize,
  siteId: number,
  on: Day,
  transaction?: Transaction,
): Promise<KeptClosing | null> {
  const [row] = await select<KeptClosing>(
    db,
    `SELECT closed_mornings.id, reason, says, closed_at AS at, staff.full_name AS \`by\` FROM closed_mornings
     JOIN staff ON staff.id = closed_by_staff_id WHERE site_id = :siteId AND closed_on = :on`,
    { siteId, on },
    transaction,
  );
  return row ?? null;
}

/** The families of a site and day, sorted by whether their morning can be closed, and how each hears of it. */
export async function closingOfDay(
  db: Sequelize,
  day: {
    readonly siteId: number;
    readonly on: Day;
    readonly isToday: boolean;
    readonly now: Instant;
  },
  transaction?: Transaction,
): Promise<ClosingOfDay> {
  const { siteId, on, isToday, now } = day;
  const plans = await morningPlansOf(db, { siteId, on }, transaction);
  const byHousehold = new Map<number, MorningPlan[]>();
  for (const plan of plans)
    byHousehold.set(plan.householdId, [...(byHousehold.get(plan.householdId) ?? []), plan]);
  const open: FamilyOfDay[] = [];
  const apart: MorningPlan[] = [];
  const canRead = await signedLanguages(db, textKeyOf(isToday), transaction);
  for (const [householdId, family] of byHousehold) {
    const held = family.filter(({ state }) => state !== 'lost');
    if (held.length === 0) continue;
    // One child at the door: the family is there, and is spoken with about all its children.
    if (held.some((plan) => plan.state !== 'planned' || mayBeOnTheWay(plan, now))) {
      apart.push(...held);
      continue;
    }
    const household = await recipientsOf(db, { householdId }, transaction);
    open.push({ householdId, plans: held, hears: whoHears(held, household, now, canRead) });
  }
  const closed = plans.filter(
    ({ state, lostReason }) => state === 'lost' && lostReason?.startsWith(clinicClosed),
  );
  return { open, apart, closed };
}

/** Whether a text is signed off, by language; read once for each language that is asked about. */
async function signedLanguages(
  db: Sequelize,
  key: string,
  transaction?: Transaction,
): Promise<(language: string) => boolean> {
  const rows = await select<{ language: string }>(
    db,
    'SELECT DISTINCT reads_language AS language FROM family_members',
    {},
    transaction,
  );
  const signed = new Set<string>();
  for (const { language } of rows) {
    if (!canSpeak(language)) continue;
    const wording = await loadWording(db, language, transaction);
    if (wording.has(key) && wording.isSignedOff([key])) signed.add(language);
  }
  return (language) => signed.has(language);
}
