import ICAL from 'ical.js';
import { calendarDownload, calendarFile, commonName, foldedByOctets } from './calendar-file';
import type { CalendarFile } from './calendar-file';

const visit: CalendarFile = {
  method: 'REQUEST',
  uid: '7d0c2c1c5c0a4d53@clinic.example.org',
  sequence: 0,
  title: 'Clinic visit',
  description: 'Open the page for the plan of the night; call us with questions, please.',
  location: '12 Harbor Street, door B',
  // 06:30 in Chicago on 5 March 2026 is 12:30 in UTC (RFC 5545 form 2).
  startAt: Date.UTC(2026, 2, 5, 12, 30),
  endAt: Date.UTC(2026, 2, 5, 14, 30),
  alarmAt: Date.UTC(2026, 2, 5, 4, 30),
  organizer: { name: 'Visits', email: 'visits@clinic.example.org' },
  attendee: { name: 'Amina Example', email: 'amina@family.example.org' },
  stampAt: Date.UTC(2026, 2, 1, 9, 0),
};

const parsed = (text: string) => {
  const calendar = new ICAL.Component(ICAL.parse(text) as [string, unknown[], unknown[]]);
  const event = calendar.getFirstSubcomponent('vevent');
  if (!event) throw new Error('no event');
  return { calendar, event };
};

describe('folding of lines (RFC 5545, 3.1)', () => {
  // Worked by hand from the rule: 75 octets a line without the break, continuation lines start with a space.
  it.each([
    ['a, 75 octets', `DESCRIPTION:${'a'.repeat(63)}`, [75]],
    ['a, 76 octets', `DESCRIPTION:${'a'.repeat(64)}`, [75, 2]],
    ['three octets each', `DESCRIPTION:${'ሀ'.repeat(50)}`, [75, 73, 16]],
    ['four octets each', `DESCRIPTION:${'😀'.repeat(60)}`, [72, 73, 73, 37]],
  ])('%s', (_case, line, octets) => {
    const lines = foldedByOctets(line).split('\r\n');
    expect(lines.map((one) => Buffer.byteLength(one))).toEqual(octets);
  });

  it('comes back whole for any text, and no line passes 75 octets', () => {
    const alphabet = ['a', 'é', 'ሀ', '😀', 'မ', ' ', '\t', ':'];
    let seed = 17;
    const next = () => (seed = (seed * 48271) % 2147483647);
    for (let round = 0; round < 200; round += 1) {
      const text = Array.from(
        { length: next() % 400 },
        () => alphabet[next() % alphabet.length],
      ).join('');
      const folded = foldedByOctets(text);
      expect(folded.replace(/\r\n /g, '')).toBe(text);
      for (const line of folded.split('\r\n'))
        expect(Buffer.byteLength(line)).toBeLessThanOrEqual(75);
    }
  });
});

