import type { Difference, ProfileValues, ProtocolValues } from '../../shared/contracts/protocols';
import type { Weekday } from '../../shared/domain/day';
import { items } from '../../shared/domain/fasting-protocol';
import { resultStages } from '../../shared/domain/specimen-clocks';
import { minutesInWords } from '../wording/clinic-measures';
import type { ClinicWords } from '../wording/clinic-words';
import { ageOfBand } from './band-words';

type Band = ProtocolValues['bands'][number];
/** Labels and values of one version, in the order in which they are read. */
type Lines = ReadonlyMap<string, string>;

/** Every line that reads differently, in the order of the new version; what falls away comes last. */
function differencesBetween(before: Lines, after: Lines): Difference[] {
  const labels = [...new Set([...after.keys(), ...before.keys()])];
  return labels
    .map((says) => ({ says, before: before.get(says) ?? null, after: after.get(says) ?? null }))
    .filter((line) => line.before !== line.after);
}

export const protocolDifferences = (
  words: ClinicWords,
  before: ProtocolValues | null,
  after: ProtocolValues,
): Difference[] =>
  differencesBetween(
    before ? protocolLines(words, before) : new Map(),
    protocolLines(words, after),
  );

function protocolLines(words: ClinicWords, values: ProtocolValues): Lines {
  const label = (key: string): string => words.text(`clinic.protocol.${key}`);
  const listed = (keys: readonly string[]): string =>
    keys.length === 0
      ? words.text('clinic.protocol.none')
      : words.list(keys.map((key) => words.text(key)));
  const { wakeToCollectionMinutes: wake } = values;
  return new Map([
    ...values.bands.map((band): [string, string] => [
      ageOfBand(words, band),
      bandSays(words, band),
    ]),
    [label('usual-wait'), minutesInWords(words, values.usualWaitMinutes)],
    [label('eat-again'), minutesInWords(words, values.eatAgainAfterMinutes)],
    [
      label('wake-to-collection'),
      wake === null ? words.text('clinic.protocol.none') : minutesInWords(words, wake),
    ],
    [
      label('allowed'),
      listed(values.allowedItems.map((item) => `clinic.protocol.allowed.${item}`)),
    ],
    [
      label('cautions'),
      listed(values.individualPlanCautions.map((one) => `clinic.protocol.caution.${one}`)),
    ],
  ]);
}

/** '4 h, at most 6 h', 'milk 4 h, water 2 h, at most 8 h', 'individual plan'. */
function bandSays(
  words: ClinicWords,
  { individualPlan, leastHours, longestHours, nothingFrom }: Band,
) {
  if (individualPlan || !leastHours) return words.text('clinic.protocol.individual');
  const hours = (value: number): string =>
    words.text('clinic.protocol.hours', { hours: String(value) });
  const all = new Set(items.map((item) => leastHours[item]));
  const [only] = all;
  const least =
    all.size === 1 && only !== undefined
      ? hours(only)
      : items
          .map((item) =>
            words.text('clinic.protocol.item-hours', {
              item: words.text(`clinic.protocol.item.${item}`),
              hours: hours(leastHours[item]),
            }),
          )
          .join(', ');
  return [
    least,
    ...(nothingFrom === null
      ? []
      : [words.text('clinic.protocol.nothing-from', { time: nothingFrom })]),
    ...(longestHours === null
      ? []
      : [words.text('clinic.protocol.at-most', { hours: hours(longestHours) })]),
  ].join('; ');
}

export const profileDifferences = (
  words: ClinicWords,
  before: ProfileValues | null,
  after: ProfileValues,
): Difference[] =>
  differencesBetween(before ? profileLines(words, before) : new Map(), profileLines(words, after));

function profileLines(words: ClinicWords, values: ProfileValues): Lines {
  const label = (key: string): string => words.text(`clinic.profile.${key}`);
  const { neutraliseWithinMinutes: neutralise } = values;
  return new Map([
    [label('name'), values.name],
    ...values.receivingWeekdays.map((weekday): [string, string] => [
      words.weekday(weekday),
      receivingSays(words, values, weekday),
    ]),
    [label('way'), minutesInWords(words, values.minutesToLaboratory)],
    [
      label('neutralise'),
      neutralise === null ? label('not-by-clinic') : minutesInWords(words, neutralise),
    ],
    [label('receipt'), minutesInWords(words, values.receiptWithinMinutes)],
    [
      label('volume'),
      words.text('clinic.profile.volume-range', {
        least: String(values.minimumVolumeMl),
        most: String(values.maximumVolumeMl),
      }),
    ],
    ...resultStages.map((stage): [string, string] => [
      label(stage),
      words.text('clinic.days', { count: values.resultDays[stage] }),
    ]),
  ]);
}

function receivingSays(words: ClinicWords, values: ProfileValues, weekday: Weekday): string {
  const from = values.receivingFromTimes[`${weekday}`];
  const until = values.cutOffTimes[`${weekday}`];
  if (from !== undefined && until !== undefined)
    return words.text('clinic.profile.from-until', { from, until });
  if (from !== undefined) return words.text('clinic.profile.from', { from });
  return until === undefined
    ? words.text('clinic.profile.all-day')
    : words.text('clinic.profile.until', { until });
}
