import type { Sequelize } from 'sequelize';
import type { NextMorning } from '../../shared/contracts/family-morning';
import type { Instant } from '../../shared/domain/day';
import { addDays } from '../../shared/domain/zone';
import { ageOn } from '../../shared/domain/day';
import { familyDay } from '../../shared/languages/family-time';
import { recordViewOnce } from '../access-record/record-view-once';
import type { Actor } from '../access-record/record';
import type { FamilyVisitor } from '../auth/current-user';
import { closedToday } from '../closing/closed-today';
import type { Context } from '../context';
import { select } from '../database/connection';
import type { MorningPlan } from '../series/morning-plans';
import { sayItBackCard } from '../say-it-back/say-it-back';
import { siteOf, type Site } from '../sites/sites';
import { shownPhone } from '../messages/shown-phone';
import {
  faceOf,
  familyWords,
  ownPlansSay,
  protocolSays,
  protocolsOf,
  type FamilyWords,
} from './family-words';
import {
  householdOf,
  standardPlanOf,
  type Household,
  type HouseholdNight,
} from './household-night';
import { nightMoments } from './night-moments';
import { nightPath } from './night-path';
import { skiesOf } from './sky';
import { firstToCome, sunOfMorning, sunsOf } from './suns';

/** The family's home page: the next morning of the household as one path through the night, ready to be kept. */
export async function nextMorningOf(
  context: Context,
  actor: Actor,
  visitor: FamilyVisitor,
): Promise<NextMorning> {
  const { db } = context;
  const now = context.clock.now();
  const household = await householdOf(db, visitor, now);
  const site = household.next?.site ?? (await siteOfHousehold(db, visitor.householdId));
  const words = await familyWords(context, visitor.language, site);
  await recordViewOnce(context, actor, {
    matter: 'next-morning',
    childIds: [...new Set(household.mornings.map(({ childId }) => childId))],
    detail: { on: household.next?.on ?? null },
    at: now,
  });
  const page = household.next
    ? await planned(db, household, household.next, visitor, words)
    : nothingPlanned(household, site, words);
  const closed = closedToday(household.mornings, now, words);
  return {
    now: new Date(now).toISOString(),
    ...page,
    ...closed,
    draftSays: draftSays(words),
    sayItBack: closed ? null : await sayItBackCard(context, household, words, now),
  };
}

/** Only the texts that the page really uses count. */
function draftSays(words: FamilyWords): string | null {
  return words.wording.draftNotice(Object.keys(words.used()));
}

type Page = Omit<NextMorning, 'now' | 'draftSays' | 'sayItBack'>;

async function planned(
  db: Sequelize,
  household: Household,
  night: HouseholdNight,
  visitor: FamilyVisitor,
  words: FamilyWords,
): Promise<Page> {
  const steps = nightPath(night, words);
  const { firstArrivalAt, site } = night;
  const protocols = protocolsOf(night.children);
  return {
    state: 'planned',
    heading: words.text('next-morning.heading', {
      weekday: words.weekday(firstArrivalAt),
      time: words.time(firstArrivalAt),
    }),
    subheading: words.text('next-morning.subheading', { date: words.date(firstArrivalAt) }),
    on: night.on,
    ...sunsSaid(household, words),
    skies: skiesOf(night.on, night.zone),
    moments: nightMoments(night, steps, words),
    children: night.children.map((plan) => pathChild(plan, words)),
    steps,
    parts: partsOf(night, words),
    bring: bringOf(night.children, words),
    visit: pictures(words, [
      ['arrive', 'visit.arrive'],
      ['hold-still', 'visit.hold'],
      ['tube-in-nose', 'visit.tube'],
      ['done-hug', 'visit.eat'],
    ]),
    door: {
      says: [
        words.text('door.go', { door: site.door, directions: site.doorDirections }),
        words.text('door.ring'),
        words.text('door.late', { phone: shownPhone(site.phone, site.country) }),
      ],
      address: `${site.name}, ${site.address}`,
    },
    whoBrings: await whoBrings(db, night, visitor, words),
    mornings: morningsOf(household, words),
    question: {
      opensAt: iso(night.questionOpensAt),
      closesAt: iso(night.questionClosesAt),
    },
    protocolSays: [
      ...[...protocols.values()].map((protocol) => protocolSays(words, site, protocol)),
      ...ownPlansSay(words, night.children),
    ].join(' '),
  };
}

function nothingPlanned(household: Household, site: Site, words: FamilyWords): Page {
  const isFinished = household.mornings.some(({ state }) => state === 'collected');
  return {
    state: isFinished ? 'finished' : 'none',
    heading: words.text(isFinished ? 'next-morning.finished.heading' : 'next-morning.none.heading'),
    subheading: isFinished
      ? words.text('next-morning.finished.subheading')
      : words.text('next-morning.none.subheading', { phone: shownPhone(site.phone, site.country) }),
    on: null,
    ...sunsSaid(household, words),
    skies: [],
    moments: [],
    children: [],
    steps: [],
    parts: [],
    bring: [],
    visit: [],
    door: null,
    whoBrings: [],
    mornings: morningsOf(household, words),
    question: null,
    protocolSays: '',
  };
}

const iso = (at: Instant): string => new Date(at).toISOString();

