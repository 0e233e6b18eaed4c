import type { Sequelize } from 'sequelize';
import { addDays, instantOf } from '../../shared/domain/zone';
import { familyTime } from '../../shared/languages/family-time';
import { select } from '../database/connection';
import { clinicWords, type ClinicWords } from '../wording/clinic-words';

/** One planned day of a site, as far as the moments of its night and morning need it. */
export interface PlannedDay {
  readonly plannedOn: string;
  readonly zone: string;
  /** 'HH:mm:ss' on the evening before. */
  readonly eveningTextTime: string;
  readonly questionMinutesBefore: number;
  readonly callListMinutesBefore: number;
  readonly firstArrivalAt: Date;
  readonly lastArrivalAt: Date;
}

export interface Moment {
  readonly says: string;
  readonly at: string;
}

type MomentName = 'evening' | 'question' | 'call-list' | 'first-arrival' | 'last-arrival';

const mostMoments = 12;
const minuteMs = 60_000;

/** The moments worth going to that are still to come, soonest first. @param now epoch milliseconds. */
export function momentsOf(
  days: readonly PlannedDay[],
  now: number,
  words: ClinicWords = clinicWords('en'),
): Moment[] {
  return days
    .flatMap((day) => momentsOfDay(day).map(([name, at]) => ({ name, at, zone: day.zone })))
    .filter(({ at }) => at > now)
    .sort((left, right) => left.at - right.at)
    .slice(0, mostMoments)
    .map(({ name, at, zone }) => ({
      says: words.text('clinic.moment.at', {
        moment: words.text(`clinic.moment.${name}`),
        time: familyTime(at, zone, words.profile).text,
      }),
      at: new Date(at).toISOString(),
    }));
}

function momentsOfDay(day: PlannedDay): [MomentName, number][] {
  const first = day.firstArrivalAt.getTime();
  const last = day.lastArrivalAt.getTime();
  const evening = instantOf({
    on: addDays(day.plannedOn, -1),
    time: day.eveningTextTime.slice(0, 5),
    zone: day.zone,
  });
  return [
    ['evening', evening],
    ['question', first - day.questionMinutesBefore * minuteMs],
    ['call-list', first - day.callListMinutesBefore * minuteMs],
    ['first-arrival', first],
    ...(last === first ? [] : [['last-arrival', last] as [MomentName, number]]),
  ];
}

export function plannedDays(db: Sequelize, now: number): Promise<PlannedDay[]> {
  return select<PlannedDay>(
    db,
    `SELECT m.planned_on AS plannedOn, s.zone, s.evening_text_time AS eveningTextTime,
       s.morning_question_minutes_before AS questionMinutesBefore,
       s.call_list_minutes_before AS callListMinutesBefore,
       MIN(m.arrival_at) AS firstArrivalAt, MAX(m.arrival_at) AS lastArrivalAt
     FROM mornings m JOIN sites s ON s.id = m.site_id
     WHERE m.state = 'planned' AND m.arrival_at > :now
     GROUP BY s.id, m.planned_on ORDER BY m.planned_on, s.id LIMIT 10`,
    { now: new Date(now) },
  );
}
