import type { CallTask } from '../../../../shared/contracts/calls';
import { dayOf } from '../../../../shared/domain/zone';
import { clockIn, dayIn } from '../../../common/ui/clinic-times';
import type { MarkName } from '../../../common/ui/state-mark/mark-shapes';

export interface CallGroup {
  readonly says: string;
  readonly calls: readonly CallTask[];
}

/** The most urgent first: what should have been called or is due within the half hour stands under "Now". */
export function callGroups(open: readonly CallTask[], now: number, zone: string): CallGroup[] {
  const soon = now + 30 * 60_000;
  const today = dayOf(now, zone);
  const sorted = [...open].sort((a, b) => a.urgentAt.localeCompare(b.urgentAt) || a.id - b.id);
  const at = (call: CallTask): number => Date.parse(call.urgentAt);
  const isToday = (call: CallTask): boolean => dayOf(at(call), zone) === today;
  return [
    {
      says: $localize`:@@clinic.calls.now:Now`,
      calls: sorted.filter((call) => at(call) <= soon),
    },
    {
      says: $localize`:@@clinic.calls.today:Today, before`,
      calls: sorted.filter((call) => at(call) > soon && isToday(call)),
    },
    {
      says: $localize`:@@clinic.calls.later:Later, before`,
      calls: sorted.filter((call) => at(call) > soon && !isToday(call)),
    },
  ].filter(({ calls }) => calls.length > 0);
}

/** The time of today's calls, the day of the others. */
export const urgentWords = (call: CallTask, now: number, zone: string): string =>
  dayOf(Date.parse(call.urgentAt), zone) === dayOf(now, zone)
    ? clockIn(call.urgentAt, zone)
    : dayIn(call.urgentAt, zone);

const marks: Readonly<Record<string, MarkName>> = {
  'about-results': 'kept',
  'not-answered': 'silent',
  'not-opened': 'silent',
  'not-sure': 'unsure',
  'not-understood': 'unsure',
  'not-said-back': 'silent',
  'text-unclear': 'unsure',
  'opted-out': 'no',
  'message-failed': 'no',
  'evening-text-failed': 'no',
  'invitation-failed': 'no',
  'language-not-signed': 'wave',
  'does-not-read': 'wave',
  ill: 'ceiling',
  'positive-result': 'ceiling',
  'critical-result': 'ceiling',
};
export const callMark = (reason: string): MarkName => marks[reason] ?? 'todo';

const outcomes: Readonly<Record<string, string>> = {
  reached: $localize`:@@clinic.calls.was-reached:Reached`,
  told: $localize`:@@clinic.calls.was-told:Reached and told`,
  'not-reached': $localize`:@@clinic.calls.was-not-reached:Not reached`,
  'wrong-number': $localize`:@@clinic.calls.was-wrong:Wrong number`,
  'not-needed': $localize`:@@clinic.calls.was-not-needed:No longer needed`,
};
export const outcomeWords = (outcome: string): string => outcomes[outcome] ?? outcome;
