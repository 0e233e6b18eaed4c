import type { z } from 'zod';
import type { ReplanProposal, replanProposalRequest } from '../../shared/contracts/replan';
import type { DayPlaces } from '../../shared/contracts/series';
import {
  missingOf,
  replanOffers,
  searchFrom,
  withoutSpecimen,
  type ReplanOffer,
} from '../../shared/domain/replan';
import { proposeRuns, type RunDay, type SeriesRequest } from '../../shared/domain/series-dates';
import { dayOf } from '../../shared/domain/zone';
import { can, isRole } from '../../shared/access/rights';
import { record, type Actor } from '../access-record/record';
import type { StaffMember } from '../auth/current-user';
import type { Context } from '../context';
import { siteOf } from '../sites/sites';
import { ageInWords } from '../wording/clinic-measures';
import { clinicWords, type ClinicWords } from '../wording/clinic-words';
import { restsOnSays, searchedSays } from './proposal-says';
import { searchFor, type Search } from './search';
import { seriesToReplan, type ReplanSeries } from './series-to-replan';

type Wanted = z.output<typeof replanProposalRequest>;
type Offer = ReplanProposal['offers'][number];
const nothing = { days: [], runs: [] };

/** Whether this person chooses what becomes of a series; others prepare it. */
export const mayChoose = (staff: StaffMember): boolean =>
  can(staff.roles.filter(isRole), 'series.close');

/** What can be done about missing mornings, or where planned ones can go; with all days and runs to choose from. */
export async function proposeReplan(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  wanted: Wanted,
): Promise<ReplanProposal> {
  const proposal = await replanFor(context, staff, wanted);
  await record(context.db, undefined, actor, {
    action: 'seen',
    matter: 'replan-proposal',
    childIds: proposal.children.map(({ childId }) => childId),
    at: context.clock.now(),
  });
  return proposal;
}

/** The proposal without noting that somebody has seen it. */
export async function replanFor(
  { db, clock }: Context,
  staff: StaffMember,
  wanted: Wanted,
): Promise<ReplanProposal> {
  const now = clock.now();
  const words = clinicWords(staff.language);
  const series = await seriesToReplan(db, staff, wanted.seriesIds);
  const { siteId } = series[0];
  const today = dayOf(now, (await siteOf(db, siteId)).zone);
  const search = await searchFor(db, {
    siteId,
    children: series,
    from: today,
    weeks: wanted.weeks,
    count: 1,
    now,
    needsRide: series.some(({ needsRide }) => needsRide),
    siblingsMayPart: wanted.siblingsMayPart,
    withoutSeriesIds: series.map(({ seriesId }) => seriesId),
    language: staff.language,
  });
  const asked = { words, search, series };
  const offers = replanOffers({
    series,
    search: search.request,
    longestGapDays: search.longestGapDays,
  });
  const isClosed = series.every(({ state }) => state === 'closed');
  return {
    children: series.map((one) => ({
      seriesId: one.seriesId,
      childId: one.childId,
      fullName: one.fullName,
      ageInWords: ageInWords(words, one.bornOn, today),
      version: one.version,
      morningsPlanned: one.plannedCount,
      collected: one.mornings.filter(({ state }) => state === 'collected').length,
      missing: missingOf(one),
      mornings: one.mornings.map(({ morningState, morningId, number, on, ...rest }) => ({
        morningId,
        number,
        on,
        arrivalTime: rest.arrivalTime,
        state: morningState,
        lostReason: rest.lostReason,
      })),
    })),
    offers: isClosed
      ? []
      : [
          nextMorning(asked, offers),
          newRun(asked, offers),
          closing(asked),
          ...moving(asked, wanted),
        ],
    mayChoose: mayChoose(staff),
    ...restsOnSays(words, search),
  };
}

interface Asked {
  readonly words: ClinicWords;
  readonly search: Search;
  readonly series: readonly ReplanSeries[];
}

