import type { BandPreview, ProtocolCheck, ProtocolValues } from '../../shared/contracts/protocols';
import type { Feeding } from '../../shared/contracts/common';
import { addDays, ageOn, type Day, type Instant } from '../../shared/domain/day';
import { fastingPlan, type IndividualReason } from '../../shared/domain/fasting-plan';
import {
  clockChangeBetween,
  dayOf,
  instantOf,
  millisecondsPerMinute,
} from '../../shared/domain/zone';
import type { Context } from '../context';
import { familyWords, type FamilyWords } from '../fasting/family-words';
import type { HouseholdNight } from '../fasting/household-night';
import { nightPath } from '../fasting/night-path';
import type { MorningPlan } from '../series/morning-plans';
import type { Site } from '../sites/sites';
import type { ClinicWords } from '../wording/clinic-words';
import { ageOfBand } from './band-words';
import { protocolFrom } from './protocol-values';

type Band = ProtocolValues['bands'][number];
type Preview = NonNullable<ProtocolCheck['preview']>;

/** An invented household: half an hour away, three quarters of an hour to get ready. */
const example = { callMe: 'Noor', travelMinutes: 30, readyMinutes: 45 };

/**
 * What a family of each age would read with these values: the same path and the same wording that families get, for an
 * invented child of the middle of the band. Nothing is stored.
 */
export async function previewOf(
  context: Context,
  words: ClinicWords,
  site: Site,
  values: ProtocolValues,
  wanted: { readonly language: string; readonly arrivalTime: string; readonly on: Day | null },
): Promise<Preview> {
  const family = await familyWords(context, wanted.language, site);
  const nights = nightsOf(words, site, context.clock.now());
  const night = nights.find(({ on }) => on === wanted.on) ?? nights[0];
  const bands = values.bands.flatMap((band, index) =>
    feedingsOf(band).map((feeding) =>
      bandPreview({
        words,
        family,
        site,
        values,
        band,
        index,
        feeding,
        on: night.on,
        arrivalTime: wanted.arrivalTime,
      }),
    ),
  );
  return {
    language: wanted.language,
    dir: family.wording.dir,
    on: night.on,
    nightSays: night.says,
    draftNotice: family.wording.draftNotice(Object.keys(family.used())),
    nights: [...nights],
    bands,
  };
}

type Night = Preview['nights'][number];
const daysLookedAhead = 370;

/** Tonight, and the next night on which the clock goes forward, and back. */
function nightsOf(words: ClinicWords, site: Site, now: Instant): [Night, ...Night[]] {
  const tonight = addDays(dayOf(now, site.zone), 1);
  const told = new Map<number, Night>();
  const week = 7 * 24 * 60 * millisecondsPerMinute;
  for (let from = now; from < now + (daysLookedAhead / 7) * week; from += week) {
    const change = clockChangeBetween(from, from + week, site.zone);
    const direction = Math.sign(change?.shiftMinutes ?? 0);
    if (!change || told.has(direction)) continue;
    const on = dayOf(change.at, site.zone);
    const key = direction > 0 ? 'forward' : 'back';
    told.set(direction, {
      on,
      says: words.text(`clinic.preview.clock-goes-${key}`, { day: words.day(on) }),
    });
  }
  const says = words.text('clinic.preview.tonight', { day: words.day(tonight) });
  const changes = [...told.values()].sort((one, other) => one.on.localeCompare(other.on));
  return [{ on: tonight, says }, ...changes.filter(({ on }) => on !== tonight)];
}

/** Babies have milk; from the first birthday on the family's food. */
function feedingsOf({ fromMonths, toMonths, individualPlan }: Band): (Feeding | null)[] {
  if (individualPlan) return [null];
  if (fromMonths >= 12) return ['family-food'];
  const milk: Feeding[] = ['breast', 'formula', 'breast-and-formula'];
  return toMonths === null || toMonths >= 12 ? [...milk, 'family-food'] : milk;
}

interface PreviewRequest {
  readonly words: ClinicWords;
  readonly family: FamilyWords;
  readonly site: Site;
  readonly values: ProtocolValues;
  readonly band: Band;
  readonly index: number;
  readonly feeding: Feeding | null;
  readonly on: Day;
  readonly arrivalTime: string;
}

