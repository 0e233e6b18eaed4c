import type { Refusal, RefusalCode } from '../../shared/domain/series-dates';
import { dayInWords } from '../../shared/languages/clinic-words';
import { english } from '../../shared/languages/profiles/english';

/** Why a day is refused, as a complete phrase for staff. */
export function refusalSays(
  { code, params }: Refusal,
  callMe: ReadonlyMap<number, string>,
): string {
  const child = callMe.get(Number(params['childId'])) ?? 'a child';
  const weekday = english.weekdays[Number(params['weekday']) - 1] ?? 'this day';
  const says: Record<RefusalCode, () => string> = {
    past: () => 'In the past',
    'too-soon': () =>
      `Too soon: planning needs ${params['leadDays']} ${params['leadDays'] === 1 ? 'day' : 'days'}`,
    'not-a-clinic-day': () => `The clinic does not collect on ${weekday}s`,
    closed: () => `Closed: ${params['reason']}`,
    'laboratory-does-not-receive': () => `The laboratory receives nothing on ${weekday}s`,
    'laboratory-closed': () => `Laboratory closed: ${params['reason']}`,
    'laboratory-cut-off': () => `Too late for the laboratory: last receipt at ${params['cutOff']}`,
    'no-places-left': () =>
      params['left'] === 0 ? 'Full' : `Only ${params['left']} of ${params['needed']} places left`,
    'fast-too-long': () => `Too late for ${child}: the usual wait would pass the longest fast`,
    'run-would-break': () =>
      `The run would break on ${dayInWords(String(params['on']))}: ${brief(String(params['because']))}`,
  };
  return says[code]();
}

const briefWords: Readonly<Record<string, string>> = {
  'not-a-clinic-day': 'not a clinic day',
  closed: 'closed',
  'laboratory-does-not-receive': 'the laboratory receives nothing',
  'laboratory-closed': 'the laboratory is closed',
  'laboratory-cut-off': 'too late for the laboratory',
  'no-places-left': 'no places left',
  'fast-too-long': 'the fast would be too long',
};

const brief = (code: string): string => briefWords[code] ?? 'not possible';
