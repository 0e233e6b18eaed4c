/**
 * From collection to receipt against the laboratory's profile, and when each result is due. No
 * number here is universal (neutralising: 30 minutes to 6 hours by laboratory), so that all come
 * from a signed profile.
 */
import {
  addDays,
  millisecondsPerMinute,
  type Day,
  type Instant,
  type LocalTime,
  type Weekday,
} from './day';
import type { Explanation } from './explanation';

export const resultStages = [
  'smear',
  'amplification',
  'culturePreliminary',
  'cultureIdentification',
  'susceptibility',
  'cultureNegativeFinal',
] as const;
export type ResultStage = (typeof resultStages)[number];

export interface LaboratoryProfile {
  readonly version: number;
  readonly name: string;
  readonly effectiveOn: Day;
  readonly isDemo: boolean;
  readonly signedBy: string | null;
  readonly signedOn: Day | null;
  readonly receivingWeekdays: readonly Weekday[];
  /** Before this nobody takes a specimen in; a day without one has no opening time. */
  readonly receivingFromTimes: Readonly<Partial<Record<Weekday, LocalTime>>>;
  /** The last receipt of a day. */
  readonly cutOffTimes: Readonly<Partial<Record<Weekday, LocalTime>>>;
  /** How long the courier is under way; 0 where the laboratory is in the house. */
  readonly minutesToLaboratory: number;
  /** Null where the laboratory neutralises, or does not want it. */
  readonly neutraliseWithinMinutes: number | null;
  readonly receiptWithinMinutes: number;
  readonly minimumVolumeMl: number;
  readonly maximumVolumeMl: number;
  /** Calendar days after receipt. */
  readonly resultDays: Readonly<Record<ResultStage, number>>;
}

/** Invented for the demo clinic; each value lies in a published range. */
export const demoLaboratoryProfile: LaboratoryProfile = {
  version: 1,
  name: 'Harbor Street laboratory (demo)',
  effectiveOn: '2026-01-01',
  isDemo: true,
  signedBy: null,
  signedOn: null,
  // A Monday to Friday laboratory (NorDx 607), so that three mornings start Monday to Wednesday.
  receivingWeekdays: [1, 2, 3, 4, 5],
  receivingFromTimes: {},
  cutOffTimes: { 1: '11:30', 2: '11:30', 3: '11:30', 4: '11:30', 5: '11:30' },
  minutesToLaboratory: 0,
  // Half an hour to 6 hours: the strictest, Curry International TB Center, step 4.
  neutraliseWithinMinutes: 30,
  // Within 4 hours: Washington University, Rady Children's Hospital.
  receiptWithinMinutes: 240,
  // 5 to 10 mL, at most 15 mL: ERS monograph 238; APHL/CDC training, slide 17.
  minimumVolumeMl: 5,
  maximumVolumeMl: 15,
  resultDays: {
    // Within 24 h of receipt (Clinical Microbiology Reviews, laboratory practice table).
    smear: 1,
    // Within 48 h of receipt (same table).
    amplification: 2,
    // Interim reports at 1, 3 and 6 weeks (National Jewish Health).
    culturePreliminary: 21,
    // Identified within 21 days of receipt (same table); allow the growth of children's specimens,
    // 24.6 days on average, interquartile range to 37 (neutralisation trial in 116 children).
    cultureIdentification: 37,
    // 28 days of receipt for the first-line drugs, counted from the identification at the latest.
    susceptibility: 65,
    // Liquid culture: negative after 42 days (Indian national programme; 42 to 60 elsewhere).
    cultureNegativeFinal: 42,
  },
};

/** What a profile stored before these fields were known holds. */
export const profileDefaults = {
  receivingFromTimes: {},
  minutesToLaboratory: 0,
} as const satisfies Partial<LaboratoryProfile>;

export interface SpecimenTimes {
  readonly collectedAt: Instant;
  readonly neutralisedAt: Instant | null;
  readonly pickedUpAt: Instant | null;
  readonly receivedAt: Instant | null;
}

export interface SpecimenClock {
  readonly step: 'neutralise' | 'pick-up' | 'receipt';
  readonly dueAt: Instant;
  readonly doneAt: Instant | null;
  /** From collection until done, or until now. */
  readonly minutes: number;
  readonly limitMinutes: number;
  readonly state: 'running' | 'soon' | 'late' | 'in-time' | 'done-late';
  /** Why it is due then: the limit that counts, what it was counted from, and whose it is. */
  readonly explanation: Explanation;
}