async function siteOfHousehold(db: Sequelize, householdId: number): Promise<Site> {
  const [row] = await select<{ site_id: number }>(
    db,
    'SELECT site_id FROM households WHERE id = :householdId',
    { householdId },
  );
  return siteOf(db, row?.site_id ?? 0);
}

export function sunsSaid(
  household: Household,
  words: FamilyWords,
): Pick<NextMorning, 'suns' | 'sunsSay'> {
  const { days, number } = sunsOf(household.mornings);
  return {
    suns: days.map(({ sun }) => sun),
    sunsSay: number === null ? '' : words.text('next-morning.suns', { number, total: days.length }),
  };
}

function pathChild(plan: MorningPlan, words: FamilyWords): NextMorning['children'][number] {
  const standard = standardPlanOf(plan);
  const { childId, morningId, callMe } = plan;
  const common = { childId, morningId, callMe, face: faceOf(plan) };
  if (!standard) {
    const individualPlanSays = words.text('lane.individual', { name: callMe });
    return { ...common, headSays: individualPlanSays, stopAt: null, individualPlanSays };
  }
  const isDrinkOnly = standard.isInfant && plan.feeding !== 'family-food';
  return {
    ...common,
    headSays: words.text(isDrinkOnly ? 'lane.head.may-drink' : 'lane.head.may-eat', {
      name: callMe,
    }),
    stopAt: words.shownStop(standard.stopAt),
    individualPlanSays: null,
  };
}

function partsOf(night: HouseholdNight, words: FamilyWords): NextMorning['parts'] {
  const before = familyDay(addDays(night.on, -1), words.wording.profile);
  const day = familyDay(night.on, words.wording.profile);
  return [
    {
      part: 'evening',
      says: words.text('part.evening', { weekday: before.weekday, date: before.date }),
    },
    { part: 'night', says: words.text('part.night', { from: before.weekday, to: day.weekday }) },
    { part: 'morning', says: words.text('part.morning', { weekday: day.weekday, date: day.date }) },
  ];
}

const pictures = (
  words: FamilyWords,
  named: readonly (readonly [name: string, key: string])[],
): NextMorning['bring'] => named.map(([name, key]) => ({ name, caption: words.text(key) }));

const monthsInDiapers = 36;

function bringOf(children: readonly MorningPlan[], words: FamilyWords): NextMorning['bring'] {
  const monthsOf = ({ bornOn, on }: MorningPlan): number => ageOn(bornOn, on).months;
  const drinksBottle = children.some(
    (plan) => monthsOf(plan) < 12 && plan.feeding.includes('formula'),
  );
  const eats = children.some((plan) => monthsOf(plan) >= 6);
  return pictures(words, [
    ...(eats ? [['bring-food-for-after', 'bring.food'] as const] : []),
    ...(drinksBottle ? [['formula-bottle', 'bring.bottle'] as const] : []),
    ['medicine-bottle', 'bring.medicine'],
    ['comfort-toy', 'bring.comfort'],
    ...(children.some((plan) => monthsOf(plan) < monthsInDiapers)
      ? [['diaper', 'bring.diapers'] as const]
      : []),
    ['papers', 'bring.papers'],
  ]);
}

/** Who is with the children at night and who brings them, by the youngest child's morning. */
async function whoBrings(
  db: Sequelize,
  night: HouseholdNight,
  visitor: FamilyVisitor,
  words: FamilyWords,
): Promise<string[]> {
  const [youngest] = night.children;
  const carerId = youngest?.nightCarerFamilyMemberId ?? null;
  const escortId = youngest?.escortFamilyMemberId ?? null;
  const open = words.text('who.open', { phone: shownPhone(night.site.phone, night.site.country) });
  if (!youngest || (carerId === null && escortId === null)) return [open];
  const people = await select<{
    id: number;
    full_name: string;
    relationship: string;
    phone: string | null;
  }>(
    db,
    `SELECT family_members.id, full_name, relationship, phone FROM family_members
     JOIN child_family_members ON family_member_id = family_members.id AND child_id = :childId
     WHERE family_members.id IN (:ids)`,
    { childId: youngest.childId, ids: [carerId ?? 0, escortId ?? 0] },
  );
  const says = (id: number | null, when: 'night' | 'morning'): string[] => {
    if (id === null) return [];
    if (id === visitor.familyMemberId) return [words.text(`who.${when}-you`)];
    const person = people.find((candidate) => candidate.id === id);
    if (!person) return [];
    const { full_name: name, relationship } = person;
    return [words.text(`who.${when}`, { name, relationship })];
  };
  const brings = says(escortId, 'morning');
  return [...says(carerId, 'night'), ...(brings.length > 0 ? brings : [open])];
}

export function morningsOf(household: Household, words: FamilyWords): NextMorning['mornings'] {
  return household.mornings.map((plan) => {
    const sun = sunOfMorning(plan, firstToCome(household.mornings, plan.seriesId));
    const params = {
      name: plan.callMe,
      number: plan.number,
      total: plan.ofPlanned,
      dayText: familyDay(plan.on, words.wording.profile).text,
    };
    const says =
      sun === 'done'
        ? words.text('morning.row-done', params)
        : sun === 'lost'
          ? words.text('morning.row-lost', params)
          : words.text('morning.row', { ...params, time: words.time(plan.arrivalAt) });
    const { morningId, childId, callMe, number, on } = plan;
    return { morningId, childId, callMe, number, on, says, sun };
  });
}
