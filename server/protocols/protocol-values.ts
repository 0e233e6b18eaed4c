import type { ProtocolValues } from '../../shared/contracts/protocols';
import type { FieldProblem } from '../../shared/contracts/protocols';
import {
  items,
  startingProtocol,
  type FastingBand,
  type FastingProtocol,
} from '../../shared/domain/fasting-protocol';
import { validateProtocol } from '../../shared/domain/fasting-protocol-problems';
import type { Day } from '../../shared/domain/day';
import type { Site } from '../sites/sites';
import type { ClinicWords } from '../wording/clinic-words';
import { wholeProtocolBody, type ProtocolBody, type StoredProtocolBody } from './protocols';
import type { DraftRow, VersionRow } from './versions';

/** A version as its editor knows it. */
export function protocolValuesOf(row: VersionRow): ProtocolValues {
  const body = wholeProtocolBody(row.body as StoredProtocolBody);
  return {
    title: row.title,
    effectiveOn: row.effective_on,
    usualWaitMinutes: body.usualWaitMinutes,
    eatAgainAfterMinutes: body.eatAgainAfterMinutes,
    allowedItems: [...body.allowedItems],
    individualPlanCautions: [...body.individualPlanCautions],
    wakeToCollectionMinutes: body.wakeToCollectionMinutes,
    bands: body.bands.map((band) => ({
      ...band,
      leastHours: band.leastHours ? { ...band.leastHours } : null,
    })),
  };
}

/** A band with an individual plan holds no hours, whatever stood in its fields before. */
function bandOf(band: ProtocolValues['bands'][number]): FastingBand {
  return band.individualPlan
    ? { ...band, leastHours: null, longestHours: null, nothingFrom: null }
    : band;
}

export function protocolFrom(values: ProtocolValues, version = 0): FastingProtocol {
  return {
    ...values,
    version,
    bands: values.bands.map(bandOf),
    isStartingValues: false,
    signedBy: null,
    signedOn: null,
  };
}

export function protocolRowOf(values: ProtocolValues): DraftRow {
  const { title, effectiveOn } = values;
  const body: ProtocolBody = {
    usualWaitMinutes: values.usualWaitMinutes,
    eatAgainAfterMinutes: values.eatAgainAfterMinutes,
    allowedItems: values.allowedItems,
    individualPlanCautions: values.individualPlanCautions,
    wakeToCollectionMinutes: values.wakeToCollectionMinutes,
    bands: values.bands.map(bandOf),
  };
  return { title, effectiveOn, body, hasStartingValues: hasStartingHours(body.bands) };
}

/** Whether every hour is still the one that was shipped. */
function hasStartingHours(bands: readonly FastingBand[]): boolean {
  const told = (of: readonly FastingBand[]): string =>
    JSON.stringify(
      of.map((band) => [
        band.fromMonths,
        band.toMonths,
        band.individualPlan,
        items.map((item) => band.leastHours?.[item] ?? null),
        band.longestHours,
        band.nothingFrom,
      ]),
    );
  return told(bands) === told(startingProtocol.bands);
}

export interface When {
  readonly today: Day;
  /** The first day may be today only where nothing is in force yet: mornings of today keep their hours. */
  readonly earliest: Day;
}

/** Everything to mend before signing, in the reader's language, each with the path of its field. */
export function protocolProblems(
  words: ClinicWords,
  values: ProtocolValues,
  site: Site,
  when: When,
): FieldProblem[] {
  const protocol = protocolFrom(values);
  // The site's wait is what mornings are planned with; the longer of both must fit.
  const usualWaitMinutes = Math.max(protocol.usualWaitMinutes, site.usualWaitMinutes);
  return [
    ...titleProblems(values.title),
    ...dayProblems(values.effectiveOn, when),
    ...validateProtocol(
      { ...protocol, usualWaitMinutes },
      { lastArrivalTime: site.arrivals.until },
    ),
  ].map(({ path, message }) => ({ path, message: words.sentence(message) }));
}

function titleProblems(title: string): FieldProblem[] {
  if (title.trim() === '') return [{ path: 'title', message: 'Give this version a title.' }];
  return title === startingProtocol.title
    ? [{ path: 'title', message: 'Give this version a title of your own: you confirm its hours.' }]
    : [];
}

export function dayProblems(effectiveOn: Day, { today, earliest }: When): FieldProblem[] {
  if (effectiveOn >= earliest) return [];
  const message =
    earliest === today
      ? 'Choose today or a later day.'
      : 'Choose tomorrow or a later day: mornings of today keep their hours.';
  return [{ path: 'effectiveOn', message }];
}