export interface SpecimenClocksRequest extends SpecimenTimes {
  readonly profile: Pick<
    LaboratoryProfile,
    'version' | 'receiptWithinMinutes' | 'neutraliseWithinMinutes' | 'minutesToLaboratory'
  >;
  /** The laboratory's last receipt of the day; null where it has none. */
  readonly cutOffAt: Instant | null;
  readonly now: Instant;
}

/** The last third of the time is "soon". */
const soonShare = 2 / 3;

export function specimenClocks(request: SpecimenClocksRequest): SpecimenClock[] {
  const { profile, collectedAt, cutOffAt } = request;
  const after = (minutes: number): Instant => collectedAt + minutes * millisecondsPerMinute;
  const receiptDueAt = Math.min(after(profile.receiptWithinMinutes), cutOffAt ?? Infinity);
  const pickUpDueAt = receiptDueAt - profile.minutesToLaboratory * millisecondsPerMinute;
  const receiptInputs = {
    withinMinutes: profile.receiptWithinMinutes,
    cutOffAt,
    receiptDueAt,
  };
  const receiptRule =
    receiptDueAt === cutOffAt ? 'specimen.receipt-by-cut-off' : 'specimen.receipt-within';
  const clocks = [
    clock(request, 'pick-up', pickUpDueAt, request.pickedUpAt ?? request.receivedAt, {
      rule: 'specimen.pick-up-before-receipt',
      inputs: { ...receiptInputs, minutesToLaboratory: profile.minutesToLaboratory },
    }),
    clock(request, 'receipt', receiptDueAt, request.receivedAt, {
      rule: receiptRule,
      inputs: receiptInputs,
    }),
  ];
  const withinMinutes = profile.neutraliseWithinMinutes;
  if (withinMinutes === null) return clocks;
  const neutralise = clock(request, 'neutralise', after(withinMinutes), request.neutralisedAt, {
    rule: 'specimen.neutralise-within',
    inputs: { withinMinutes },
  });
  return [neutralise, ...clocks];
}

function clock(
  { profile, collectedAt, now }: SpecimenClocksRequest,
  step: SpecimenClock['step'],
  dueAt: Instant,
  doneAt: Instant | null,
  why: Explanation,
): SpecimenClock {
  const reachedAt = doneAt ?? now;
  const soonAt = collectedAt + (dueAt - collectedAt) * soonShare;
  const isLate = reachedAt > dueAt;
  const state = doneAt
    ? isLate
      ? 'done-late'
      : 'in-time'
    : isLate
      ? 'late'
      : reachedAt >= soonAt
        ? 'soon'
        : 'running';
  return {
    step,
    dueAt,
    doneAt,
    minutes: Math.floor((reachedAt - collectedAt) / millisecondsPerMinute),
    limitMinutes: Math.floor((dueAt - collectedAt) / millisecondsPerMinute),
    state,
    explanation: {
      rule: why.rule,
      inputs: { collectedAt, ...why.inputs, dueAt, profileVersion: profile.version },
    },
  };
}

/** The day by which a result is due, counted from the day of receipt at the laboratory. */
export function dueOn(request: {
  readonly profile: Pick<LaboratoryProfile, 'resultDays'>;
  readonly receivedOn: Day;
  readonly stage: ResultStage;
}): Day {
  return addDays(request.receivedOn, request.profile.resultDays[request.stage]);
}

/** How a due day was reached: the day of receipt and the days that the profile gives its stage. */
export function explainDueOn(request: {
  readonly profile: Pick<LaboratoryProfile, 'resultDays' | 'version'>;
  readonly receivedOn: Day;
  readonly stage: ResultStage;
}): Explanation {
  const { profile, receivedOn, stage } = request;
  return {
    rule: 'specimen.result-days',
    inputs: {
      stage,
      receivedOn,
      days: profile.resultDays[stage],
      dueOn: dueOn(request),
      profileVersion: profile.version,
    },
  };
}

export function dueDays(
  profile: Pick<LaboratoryProfile, 'resultDays'>,
  receivedOn: Day,
): Record<ResultStage, Day> {
  return Object.fromEntries(
    resultStages.map((stage) => [stage, dueOn({ profile, receivedOn, stage })]),
  ) as Record<ResultStage, Day>;
}

/** Overdue from the day after; on the day itself the laboratory may still report. */
export function isOverdue(request: {
  readonly dueOn: Day;
  readonly today: Day;
  readonly isReported: boolean;
}): boolean {
  return !request.isReported && request.today > request.dueOn;
}
