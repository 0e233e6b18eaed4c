import type { MorningRow } from '../../../../shared/contracts/this-morning';
import { clockIn } from '../../../common/ui/clinic-times';
import type { MarkName } from '../../../common/ui/state-mark/mark-shapes';

/** A state: its shape, its word, then its colour. */
export interface StateWords {
  readonly mark: MarkName;
  readonly says: string;
  readonly at: string | null;
  readonly tone: 'is-well' | 'is-care' | 'is-danger' | 'is-ink' | '';
}

const minute = 60_000;

/** '5 h 40 min' */
export function duration(minutes: number): string {
  const hours = Math.floor(minutes / 60);
  const rest = minutes % 60;
  return hours === 0
    ? $localize`:@@clinic.this-morning.minutes:${rest}:minutes: min`
    : $localize`:@@clinic.this-morning.hours:${hours}:hours: h ${String(rest).padStart(2, '0')}:minutes: min`;
}

export const minutesLate = (row: MorningRow): number =>
  row.expectedAt === null
    ? 0
    : Math.round((Date.parse(row.expectedAt) - Date.parse(row.arrivalAt)) / minute);

/** Where the child is. */
export function arrivalWords(row: MorningRow, now: number): StateWords {
  switch (row.state) {
    case 'collected':
      return words(
        'tube',
        $localize`:@@clinic.this-morning.collected:Collected`,
        '',
        row.specimen?.collectedAt,
      );
    case 'not-collected':
      return words(
        'none',
        $localize`:@@clinic.this-morning.not-collected:Not collected`,
        '',
        row.collection?.endedAt,
      );
    case 'collecting':
      return words('tube', row.room.name, 'is-ink', row.collection?.begunAt);
    case 'lost':
      return words('no', $localize`:@@clinic.this-morning.lost:Not held`, '');
    case 'here':
      return words('here', $localize`:@@clinic.this-morning.here:Here`, 'is-well', row.arrivedAt);
    case 'planned':
      return plannedWords(row, now);
  }
}

function plannedWords(row: MorningRow, now: number): StateWords {
  const late = minutesLate(row);
  if (late > 0)
    return words(
      'late',
      $localize`:@@clinic.this-morning.late:${late}:minutes: min late`,
      'is-care',
    );
  if (row.said.length === 0)
    return words('silent', $localize`:@@clinic.this-morning.silent:Not heard from`, 'is-care');
  if (Date.parse(row.arrivalAt) < now)
    return words('late', $localize`:@@clinic.this-morning.not-here:Not here yet`, 'is-care');
  return words('way', $localize`:@@clinic.this-morning.answered:Answered`, '');
}

/** How the fast stands; the words come from the server, the shape from what it knows. */
export function verdictWords(row: MorningRow, now: number): StateWords {
  const says = row.verdictSays;
  if (row.specimen !== null) return words('tube', says, '');
  if (row.state === 'not-collected' || row.state === 'lost') return words('none', says, '');
  if (row.fedAt !== null) return words('yes', says, '');
  if (row.ceiling !== 'ok') return words('ceiling', says, 'is-danger');
  if (row.bar === null) return words('todo', says, 'is-care');
  if (row.bar.isPlanOnly) return words('silent', says, 'is-care');
  if (row.bar.isUnsure || row.verdict === 'cannot-tell') return words('unsure', says, 'is-care');
  if (row.readyAt !== null && Date.parse(row.readyAt) > now) return words('wait', says, 'is-ink');
  return words('enough', says, 'is-well');
}

const words = (
  mark: MarkName,
  says: string,
  tone: StateWords['tone'],
  at: string | null | undefined = null,
): StateWords => ({ mark, says, at: at ?? null, tone });

/** The line under the bar: hours so far and since when they are enough. */
export function fastedWords(row: MorningRow, now: number, zone: string): string {
  const { bar } = row;
  if (bar === null || row.specimen !== null || row.fedAt !== null) return '';
  const least = clockIn(bar.leastAt, zone);
  if (bar.isPlanOnly)
    return $localize`:@@clinic.this-morning.plan-only:By the plan only: nothing after ${clockIn(bar.fromAt, zone)}:stop:, long enough at ${least}:least:.`;
  if (row.fastedMinutes === null) return '';
  const fasted = duration(row.fastedMinutes);
  const wait = Math.ceil((Date.parse(bar.leastAt) - now) / minute);
  return wait > 0
    ? $localize`:@@clinic.this-morning.fasted-wait:${fasted}:fasted: fasted. ${duration(wait)}:wait: to wait.`
    : $localize`:@@clinic.this-morning.fasted-since:${fasted}:fasted: fasted. Long enough since ${least}:least:.`;
}

/** What the drawing shows and the line does not say. */
export function barWords(row: MorningRow, zone: string): string {
  const { bar } = row;
  if (bar === null || bar.collectedAt !== null) return '';
  return $localize`:@@clinic.this-morning.bar-says:Longest fast at ${clockIn(bar.longestAt, zone)}:longest:. Likely collection ${clockIn(bar.likelyCollectionAt, zone)}:likely:.`;
}

export interface StopWords {
  readonly at: string;
  readonly says: string;
  readonly isDue: boolean;
}

/** Where the specimen has to be, and by when. */
export function stopWords(row: MorningRow, now: number): StopWords[] {
  const { specimen } = row;
  if (specimen === null) return [];
  const left = (at: string): string => {
    const minutes = Math.round((Date.parse(at) - now) / minute);
    return minutes >= 0
      ? $localize`:@@clinic.this-morning.time-left:${duration(minutes)}:time: left`
      : $localize`:@@clinic.this-morning.time-over:${duration(-minutes)}:time: late`;
  };
  const stops: StopWords[] = [];
  if (specimen.neutralisedAt === null)
    stops.push({
      at: specimen.neutraliseBy,
      says: $localize`:@@clinic.this-morning.neutralise-by:neutralise by, ${left(specimen.neutraliseBy)}:left:`,
      isDue: true,
    });
  else
    stops.push({
      at: specimen.neutralisedAt,
      says: $localize`:@@clinic.this-morning.neutralised:neutralised`,
      isDue: false,
    });
  if (specimen.receivedAt !== null)
    stops.push({
      at: specimen.receivedAt,
      says: $localize`:@@clinic.this-morning.received:received`,
      isDue: false,
    });
  else
    stops.push({
      at: specimen.receiptBy,
      says: $localize`:@@clinic.this-morning.laboratory-by:laboratory by, ${left(specimen.receiptBy)}:left:`,
      isDue: Date.parse(specimen.receiptBy) < now,
    });
  return stops;
}
