import type { ProposedDay, ProposedRun, Searched } from '../../shared/contracts/series';
import { limitsOn } from '../../shared/domain/morning-places';
import type { Run, SeriesProposal } from '../../shared/domain/series-dates';
import { compareDays } from '../../shared/domain/day';
import type { ClinicWords } from '../wording/clinic-words';
import { hoursSays } from './hours-says';
import { refusalSays } from './refusal-says';
import type { Search, SearchedChild } from './search';

/** Days and runs of a search as the screens read them. */
export function searchedSays(
  words: ClinicWords,
  search: Search,
  { days, runs }: SeriesProposal,
  children: readonly SearchedChild[],
): Searched {
  const callMe = new Map(children.map((child) => [child.childId, child.callMe]));
  return {
    days: days.map(({ on, placesLeft, refused, isPossible }): ProposedDay => ({
      on,
      placesLeft,
      placesInAll: search.request.places.length,
      isPossible,
      refused: refused.map((refusal) => ({
        code: refusal.code,
        says: refusalSays(words, refusal, callMe),
      })),
    })),
    runs: runs.map((run): ProposedRun => ({
      startsInDays: run.startsInDays,
      notes: notesOf(words, search, run, callMe),
      days: run.days.map(({ on, places }) => ({
        on,
        places: places.map(({ childId, arrivalTime, roomId }) => ({
          childId,
          arrivalTime,
          roomId,
        })),
      })),
    })),
  };
}

function notesOf(
  words: ClinicWords,
  { request }: Search,
  { days }: Run,
  callMe: ReadonlyMap<number, string>,
): string[] {
  const first = days[0]?.on ?? request.from;
  const last = days.at(-1)?.on ?? first;
  const birthdays = request.children.flatMap((child) =>
    (child.laterLimits ?? [])
      .filter(({ from }) => compareDays(from, first) > 0 && compareDays(from, last) <= 0)
      .map(({ from, longestMinutes }) =>
        words.text('clinic.proposal.limits-change', {
          day: words.day(from),
          child: callMe.get(child.id) ?? words.text('clinic.a-child'),
          hours: hoursSays(longestMinutes),
          before: hoursSays(limitsOn(child, first).longestMinutes),
        }),
      ),
  );
  const apart = days
    .filter(({ neighbouring }) => !neighbouring)
    .map(({ on }) => words.text('clinic.proposal.apart', { day: words.day(on) }));
  return [...birthdays, ...apart];
}

/** Whose hours, days and rooms a proposal rests on. */
export function restsOnSays(
  words: ClinicWords,
  { protocol, profile, rooms, site }: Search,
): { protocolSays: string; laboratorySays: string; capacitySays: string } {
  const closures = [...new Set(rooms.map(({ closureMinutes }) => closureMinutes))].sort(
    (left, right) => left - right,
  );
  return {
    protocolSays: words.sentence(protocol.says),
    laboratorySays: words.sentence(profile.says),
    capacitySays: words.text('clinic.proposal.capacity', {
      rooms: rooms.length,
      pairs: site.staffPairs,
      children: site.placesPerMorning,
      closures: words.list(closures.map(String)),
      wait: site.usualWaitMinutes,
    }),
  };
}
