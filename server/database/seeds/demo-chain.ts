import type { Transaction } from 'sequelize';
import { addDays, type Day } from '../../../shared/domain/day';
import { placesOfMorning } from '../../../shared/domain/places-of-morning';
import { dayOf, instantOf } from '../../../shared/domain/zone';
import { linkFamilyMember } from '../../children/family-members';
import { Child, Household } from '../../children/child-model';
import type { Context } from '../../context';
import { reportingDueOn, reportingRules } from '../../sites/rule-packs';
import { roomsOf, siteOf } from '../../sites/sites';
import { createSeries } from '../../series/plan-series';
import { change } from '../connection';
import { demoZone, type DemoClinic } from './demo-clinic';
import { comingMorning, daysAround, isBefore, lastMorningOver, pastRun } from './demo-days';
import { bornOnFor, type DemoAdult, type DemoChild, type DemoFamily } from './demo-families';
import { collectMorning, giveResults } from './demo-specimens';
import { insertRow } from './insert-row';

export interface SeededChild {
  readonly childId: number;
  readonly householdId: number;
  readonly seriesId: number | null;
  /** Mornings to come, which families are told about. */
  readonly toCome: readonly { readonly morningId: number; readonly on: Day }[];
  /** The adults, the first guardian first. */
  readonly familyMemberIds: readonly number[];
}

const dayMs = 86_400_000;

/** One invented family with its children, each at its own point of the chain. */
export async function seedFamily(
  context: Context,
  transaction: Transaction,
  clinic: DemoClinic,
  family: DemoFamily,
): Promise<SeededChild[]> {
  const now = context.clock.now();
  const today = dayOf(now, demoZone);
  const household = await Household.create(
    {
      siteId: clinic.siteId,
      travelMinutes: family.travelMinutes,
      createdAt: new Date(now - 3 * dayMs),
    },
    { transaction },
  );
  const seeded: SeededChild[] = [];
  for (const child of family.children) {
    const coming = await comingOf(context, clinic, transaction);
    const days = daysOf(child, today, coming, lastMorningOver(now));
    const orderedAt = days[0]
      ? instantOf({ on: addDays(days[0], -4), time: '10:20', zone: demoZone })
      : now - 2 * dayMs;
    const { id: childId } = await Child.create(
      {
        householdId: household.id,
        fullName: child.fullName,
        callMe: child.callMe,
        familyLabel: child.familyLabel,
        bornOn: bornOnFor(child.ageMonths, today),
        recordNumber: child.recordNumber,
        feeding: child.feeding,
        cautions: child.cautions,
        createdAt: new Date(orderedAt),
      },
      { transaction },
    );
    const familyMemberIds: number[] = [];
    for (const adult of family.adults)
      familyMemberIds.push(
        await linkFamilyMember(transaction, {
          childId,
          householdId: household.id,
          staffId: staffId(clinic, 'rosa'),
          member: memberOf(adult),
          now: orderedAt,
        }),
      );
    const orderId = await seedOrder(context, transaction, clinic, {
      child,
      childId,
      orderedAt,
      consentBy: familyMemberIds[0] ?? 0,
      adult: family.adults[0],
    });
    const chain = await seedSeries(context, transaction, clinic, {
      child,
      childId,
      orderId,
      days,
      familyMemberIds,
    });
    seeded.push({ childId, householdId: household.id, familyMemberIds, ...chain });
  }
  return seeded;
}

const staffId = (clinic: DemoClinic, key: string): number => clinic.staffIds.get(key) ?? 0;

async function comingOf(
  { db, clock }: Context,
  clinic: DemoClinic,
  transaction: Transaction,
): Promise<Day> {
  const site = await siteOf(db, clinic.siteId, transaction);
  return comingMorning(clock.now(), site.eveningTextTime);
}

function daysOf({ stage }: DemoChild, today: Day, coming: Day, lastOver: Day): readonly Day[] {
  if (stage.kind === 'coming') return daysAround(coming, stage.morning, lastOver).days;
  // Cultures run for weeks: one interim answer after a week, the final negative after 42 days.
  if (stage.kind === 'cultures-pending') return pastRun(today, 9);
  if (stage.kind === 'all-final') return pastRun(today, 44);
  return [];
}

function memberOf(adult: DemoAdult) {
  const isGuardian = adult.standing === 'guardian';
  return {
    fullName: adult.fullName,
    standing: adult.standing,
    relationship: adult.relationship,
    legalBasis: isGuardian ? 'parent' : null,
    mayConsent: isGuardian,
    seesResults: isGuardian,
    phone: adult.phone,
    email: adult.email,
    readsLanguage: adult.reads ?? 'en',
    readsHow: adult.readsHow,
    speaksLanguage: adult.speaks,
    needsInterpreter: adult.needsInterpreter,
    agreesToTexts: adult.texts !== 'no',
    agreesToEarlyTexts: adult.texts === 'also-early',
    agreesToMail: adult.mail,
  };
}

interface OrderSeed {
  readonly child: DemoChild;
  readonly childId: number;
  readonly orderedAt: number;
  readonly consentBy: number;
  readonly adult: DemoAdult | undefined;
}

