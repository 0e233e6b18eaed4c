import { createEvents, type EventAttributes } from 'ics';

export interface CalendarPerson {
  readonly name: string;
  readonly email: string;
}

/** One morning as a calendar shows it. Words come ready from wording: neutral, no name, no disease, no test. */
export interface CalendarEntry {
  /** Kept for the life of the morning. */
  readonly uid: string;
  /** From the morning's row; rises with every change and with the cancellation (RFC 5545, 3.8.7.4). */
  readonly sequence: number;
  readonly title: string;
  readonly description: string;
  readonly location: string;
  /** Epoch milliseconds. */
  readonly startAt: number;
  readonly endAt: number;
  /** The stop time. An instant, because "eight hours before" is an hour off on the night a clock changes. */
  readonly alarmAt: number | null;
  /** What the alarm says; the title when left out. */
  readonly alarmSays?: string;
  /** Language of the words, so that a screen reader pronounces them. */
  readonly language?: string;
}

export interface CalendarFile extends CalendarEntry {
  readonly method: 'REQUEST' | 'CANCEL' | 'PUBLISH';
  readonly organizer: CalendarPerson | null;
  readonly attendee: CalendarPerson | null;
  /** When this file was made, epoch milliseconds. */
  readonly stampAt: number;
}

const productId = '-//Threedawn//Visits//EN';
const longestLineOctets = 75;

/**
 * The calendar file of one morning. An invitation or cancellation is for one UID alone (RFC 5546), names organiser and
 * attendee, and a cancellation carries no alarm and STATUS:CANCELLED (RFC 5546, 3.2.5).
 * @throws RangeError when people are missing, or an instant or address is no good.
 */
export function calendarFile(file: CalendarFile): string {
  if (file.method !== 'PUBLISH' && (file.organizer === null || file.attendee === null))
    throw new RangeError('An invitation or cancellation names its organiser and its attendee');
  return written([file], file);
}

/** Several mornings in one file to download. It invites nobody: PUBLISH must not carry an attendee (RFC 5546). */
export function calendarDownload(download: {
  readonly entries: readonly CalendarEntry[];
  readonly stampAt: number;
}): string {
  return written(download.entries, {
    method: 'PUBLISH',
    organizer: null,
    attendee: null,
    stampAt: download.stampAt,
  });
}

/** A calendar without entries, which the library cannot write: a feed with no morning to come. */
export const emptyCalendar = (): string =>
  [
    'BEGIN:VCALENDAR',
    'VERSION:2.0',
    'CALSCALE:GREGORIAN',
    `PRODID:${productId}`,
    'METHOD:PUBLISH',
    'END:VCALENDAR',
  ]
    .map((line) => `${line}\r\n`)
    .join('');

type Frame = Pick<CalendarFile, 'method' | 'organizer' | 'attendee' | 'stampAt'>;

function written(entries: readonly CalendarEntry[], frame: Frame): string {
  const { error, value } = createEvents(
    entries.map((entry) => eventOf(entry, frame)),
    { productId, method: frame.method },
  );
  if (error || !value) throw new RangeError(`No calendar file: ${error?.message ?? 'empty'}`);
  const language = entries[0]?.language;
  const lines = unfoldedLines(value)
    .filter((line) => !line.startsWith('X-PUBLISHED-TTL'))
    .map(withPlainRoles)
    .map((line) => (language ? inLanguage(line, language) : line));
  return lines.map((line) => `${foldedByOctets(line)}\r\n`).join('');
}

function eventOf(entry: CalendarEntry, frame: Frame): EventAttributes {
  const isCancelled = frame.method === 'CANCEL';
  const alarmSays = entry.alarmSays ?? entry.title;
  return {
    uid: entry.uid,
    sequence: entry.sequence,
    // The library's types leave out the stamp, which it takes. A number is read as an instant, an array in the
    // process's own zone; left out it would be the process's own time.
    ...({ timestamp: Math.trunc(frame.stampAt) } as object),
    start: utcParts(entry.startAt),
    startInputType: 'utc',
    startOutputType: 'utc',
    end: utcParts(entry.endAt),
    endInputType: 'utc',
    endOutputType: 'utc',
    title: entry.title,
    description: entry.description,
    location: entry.location,
    status: isCancelled ? 'CANCELLED' : 'CONFIRMED',
    classification: 'PRIVATE',
    transp: 'OPAQUE',
    ...(frame.organizer && { organizer: personOf(frame.organizer) }),
    ...(frame.attendee &&
      frame.method !== 'PUBLISH' && {
        attendees: [
          {
            ...personOf(frame.attendee),
            role: 'REQ-PARTICIPANT',
            partstat: 'NEEDS-ACTION',
            rsvp: false,
          },
        ],
      }),
    ...(entry.alarmAt !== null &&
      !isCancelled && {
        // A number again, for the same reason.
        alarms: [
          { action: 'display', description: escapedText(alarmSays), trigger: entry.alarmAt },
        ],
      }),
  };
}

const personOf = ({ name, email }: CalendarPerson): CalendarPerson => ({
  name: commonName(name),
  email,
});

/** A parameter value holds no quotation mark and no control character (RFC 5545, 3.2). */
export function commonName(name: string): string {
  const clean = name
    .replace(/["\p{Cc}]/gu, ' ')
    .replace(/\s+/g, ' ')
    .trim();
  return clean === '' ? '-' : clean;
}

/** TEXT of RFC 5545, 3.3.11. The library escapes title, description and place itself, but not an alarm's words. */
const escapedText = (text: string): string => text.replace(/[\\;,]/g, (mark) => `\\${mark}`);

function utcParts(at: number): [number, number, number, number, number] {
  const instant = new Date(at);
  if (Number.isNaN(instant.getTime())) throw new RangeError(`No instant: ${at}`);
  return [
    instant.getUTCFullYear(),
    instant.getUTCMonth() + 1,
    instant.getUTCDate(),
    instant.getUTCHours(),
    instant.getUTCMinutes(),
  ];
}

/** The library puts every parameter value in quotation marks; these are plain words, and some calendars expect so. */
const withPlainRoles = (line: string): string =>
  line.replace(/;(ROLE|PARTSTAT)="([A-Z-]+)"/g, ';$1=$2');

const inLanguage = (line: string, language: string): string =>
  line.replace(/^(SUMMARY|DESCRIPTION|LOCATION):/, `$1;LANGUAGE=${language}:`);

function unfoldedLines(text: string): string[] {
  return text
    .replace(/\r\n[ \t]/g, '')
    .split('\r\n')
    .filter((line) => line !== '');
}

/** Folds at 75 octets without splitting a character (RFC 5545, 3.1). The library counts characters instead. */
export function foldedByOctets(line: string): string {
  const pieces: string[] = [];
  let piece = '';
  let octets = 0;
  for (const character of line) {
    const size = Buffer.byteLength(character);
    if (octets + size > longestLineOctets) {
      pieces.push(piece);
      piece = ' ';
      octets = 1;
    }
    piece += character;
    octets += size;
  }
  return [...pieces, piece].join('\r\n');
}
