import type { Refusal } from '../../shared/domain/series-dates';
import type { ClinicWords } from '../wording/clinic-words';
import { hoursSays } from './hours-says';

/** Why a day is refused, as a complete phrase for staff. */
export function refusalSays(
  words: ClinicWords,
  { code, params }: Refusal,
  callMe: ReadonlyMap<number, string>,
): string {
  if (code === 'no-places-left')
    return params['left'] === 0
      ? words.text('clinic.refusal.full')
      : words.text('clinic.refusal.few-places', { left: params['left'], needed: params['needed'] });
  return words.text(`clinic.refusal.${code}`, {
    days: Number(params['leadDays']),
    weekday: words.weekday(Number(params['weekday'])),
    reason: String(params['reason']),
    time: String(params['cutOff']),
    places: Number(params['places']),
    left: Number(params['left']),
    child: callMe.get(Number(params['childId'])) ?? words.text('clinic.a-child'),
    hours: hoursOf(params['minutes']),
    longest: hoursOf(params['longestMinutes']),
    day: code === 'run-would-break' ? words.day(String(params['on'])) : '',
    because: brief(words, String(params['because'])),
  });
}

const hoursOf = (minutes: string | number | undefined): string => hoursSays(Number(minutes));

function brief(words: ClinicWords, code: string): string {
  const key = `clinic.refusal.brief.${code}`;
  return words.text(words.has(key) ? key : 'clinic.refusal.brief.other');
}