async function seedOrder(
  { db }: Context,
  transaction: Transaction,
  clinic: DemoClinic,
  { child, childId, orderedAt, consentBy, adult }: OrderSeed,
): Promise<number> {
  const isSigned = child.stage.kind !== 'to-be-signed';
  const [rule] = reportingRules;
  const orderedOn = dayOf(orderedAt, demoZone);
  const isReported = child.stage.kind !== 'to-be-planned' && isSigned;
  const orderId = await insertRow(db, transaction, 'orders', {
    child_id: childId,
    ordered_by_name: 'Dr. Ines Okafor',
    answer_to: 'Alder Street, chest clinic, extension 12',
    reason: 'Contact of a person with tuberculosis, cough for three weeks, changes on the X-ray.',
    details: {
      weightKg: child.weightKg,
      sourceCase: 'known',
      sourceSusceptibility: 'not-known',
      medicines: null,
      medicinesSince: null,
      hasBleedingHistory: false,
      hasNoseOrAirwayTrouble: false,
      hasRecentSurgery: false,
      hasInfectiousContactAtHome: false,
      note: null,
      stopCard: {
        hasSuspectedMeningitis: false,
        hasSuspectedMiliaryDisease: false,
        hasBreathingDistress: false,
        isDrowsy: false,
        canBringUpSputum: false,
      },
    },
    mornings_planned: 3,
    intends_to_treat: true,
    reporting_due_on: isSigned && rule ? reportingDueOn(rule, orderedOn) : null,
    reported_at: isReported ? new Date(orderedAt + 4 * 3_600_000) : null,
    reported_by_staff_id: isReported ? staffId(clinic, 'rosa') : null,
    created_by_staff_id: staffId(clinic, 'rosa'),
    created_at: new Date(orderedAt),
    signed_by_staff_id: isSigned ? staffId(clinic, 'okafor') : null,
    signed_at: isSigned ? new Date(orderedAt + 30 * 60_000) : null,
  });
  if (isSigned)
    await insertRow(db, transaction, 'procedure_consents', {
      order_id: orderId,
      family_member_id: consentBy,
      legal_basis: 'parent',
      how: 'in-person',
      witness: null,
      interpreter: adult?.needsInterpreter ? 'Telephone interpreter 2207' : null,
      language: adult?.reads ?? 'en',
      form_version: 'A-3',
      comfort_plan: 'On the lap, wrapped in the own blanket, a song; sugar water only afterwards.',
      has_parent_in_room: true,
      given_at: new Date(orderedAt + 60 * 60_000),
      recorded_by_staff_id: staffId(clinic, 'rosa'),
    });
  return orderId;
}

interface SeriesSeed {
  readonly child: DemoChild;
  readonly childId: number;
  readonly orderId: number;
  readonly days: readonly Day[];
  readonly familyMemberIds: readonly number[];
}

async function seedSeries(
  context: Context,
  transaction: Transaction,
  clinic: DemoClinic,
  { child, childId, orderId, days, familyMemberIds }: SeriesSeed,
): Promise<Pick<SeededChild, 'seriesId' | 'toCome'>> {
  const { db, clock } = context;
  if (days.length === 0) return { seriesId: null, toCome: [] };
  const today = dayOf(clock.now(), demoZone);
  const site = await siteOf(db, clinic.siteId, transaction);
  const places = placesOfMorning({
    rooms: await roomsOf(db, clinic.siteId, transaction),
    staffPairs: site.staffPairs,
    arrivalsFrom: site.arrivals.from,
    arrivalsUntil: site.arrivals.until,
    minutesPerChild: site.minutesPerChild,
    limit: site.placesPerMorning,
  });
  const place = places[child.stage.kind === 'coming' ? child.stage.place : 0];
  if (!place) throw new RangeError('The demo clinic has no such place.');
  const plannedAt = instantOf({ on: addDays(days[0] ?? today, -3), time: '11:05', zone: demoZone });
  const { seriesId, morningIds } = await createSeries(
    { ...context, clock: { ...clock, now: () => plannedAt } },
    transaction,
    {
      order: { orderId, childId },
      site,
      fastingProtocolId: clinic.protocolId,
      laboratoryProfileId: clinic.profileId,
      staffId: staffId(clinic, 'rosa'),
      mornings: days.map((on, index) => ({
        on,
        arrivalTime: place.arrivalTime,
        roomId: place.roomId,
        // Where there is a helper, the helper brings the child on the second morning.
        escortFamilyMemberId: familyMemberIds[index === 1 ? 1 : 0] ?? familyMemberIds[0] ?? null,
      })),
    },
  );
  const mornings = days.map((on, index) => ({ on, morningId: morningIds[index] ?? 0 }));
  const lastOver = lastMorningOver(clock.now());
  const past = mornings.filter(({ on }) => !isBefore(lastOver, on));
  for (const [index, { on, morningId }] of past.entries()) {
    const specimenId = await collectMorning(context, transaction, clinic, {
      morningId,
      seriesId,
      childId,
      roomId: place.roomId,
      number: index + 1,
      arrivalAt: instantOf({ on, time: place.arrivalTime, zone: demoZone }),
      broughtBy: 'mother',
      label: `AS-${on.slice(2).replaceAll('-', '')}-${child.recordNumber.slice(2)}`,
    });
    if (child.stage.kind === 'cultures-pending' || child.stage.kind === 'all-final')
      await giveResults(context, transaction, clinic, {
        specimenId,
        childId,
        receivedOn: on,
        isFinal: child.stage.kind === 'all-final',
      });
  }
  const toCome = mornings.filter(({ on }) => isBefore(lastOver, on));
  const state =
    past.length === 0 ? 'planned' : toCome.length === 0 ? 'awaiting-results' : 'collecting';
  await change(
    db,
    'UPDATE series SET state = :state WHERE id = :seriesId',
    { state, seriesId },
    transaction,
  );
  return { seriesId, toCome };
}