function nextMorning({ words, search, series }: Asked, offers: readonly ReplanOffer[]): Offer {
  const missing = series.filter((one) => missingOf(one) > 0);
  const kind = 'next-possible-morning';
  if (missing.length === 0) return impossible(kind, words.text('clinic.replan.nothing-missing'));
  const found = offers.find((offer) => offer.kind === kind);
  const held = missing.flatMap(({ mornings }) =>
    mornings.filter(({ state }) => state !== 'lost').map(({ on }) => on),
  );
  return {
    kind,
    isPossible: found !== undefined,
    whyNot: found ? null : words.text('clinic.replan.no-day'),
    days: found ? [placesOf(found.day)] : [],
    search: searchedFor({ words, search, series: missing }, { count: 1, heldDays: held }),
  };
}

function newRun({ words, search, series }: Asked, offers: readonly ReplanOffer[]): Offer {
  const kind = 'new-run';
  const counts = [...new Set(series.map(withoutSpecimen))];
  const [count = 0] = counts;
  if (counts.length > 1) return impossible(kind, words.text('clinic.replan.unequal'));
  if (count === 0) return impossible(kind, words.text('clinic.replan.complete'));
  const found = offers.find((offer) => offer.kind === kind);
  return {
    kind,
    isPossible: found !== undefined,
    whyNot: found ? null : words.text('clinic.replan.no-run'),
    days: found ? found.run.days.map(placesOf) : [],
    search: searchedFor({ words, search, series }, { count }),
  };
}

function closing({ words, series }: Asked): Offer {
  const kind = 'close-with-fewer';
  if (series.every((one) => withoutSpecimen(one) === 0))
    return impossible(kind, words.text('clinic.replan.complete'));
  if (series.some(({ mornings }) => mornings.some(isGoingOn)))
    return impossible(kind, words.text('clinic.replan.going-on'));
  return { kind, isPossible: true, whyNot: null, days: [], search: nothing };
}

const isGoingOn = ({ morningState }: ReplanSeries['mornings'][number]): boolean =>
  morningState === 'here' || morningState === 'collecting';

/** Nothing is lost: mornings that are planned go to other days or times. */
function moving({ words, search, series }: Asked, { movedMorningIds }: Wanted): Offer[] {
  if (movedMorningIds.length === 0) return [];
  const kind = 'move';
  const moved = series.flatMap((one) =>
    one.mornings
      .filter(({ morningId, state }) => movedMorningIds.includes(morningId) && state === 'planned')
      .map(({ on }) => ({ one, on })),
  );
  const count = new Set(moved.map(({ on }) => on)).size;
  const concerned = series.filter((one) => moved.some((morning) => morning.one === one));
  const isEven = concerned.every(
    (one) => moved.filter((morning) => morning.one === one).length === count,
  );
  if (count === 0) return [impossible(kind, words.text('clinic.replan.nothing-to-move'))];
  if (!isEven) return [impossible(kind, words.text('clinic.replan.unequal'))];
  const heldDays = concerned.flatMap(({ mornings }) =>
    mornings
      .filter(({ state, morningId }) => state !== 'lost' && !movedMorningIds.includes(morningId))
      .map(({ on }) => on),
  );
  const found = searchedFor({ words, search, series: concerned }, { count, heldDays });
  return [
    {
      kind,
      isPossible: found.runs.length > 0,
      whyNot: found.runs.length > 0 ? null : words.text('clinic.replan.no-run'),
      days: [],
      search: found,
    },
  ];
}

function searchedFor(
  { words, search, series }: Asked,
  more: Pick<SeriesRequest, 'count' | 'heldDays'>,
): Offer['search'] {
  const ids = new Set(series.map(({ childId }) => childId));
  const children = search.request.children.filter(({ id }) => ids.has(id));
  const request = { ...search.request, ...more, children };
  const from = more.heldDays
    ? request.from
    : searchFrom({ series, search: request, longestGapDays: search.longestGapDays });
  return searchedSays(words, search, proposeRuns({ ...request, from }), series);
}

const impossible = (kind: Offer['kind'], whyNot: string): Offer => ({
  kind,
  isPossible: false,
  whyNot,
  days: [],
  search: nothing,
});

const placesOf = ({ on, places }: RunDay): DayPlaces => ({
  on,
  places: places.map(({ childId, arrivalTime, roomId }) => ({ childId, arrivalTime, roomId })),
});
