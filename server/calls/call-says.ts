import { familyDay, familyStopTime, familyTime } from '../../shared/languages/family-time';
import type { MorningPlan } from '../series/morning-plans';
import type { ClinicWords } from '../wording/clinic-words';
import type { Wording } from '../wording/render';
import type { CallPerson, CallRow } from './call-rows';

/** Calls that tell something about results; others learn only that there is a call about results. */
const resultReasons: ReadonlySet<string> = new Set([
  'positive-result',
  'critical-result',
  'result-overdue',
  'report-to-health-department',
]);

/** Calls in which a clinician tells a family what was found (product rule: a person tells anything positive first). */
const clinicianTells: ReadonlySet<string> = new Set(['positive-result', 'critical-result']);

/** Calls in which the family hears the whole plan. */
const planReasons: ReadonlySet<string> = new Set([
  'invitation-failed',
  'evening-text-failed',
  'nobody-to-message',
  'language-not-signed',
  'does-not-read',
  'evening-too-late',
  'not-understood',
  'not-said-back',
  'opted-out',
]);

export const isAboutResults = (reason: string): boolean => resultReasons.has(reason);
export const onlyClinicianTells = (reason: string): boolean => clinicianTells.has(reason);

export function callSays(
  row: CallRow,
  {
    wording,
    words,
    person,
    seesResults,
  }: SaysWith & { readonly seesResults: boolean; readonly words: ClinicWords },
): string {
  if (isAboutResults(row.reason) && !seesResults) return wording.text('call.says.hidden');
  const who = person?.full_name ?? wording.text('call.who.family');
  const key = `call.says.${row.reason}`;
  const says = wording.has(key) ? wording.text(key, { who }) : wording.text('call.says.other');
  return row.detail ? `${says} ${words.sentence(row.detail)}` : says;
}

interface SaysWith {
  readonly wording: Wording;
  readonly person: CallPerson | null;
}

/** What to say, line by line; with the plan of the morning where the call is about it. */
export function callScript(
  row: CallRow,
  more: SaysWith & {
    readonly seesResults: boolean;
    /** The family's mornings of the day that the call is about. */
    readonly plans: readonly MorningPlan[];
  },
): string[] {
  const { wording, person, seesResults, plans } = more;
  const who = person?.full_name ?? wording.text('call.who.family');
  const lines = wording
    .text('call.script.greeting', { clinic: row.site_name ?? '', who })
    .split('\n');
  if (isAboutResults(row.reason) && !seesResults) return lines;
  const key = `call.script.${row.reason}`;
  lines.push(...wording.text(wording.has(key) ? key : 'call.script.other').split('\n'));
  if (planReasons.has(row.reason)) lines.push(...planLines(wording, plans));
  return lines;
}

function planLines(wording: Wording, plans: readonly MorningPlan[]): string[] {
  const [first] = plans;
  if (!first) return [];
  const arrival = familyTime(first.arrivalAt, first.zone, wording.profile);
  const stops = plans.flatMap(({ plan, callMe, zone }) =>
    plan.kind === 'standard'
      ? [
          wording.text('call.script.stop', {
            name: callMe,
            time: familyStopTime(plan.stopAt, zone, wording.profile).text,
          }),
        ]
      : [],
  );
  return [
    ...wording
      .text('call.script.plan', {
        dayText: familyDay(first.on, wording.profile).text,
        time: arrival.time,
        door: first.site.door,
      })
      .split('\n'),
    ...stops,
    wording.text('call.script.say-back'),
  ];
}
