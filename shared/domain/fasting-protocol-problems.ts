/** What must be mended before a clinician may sign a fasting protocol, each beside its field. */
import { cautions, type Caution } from './cautions';
import { minutesOfTime, type LocalTime } from './day';
import { items, type FastingBand, type FastingProtocol } from './fasting-protocol';

export type ProtocolProblemCode =
  | 'no-bands'
  | 'not-from-birth'
  | 'gap'
  | 'overlap'
  | 'open-band-not-last'
  | 'not-to-the-end'
  | 'months-reversed'
  | 'hours-missing'
  | 'hours-not-positive'
  | 'longest-not-above-least'
  | 'wait-passes-longest'
  | 'nothing-from-passes-longest'
  | 'under-3-months-without-individual-plan'
  | 'caution-needs-individual-plan'
  | 'minutes-negative'
  | 'minutes-not-positive'
  | 'wake-advice-under-wait';

export interface ProtocolProblem {
  readonly path: string;
  readonly code: ProtocolProblemCode;
  readonly message: string;
}

/** Where the protocol will hold; what only the site knows. */
export interface ProtocolSurroundings {
  /** The latest arrival of a morning; a clock-time rule is longest for it. */
  readonly lastArrivalTime: LocalTime | null;
}

/**
 * A fast can harm these children however old they are (clinical facts 1.4), so that no clinic's
 * protocol gives them the standard plan. Prematurity and a morning medicine are the clinic's to
 * judge: a child of five who was born early fasts like others.
 */
export const cautionsAlwaysIndividual: readonly Caution[] = cautions.filter(
  (caution) => caution !== 'prematurity' && caution !== 'morning-medicine',
);

type Add = (path: string, code: ProtocolProblemCode, message: string) => void;

/** Everything that must be mended before a clinician may sign; empty when the protocol holds. */
export function validateProtocol(
  protocol: FastingProtocol,
  surroundings: ProtocolSurroundings = { lastArrivalTime: null },
): ProtocolProblem[] {
  const { bands } = protocol;
  const problems: ProtocolProblem[] = [];
  const add: Add = (path, code, message) => {
    problems.push({ path, code, message });
  };
  addMinuteProblems(protocol, add);
  for (const caution of cautionsAlwaysIndividual) {
    if (protocol.individualPlanCautions.includes(caution)) continue;
    add(
      `individualPlanCautions.${caution}`,
      'caution-needs-individual-plan',
      'Children with this always get an individual plan.',
    );
  }
  const first = bands[0];
  if (!first) {
    add('bands', 'no-bands', 'Add at least one age band.');
    return problems;
  }
  if (first.fromMonths !== 0) {
    add('bands.0.fromMonths', 'not-from-birth', 'The first band must begin at 0 months.');
  }
  bands.forEach((current, index) => {
    addBandProblems(current, `bands.${index}`, protocol, surroundings, add);
    const next = bands[index + 1];
    if (next) addSeamProblem(current, next, index, add);
  });
  if (bands[bands.length - 1]?.toMonths !== null) {
    add(
      `bands.${bands.length - 1}.toMonths`,
      'not-to-the-end',
      'The last band must have no upper age.',
    );
  }
  return problems;
}

function addMinuteProblems(protocol: FastingProtocol, add: Add): void {
  const { usualWaitMinutes, eatAgainAfterMinutes, wakeToCollectionMinutes } = protocol;
  if (!(usualWaitMinutes >= 0)) {
    add('usualWaitMinutes', 'minutes-negative', 'The usual wait cannot be negative.');
  }
  if (!(eatAgainAfterMinutes >= 0)) {
    add('eatAgainAfterMinutes', 'minutes-negative', 'The time to the next feed is negative.');
  }
  if (wakeToCollectionMinutes === null) return;
  if (!(wakeToCollectionMinutes > 0)) {
    add('wakeToCollectionMinutes', 'minutes-not-positive', 'Minutes must be more than 0.');
  } else if (wakeToCollectionMinutes <= usualWaitMinutes) {
    // The child wakes at home and travels before the wait begins.
    add(
      'wakeToCollectionMinutes',
      'wake-advice-under-wait',
      `Must be more than the usual wait of ${usualWaitMinutes} minutes.`,
    );
  }
}

function addSeamProblem(current: FastingBand, next: FastingBand, index: number, add: Add): void {
  const path = `bands.${index + 1}.fromMonths`;
  if (current.toMonths === null) {
    add(
      `bands.${index}.toMonths`,
      'open-band-not-last',
      'Only the last band may be without an upper age.',
    );
    return;
  }
  const expected = current.toMonths + 1;
  if (next.fromMonths > expected) {
    add(path, 'gap', `No band holds ${expected} to ${next.fromMonths - 1} months.`);
  } else if (next.fromMonths < expected) {
    add(path, 'overlap', `Two bands hold ${next.fromMonths} to ${current.toMonths} months.`);
  }
}

function addBandProblems(
  current: FastingBand,
  path: string,
  protocol: FastingProtocol,
  surroundings: ProtocolSurroundings,
  addAt: Add,
): void {
  const add: Add = (field, code, message) => addAt(`${path}.${field}`, code, message);
  if (current.toMonths !== null && current.toMonths < current.fromMonths) {
    add('toMonths', 'months-reversed', 'The band ends before it begins.');
  }
  if (current.individualPlan) return;
  if (current.fromMonths < 3) {
    add(
      'individualPlan',
      'under-3-months-without-individual-plan',
      'Children under 3 months always get an individual plan.',
    );
  }
  if (!current.leastHours) add('leastHours', 'hours-missing', 'Give the least hours.');
  if (current.longestHours === null) {
    add('longestHours', 'hours-missing', 'Give the longest fast.');
    return;
  }
  if (current.leastHours) {
    addHoursProblems(current.leastHours, current.longestHours, protocol, add);
  }
  addNothingFromProblem(current, current.longestHours, protocol, surroundings, add);
}

function addHoursProblems(
  leastHours: NonNullable<FastingBand['leastHours']>,
  longestHours: number,
  protocol: FastingProtocol,
  add: Add,
): void {
  for (const item of items) {
    if (!(leastHours[item] > 0)) {
      add(`leastHours.${item}`, 'hours-not-positive', 'Hours must be more than 0.');
    }
  }
  const strictest = Math.max(...items.map((item) => leastHours[item]));
  if (longestHours <= strictest) {
    add('longestHours', 'longest-not-above-least', `Must be longer than ${strictest} hours.`);
  } else if (longestHours * 60 < strictest * 60 + protocol.usualWaitMinutes) {
    add('longestHours', 'wait-passes-longest', 'The usual wait alone would pass it.');
  }
}

/** A clock-time rule makes the fast as long as the arrival is late. */
function addNothingFromProblem(
  { nothingFrom }: FastingBand,
  longestHours: number,
  protocol: FastingProtocol,
  { lastArrivalTime }: ProtocolSurroundings,
  add: Add,
): void {
  if (nothingFrom === null || lastArrivalTime === null) return;
  const untilArrival = minutesOfTime(lastArrivalTime) - minutesOfTime(nothingFrom);
  const fasted =
    ((untilArrival + minutesOfADay) % minutesOfADay) + Math.max(0, protocol.usualWaitMinutes);
  if (fasted <= longestHours * 60) return;
  add(
    'nothingFrom',
    'nothing-from-passes-longest',
    `From ${nothingFrom} to the last arrival at ${lastArrivalTime} with the usual wait passes the longest fast.`,
  );
}

const minutesOfADay = 24 * 60;
