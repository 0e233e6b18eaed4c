import { Temporal } from '@js-temporal/polyfill';
import { fastingPlan, type Feeding } from '../../shared/domain/fasting-plan';
import {
  items,
  startingProtocol,
  type FastingProtocol,
} from '../../shared/domain/fasting-protocol';
import {
  addDays,
  ageOn,
  dayOf,
  daysBetween,
  instantOf,
  localPartsOf,
  timeOfMinutes,
} from '../../shared/domain/zone';
import {
  differences,
  inZone,
  newestBefore,
  plainDay,
  read,
  readingsDiffer,
  transitionsOf,
} from './support/second-clock';
import { seeded } from './support/seeded';
import { clinicZones, difficultZones } from './support/zones';

const zones = [...clinicZones, ...difficultZones];
const changes = new Map(zones.map((zone) => [zone, transitionsOf(zone, 2020, 2035)]));
const minute = 60_000;
const firstDay = '2020-01-01';
const daysLong = daysBetween(firstDay, '2035-12-31');

it('the zones are at least 40', () => {
  expect(new Set(zones).size).toBe(zones.length);
  expect(zones.length).toBeGreaterThanOrEqual(40);
});

describe('20,000 cases by chance agree with a second implementation', () => {
  it('8,000 wall clocks are the same instants, every other one beside a change of the clock', () => {
    const chance = seeded(20_260_308);
    const kinds = { once: 0, twice: 0, never: 0 };
    const found = differences(8_000, (index) => {
      const zone = zones[index % zones.length] ?? '';
      const near = changes.get(zone) ?? [];
      const isNear = Math.floor(index / zones.length) % 2 === 0 && near.length > 0;
      const before = isNear ? localPartsOf(chance.oneOf(near).at - minute, zone) : null;
      const clock = before
        ? (before.hour * 60 + before.minute + chance.whole(-75, 75) + 1440) % 1440
        : chance.whole(0, 1439);
      const on = before?.on ?? addDays(firstDay, chance.whole(0, daysLong));
      const compared = readingsDiffer(on, timeOfMinutes(clock), zone);
      kinds[compared.kind] += 1;
      return compared.sides;
    });
    expect(found).toEqual([]);
    // The cases must be worth their while: many a time that occurs twice or never.
    expect(Math.min(kinds.twice, kinds.never)).toBeGreaterThan(300);
  });

  it('5,000 instants are the same days and times', () => {
    const chance = seeded(20_261_101);
    const found = differences(5_000, (index) => {
      const zone = zones[index % zones.length] ?? '';
      const near = changes.get(zone) ?? [];
      const instant =
        index % 2 === 0 && near.length > 0
          ? chance.oneOf(near).at + chance.whole(-200, 200) * minute
          : Date.UTC(2020, 0) + chance.whole(0, daysLong * 1440) * minute;
      const ours = localPartsOf(instant, zone);
      const theirs = inZone(instant, zone);
      const on = theirs.toPlainDate().toString();
      return [
        `${new Date(instant).toISOString()} ${zone}`,
        [dayOf(instant, zone), ours],
        [
          on,
          {
            on,
            time: theirs.toPlainTime().toString({ smallestUnit: 'minute' }),
            year: theirs.year,
            month: theirs.month,
            day: theirs.day,
            weekday: theirs.dayOfWeek,
            hour: theirs.hour,
            minute: theirs.minute,
          },
        ],
      ];
    });
    expect(found).toEqual([]);
  });

  it('4,000 days are added and counted, and ages told, by the same calendar', () => {
    const chance = seeded(29);
    const found = differences(4_000, (index) => {
      // Every fourth child is born on one of the last days of a month.
      const born = addDays('2010-01-01', chance.whole(0, 25 * 365));
      const bornOn =
        index % 4 === 0
          ? plainDay(born)
              .with({ day: chance.whole(28, 31) })
              .toString()
          : born;
      const days = index % 2 === 0 ? chance.whole(0, 800) : chance.whole(0, 6500);
      const on = addDays(bornOn, days);
      const { years, months } = ageOn(bornOn, on);
      const lived = plainDay(bornOn).until(plainDay(on), { largestUnit: 'months' });
      const inYears = plainDay(bornOn).until(plainDay(on), { largestUnit: 'years' });
      return [
        `${bornOn} and ${days} days`,
        [on, daysBetween(bornOn, on), months, years],
        [
          plainDay(bornOn).add({ days }).toString(),
          plainDay(bornOn).until(plainDay(on)).days,
          lived.months,
          inYears.years,
        ],
      ];
    });
    expect(found).toEqual([]);
  });

  const feedings: readonly Feeding[] = ['breast', 'formula', 'breast-and-formula', 'family-food'];
  it('3,000 fasting plans stop, wake, leave and eat again at the same instants', () => {
    const chance = seeded(47);
    const found = differences(3_000, (index) => {
      const zone = zones[index % zones.length] ?? '';
      const near = changes.get(zone) ?? [];
      // Every other one in a night when the clock changes.
      const on =
        index % 2 === 0 && near.length > 0
          ? dayOf(chance.oneOf(near).at, zone)
          : addDays(firstDay, chance.whole(0, daysLong));
      const arrivalTime = timeOfMinutes(chance.whole(5 * 60, 10 * 60));
      const hours = Object.fromEntries(items.map((item) => [item, chance.whole(4, 32) / 4]));
      const nothingFrom = index % 3 === 0 ? timeOfMinutes(chance.whole(0, 95) * 15) : null;
      const protocol: FastingProtocol = {
        ...startingProtocol,
        usualWaitMinutes: chance.whole(0, 90),
        eatAgainAfterMinutes: chance.whole(5, 60),
        bands: [
          {
            fromMonths: 3,
            toMonths: null,
            individualPlan: false,
            leastHours: hours as never,
            longestHours: 40,
            nothingFrom,
          },
        ],
      };
      const [travelMinutes, readyMinutes] = [chance.whole(0, 120), chance.whole(0, 60)];
      const nightFeed = index % 3 === 1 ? timeOfMinutes(chance.whole(0, 1439)) : null;
      const plan = fastingPlan({
        arrivalAt: instantOf({ on, time: arrivalTime, zone }),
        zone,
        bornOn: addDays(on, -chance.whole(100, 4000)),
        feeding: chance.oneOf(feedings),
        protocol,
        cautions: [],
        travelMinutes,
        readyMinutes,
        usual: { lastMealTime: null, nightFeedTimes: nightFeed === null ? [] : [nightFeed] },
      });
      if (plan.kind !== 'standard') return [on, plan.reason, 'a standard plan'];

      const arrival = read(on, arrivalTime, zone, 'later');
      const minutes = (by: number) => new Temporal.Duration(0, 0, 0, 0, 0, by);
      const arriveAt = arrival.toInstant();
      const collection = arriveAt.add(minutes(protocol.usualWaitMinutes));
      const leave = arriveAt.subtract(minutes(travelMinutes));
      const byClock =
        nothingFrom === null ? Number.POSITIVE_INFINITY : newestBefore(arrival, nothingFrom);
      const theirs = {
        stops: items
          .filter((item) => item !== 'tube-feed')
          .map((item) => {
            const elapsed = minutes((hours[item] ?? 0) * 60);
            return [item, Math.min(arriveAt.subtract(elapsed).epochMilliseconds, byClock)];
          }),
        leaveAt: leave.epochMilliseconds,
        wakeAt: leave.subtract(minutes(readyMinutes)).epochMilliseconds,
        eatAgainAt: collection.add(minutes(protocol.eatAgainAfterMinutes)).epochMilliseconds,
        earliestLastMealAt: collection.subtract({ hours: 40 }).epochMilliseconds,
        nightFeedAt: nightFeed === null ? null : newestBefore(arrival, nightFeed),
      };
      const ours = {
        stops: plan.stops.map(({ item, stopAt }) => [item, stopAt]),
        leaveAt: plan.leaveAt,
        wakeAt: plan.wakeAt,
        eatAgainAt: plan.eatAgainAt,
        earliestLastMealAt: plan.earliestLastMealAt,
        nightFeedAt: plan.nightFeeds[0]?.at ?? null,
      };
      return [`${on} ${arrivalTime} ${zone}, nothing from ${nothingFrom}`, ours, theirs];
    });
    expect(found).toEqual([]);
  });
});