describe('a calendar file', () => {
  it('has UTC times and no zone', () => {
    const text = calendarFile(visit);
    expect(text).toContain('\r\nDTSTART:20260305T123000Z\r\n');
    expect(text).toContain('\r\nDTEND:20260305T143000Z\r\n');
    expect(text).toContain('\r\nDTSTAMP:20260301T090000Z\r\n');
    expect(text).not.toContain('TZID');
  });

  it('is private, with organiser, attendee and one alarm at the stop time', () => {
    const { calendar, event } = parsed(calendarFile(visit));
    expect(calendar.getFirstPropertyValue('method')).toBe('REQUEST');
    expect(event.getFirstPropertyValue('class')).toBe('PRIVATE');
    expect(event.getFirstPropertyValue('status')).toBe('CONFIRMED');
    expect(event.getAllProperties('attendee')).toHaveLength(1);
    const alarms = event.getAllSubcomponents('valarm');
    expect(alarms).toHaveLength(1);
    expect(calendarFile(visit)).toContain('TRIGGER;VALUE=DATE-TIME:20260305T043000Z');
  });

  it('goes from invitation to move to cancellation under one UID', () => {
    const files = [
      visit,
      { ...visit, sequence: 1, startAt: visit.startAt + 3_600_000, endAt: visit.endAt + 3_600_000 },
      { ...visit, sequence: 2, method: 'CANCEL' as const },
    ].map((file) => parsed(calendarFile(file)));
    expect(files.map(({ event }) => event.getFirstPropertyValue('uid'))).toEqual(
      Array(3).fill(visit.uid),
    );
    expect(files.map(({ event }) => event.getFirstPropertyValue('sequence'))).toEqual([0, 1, 2]);
    const cancelled = files[2];
    expect(cancelled?.calendar.getFirstPropertyValue('method')).toBe('CANCEL');
    expect(cancelled?.event.getFirstPropertyValue('status')).toBe('CANCELLED');
    expect(cancelled?.event.getAllSubcomponents('valarm')).toHaveLength(0);
  });

  it('escapes text, and words come back as they were', () => {
    const description = 'a;b,c\\d\ne';
    const text = calendarFile({ ...visit, description, alarmSays: 'one, two; three' });
    expect(text).toContain('DESCRIPTION:a\\;b\\,c\\\\d\\ne\r\n');
    const { event } = parsed(text);
    expect(event.getFirstPropertyValue('description')).toBe(description);
    const alarm = event.getFirstSubcomponent('valarm');
    expect(alarm?.getFirstPropertyValue('description')).toBe('one, two; three');
  });

  it('cannot be broken open by a name', () => {
    const name = 'A "B"; C\r\nATTENDEE:mailto:x@example.org';
    const text = calendarFile({
      ...visit,
      organizer: { name, email: visit.organizer?.email ?? '' },
    });
    const { event } = parsed(text);
    expect(event.getAllProperties('attendee')).toHaveLength(1);
    const common = event.getFirstProperty('organizer')?.getFirstParameter('cn');
    expect(common).toBe('A B ; C ATTENDEE:mailto:x@example.org');
    expect(commonName('"\u0007"')).toBe('-');
  });

  it('keeps Amharic, Arabic and Burmese whole in lines of at most 75 octets', () => {
    const title = 'ወደ ክሊኒክ ጉብኝት زيارة العيادة ဆေးခန်းသို့လာရောက်ခြင်း'.repeat(3);
    const text = calendarFile({ ...visit, title, language: 'am' });
    for (const line of text.split('\r\n')) expect(Buffer.byteLength(line)).toBeLessThanOrEqual(75);
    const { event } = parsed(text);
    expect(event.getFirstPropertyValue('summary')).toBe(title);
    expect(event.getFirstProperty('summary')?.getFirstParameter('language')).toBe('am');
  });

  it('gives a new stamp to every sending', () => {
    const again = calendarFile({ ...visit, stampAt: visit.stampAt + 60_000 });
    expect(again).toContain('DTSTAMP:20260301T090100Z');
  });

  it('holds several mornings for download and invites nobody', () => {
    const entries = [0, 1, 2].map((days) => ({
      ...visit,
      uid: `${days}@clinic.example.org`,
      startAt: visit.startAt + days * 86_400_000,
      endAt: visit.endAt + days * 86_400_000,
    }));
    const text = calendarDownload({ entries, stampAt: visit.stampAt });
    const { calendar } = parsed(text);
    expect(calendar.getFirstPropertyValue('method')).toBe('PUBLISH');
    expect(calendar.getAllSubcomponents('vevent')).toHaveLength(3);
    expect(text).not.toContain('ATTENDEE');
  });

  it('refuses an invitation to nobody, a bad address and a bad instant', () => {
    expect(() => calendarFile({ ...visit, attendee: null })).toThrow(RangeError);
    expect(() => calendarFile({ ...visit, attendee: { name: 'A', email: 'a b' } })).toThrow(
      RangeError,
    );
    expect(() => calendarFile({ ...visit, startAt: Number.NaN })).toThrow(RangeError);
  });
});
