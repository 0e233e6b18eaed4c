import type { MorningQuestion } from '../../shared/contracts/family-morning';
import type { Day, Instant } from '../../shared/domain/day';
import { recordViewOnce } from '../access-record/record-view-once';
import type { Actor } from '../access-record/record';
import type { FamilyVisitor } from '../auth/current-user';
import { closedToday } from '../closing/closed-today';
import type { Context } from '../context';
import { Problem } from '../http/problem';
import type { MorningPlan } from '../series/morning-plans';
import { siteOf } from '../sites/sites';
import { shownPhone } from '../messages/shown-phone';
import {
  faceOf,
  familyWords,
  ownPlansSay,
  protocolSays,
  protocolsOf,
  type FamilyWords,
} from './family-words';
import { householdOf, standardPlanOf, type HouseholdNight } from './household-night';
import { standingOutcome } from './morning-outcome';
import { sunsSaid } from './next-morning';
import { questionState } from './open-night';
import { questionWords } from './outcome-words';
import { skiesOf, skyAt } from './sky';
import { toldRows } from './told-rows';

const minute = 60_000;
const stepMinutes = 30;
/** Without a plan of hours the list reaches back this far. */
const individualReachMinutes = 8 * 60;
const lateByMinutes = [15, 30, 45, 60, 90];

/**
 * The question of the day, one screen a child, with every answer and every time as ready words.
 * @throws Problem 404 'no-question' when the family has no morning to be asked about.
 */
export async function morningQuestionOf(
  context: Context,
  actor: Actor,
  visitor: FamilyVisitor,
  on?: Day,
): Promise<MorningQuestion> {
  const { db } = context;
  const now = context.clock.now();
  const household = await householdOf(db, visitor, now);
  const night =
    on === undefined ? household.next : (household.nights.find((one) => one.on === on) ?? null);
  if (!night) throw await noQuestion(context, visitor, household.mornings);
  const words = await familyWords(context, visitor.language, night.site);
  const rows = await toldRows(
    db,
    night.children.map(({ morningId }) => morningId),
  );
  await recordViewOnce(context, actor, {
    matter: 'morning-question',
    childIds: night.children.map(({ childId }) => childId),
    detail: { on: night.on },
    at: now,
  });
  const state = questionState(night, now);
  const protocols = protocolsOf(night.children);
  return {
    now: new Date(now).toISOString(),
    on: night.on,
    state,
    stateSays:
      closedToday(household.mornings, now, words)?.heading ?? stateSays(night, state, words),
    skies: skiesOf(night.on, night.zone),
    ...sunsSaid(household, words),
    questions: night.children.map((plan) => questionOf(plan, night, words, now)),
    saved: savedWords(night, words),
    changes: changesOf(night, words, now),
    outcome: standingOutcome(night, rows, words),
    protocolSays: [
      ...[...protocols.values()].map((protocol) => protocolSays(words, night.site, protocol)),
      ...ownPlansSay(words, night.children),
    ].join(' '),
  };
}

async function noQuestion(
  context: Context,
  visitor: FamilyVisitor,
  mornings: readonly MorningPlan[],
): Promise<Problem> {
  const [first] = mornings;
  const site = first ? await siteOf(context.db, first.siteId) : null;
  const words = await familyWords(context, visitor.language, site);
  const phone = site?.phone ?? '';
  const shown = site ? shownPhone(phone, site.country) : '';
  const closed = closedToday(mornings, context.clock.now(), words);
  const says = closed?.heading ?? words.text('question.none', { phone: shown });
  return new Problem(404, 'no-question', says, { phone, detail: closed?.subheading });
}

function stateSays(
  night: HouseholdNight,
  state: MorningQuestion['state'],
  words: FamilyWords,
): string {
  if (state === 'closed')
    return words.text('question.state.closed', {
      phone: shownPhone(night.site.phone, night.site.country),
    });
  if (state === 'open')
    return words.text('question.state.open', { time: words.time(night.callListAt) });
  const { questionOpensAt } = night;
  return words.text('question.state.too-early', {
    weekday: words.weekday(questionOpensAt),
    time: words.time(questionOpensAt),
  });
}