function bandPreview(request: PreviewRequest): BandPreview {
  const { words, family, band, index, feeding } = request;
  const common = {
    band: index,
    age: ageOfBand(words, band),
    feeding,
    feedingSays: feeding && words.text(`clinic.preview.feeding.${feeding}`),
  };
  const child = exampleChild(request);
  if (child.plan.kind === 'individual')
    return {
      ...common,
      steps: null,
      text: null,
      individualSays: words.text(`clinic.preview.individual.${reasonKey(child.plan.reason)}`),
    };
  const { stopAt } = child.plan;
  return {
    ...common,
    individualSays: null,
    steps: nightPath(nightOf(child), family).map(({ time, title, lines, isLoud, isAbout }) => ({
      time: isAbout ? family.text('time.about', { time: time.clock }) : time.clock,
      dayPart: time.dayPart,
      title,
      lines,
      isLoud,
    })),
    text: family.text('message.evening.line', {
      label: child.familyLabel,
      time: family.stopTime(stopAt),
    }),
  };
}

const reasonKey = (reason: IndividualReason): string =>
  reason === 'fast-too-long' || reason === 'not-in-protocol' ? reason : 'age';

/** Born so that the child is in the middle of the band on that day; a year into a band without an end. */
function bornOnOf({ fromMonths, toMonths }: Band, on: Day): Day {
  const last = Math.max(toMonths ?? fromMonths + 12, fromMonths);
  const ageMonths = Math.floor((fromMonths + last) / 2);
  const [year = 0, month = 1] = on.split('-').map(Number);
  const begun = year * 12 + (month - 1) - ageMonths;
  const born = `${Math.floor(begun / 12)}-${String((begun % 12) + 1).padStart(2, '0')}-01`;
  return ageOn(born, on).months === ageMonths ? born : addDays(born, -1);
}

function exampleChild({
  site,
  values,
  band,
  feeding,
  on,
  arrivalTime,
}: PreviewRequest): MorningPlan {
  const arrivalAt = instantOf({ on, time: arrivalTime, zone: site.zone });
  const bornOn = bornOnOf(band, on);
  const { callMe, travelMinutes, readyMinutes } = example;
  const protocol = protocolFrom(values);
  return {
    ...{ morningId: 1, version: 1, seriesId: 1, orderId: 1, childId: 1, householdId: 1, roomId: 1 },
    ...{ siteId: site.id, site, zone: site.zone, roomName: '', fullName: callMe, callMe },
    ...{ familyLabel: callMe, bornOn, feeding: feeding ?? 'family-food', cautions: [] },
    ...{ number: 1, ofPlanned: 3, on, arrivalTime, arrivalAt, expectedAt: null, arrivedAt: null },
    ...{ fedAt: null, leftAt: null, state: 'planned', lostReason: null, calendarUid: '' },
    ...{ escortFamilyMemberId: null, nightCarerFamilyMemberId: null, calendarSequence: 0 },
    ...{ travelMinutes, readyMinutes, laboratoryProfileId: 1, individualPlan: null },
    protocol: { ...protocol, id: 0, siteId: site.id, signedAt: null, says: '' },
    plan: fastingPlan({
      arrivalAt,
      zone: site.zone,
      bornOn,
      feeding: feeding ?? 'family-food',
      protocol,
      cautions: [],
      travelMinutes,
      readyMinutes,
      usualWaitMinutes: site.usualWaitMinutes,
    }),
  };
}

function nightOf(child: MorningPlan): HouseholdNight {
  const { on, site, zone, arrivalAt } = child;
  return {
    on,
    site,
    zone,
    children: [child],
    firstArrivalAt: arrivalAt,
    lastArrivalAt: arrivalAt,
    questionOpensAt: arrivalAt - site.morningQuestionMinutesBefore * millisecondsPerMinute,
    questionClosesAt: arrivalAt,
    callListAt: arrivalAt - site.callListMinutesBefore * millisecondsPerMinute,
  };
}
