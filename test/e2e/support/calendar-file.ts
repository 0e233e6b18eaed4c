import ICAL from 'ical.js';

export interface CalendarEntry {
  readonly uid: string;
  readonly sequence: number;
  readonly title: string;
  readonly text: string;
  /** Epoch milliseconds. */
  readonly startsAt: number;
}

/** Reads a calendar file as a calendar program would. */
export function calendarEntries(file: string): readonly CalendarEntry[] {
  const calendar = new ICAL.Component(ICAL.parse(file) as unknown[]);
  return calendar.getAllSubcomponents('vevent').map((component) => {
    const event = new ICAL.Event(component);
    return {
      uid: event.uid,
      sequence: event.sequence,
      title: event.summary,
      text: `${event.summary} ${event.description} ${event.location}`,
      startsAt: event.startDate.toJSDate().getTime(),
    };
  });
}