function questionOf(
  plan: MorningPlan,
  night: HouseholdNight,
  words: FamilyWords,
  now: Instant,
): MorningQuestion['questions'][number] {
  const { asks, choices } = questionWords(plan, words);
  const { morningId, childId, callMe } = plan;
  return {
    morningId,
    childId,
    callMe,
    face: faceOf(plan),
    asks,
    hint: words.text('question.hint'),
    choices: choices.map((choice) => ({ ...choice, picture: pictureOf(choice.answer, plan) })),
    whenAsks: words.text('question.when.asks', { name: callMe }),
    whenHint: words.text('question.when.hint'),
    whenChoices: [
      ...timesOf(plan, night, now).map((at) => ({
        at: new Date(at).toISOString(),
        says: words.text('question.when.at', { time: words.time(at) }),
        sky: skyAt(at, plan.zone),
      })),
      { at: null, says: words.text('question.when.unknown'), sky: 'night' },
    ],
  };
}

/**
 * From the stop on, every half hour as instants: on the night the clock changes no hour is skipped or asked twice. Before
 * the question opens the list runs up to the arrival, so that a page kept without signal can still be answered.
 */
function timesOf(plan: MorningPlan, night: HouseholdNight, now: Instant): Instant[] {
  const until =
    now < night.questionOpensAt ? night.questionClosesAt : Math.min(now, night.questionClosesAt);
  const from = standardPlanOf(plan)?.stopAt ?? plan.arrivalAt - individualReachMinutes * minute;
  const times: Instant[] = [];
  for (let at = from; at <= until; at += stepMinutes * minute) times.push(at);
  const last = times.at(-1) ?? from;
  // "Take the later of two times": the minute of now is the later one for whoever has just finished.
  const thisMinute = Math.floor(until / minute) * minute;
  if (thisMinute - last >= 5 * minute) times.push(thisMinute);
  return times;
}

function pictureOf(answer: string, { feeding }: MorningPlan): string {
  if (answer === 'nothing') return 'solid-food-not';
  if (answer === 'sip') return 'sip';
  if (answer === 'unsure') return 'unsure';
  if (feeding === 'family-food') return 'solid-food';
  return feeding === 'formula' ? 'formula-bottle' : 'breast-feeding';
}

function savedWords(night: HouseholdNight, words: FamilyWords): MorningQuestion['saved'] {
  const phone = shownPhone(night.site.phone, night.site.country);
  return {
    heading: words.text('saved.heading'),
    lines: [
      words.text('saved.sends-itself'),
      ...stillNothing(night, words),
      words.text('saved.call', { phone }),
    ],
    textInstead: words.text('saved.text-instead', { phone }),
  };
}

/** A child whose own plan nobody has composed is never told to go on without food. */
function stillNothing(night: HouseholdNight, words: FamilyWords): string[] {
  const children = night.children.filter((child) => standardPlanOf(child) !== null);
  if (children.length === 0) return [];
  return [words.text('saved.still-nothing', { children: words.list(children) })];
}

function changesOf(
  night: HouseholdNight,
  words: FamilyWords,
  now: Instant,
): MorningQuestion['changes'] {
  return {
    ill: {
      says: words.text('change.ill.says'),
      hint: words.text('change.ill.hint'),
      asks: words.text('change.ill.asks'),
      choices: [
        { isAwake: true, says: words.text('change.ill.awake') },
        { isAwake: false, says: words.text('change.ill.not-awake') },
      ],
    },
    late: {
      says: words.text('change.late.says'),
      asks: words.text('change.late.asks'),
      choices: lateByMinutes
        .map((minutes) => night.firstArrivalAt + minutes * minute)
        .filter((at) => at > now)
        .map((at) => ({
          at: new Date(at).toISOString(),
          says: words.text('change.late.choice', { time: words.time(at) }),
        })),
    },
    notComing: {
      says: words.text('change.not-coming.says'),
      asks: words.text('change.not-coming.asks'),
      confirm: words.text('change.not-coming.confirm'),
    },
  };
}
