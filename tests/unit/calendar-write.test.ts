import ICAL from 'ical.js';
import nodeIcal from 'node-ical';
import { Temporal } from 'temporal-polyfill';
import { describe, expect, it } from 'vitest';
import { callTexts } from '../../shared/domain/calendar/call-text';
import { uidOf } from '../../server/calendar/uid';
import { type CalendarEvent, type CalendarFeed, writeCalendar } from '../../server/calendar/write';
import { sheetFile, sheetPlan } from '../factories/sheet-sample';

const changedAt = new Date('2026-12-01T10:00:00Z');
const event = (uid: string, rest: Partial<CalendarEvent> = {}): CalendarEvent => ({
  uid,
  sequence: 0,
  changedAt,
  status: 'confirmed',
  from: '2027-03-08T12:00',
  to: '2027-03-08T17:15',
  summary: 'Nine Sluices: call',
  location: 'Kiln Yard',
  description: 'Ready to play 12:30',
  ...rest,
});
const feedOf = (events: CalendarEvent[], rest: Partial<CalendarFeed> = {}): CalendarFeed => ({
  name: 'Nine Sluices',
  timezone: 'Europe/Lisbon',
  events,
  ...rest,
});

interface Read {
  uid: string;
  start: number;
  end: number;
  summary: string;
  description: string;
  location: string;
}

/** One independent reader: ical.js, with the zone's rules from the file itself. */
function readOne(text: string): Read[] {
  const calendar = new ICAL.Component(ICAL.parse(text));
  for (const zone of calendar.getAllSubcomponents('vtimezone')) ICAL.TimezoneService.register(zone);
  return calendar.getAllSubcomponents('vevent').map((component) => {
    const one = new ICAL.Event(component);
    return {
      uid: one.uid,
      start: one.startDate.toJSDate().getTime(),
      end: one.endDate.toJSDate().getTime(),
      summary: one.summary,
      description: one.description,
      location: one.location,
    };
  });
}

/** Another independent reader: node-ical. */
function readOther(text: string): Read[] {
  return Object.values(nodeIcal.sync.parseICS(text)).flatMap((one) =>
    one?.type === 'VEVENT'
      ? [
          {
            uid: one.uid,
            start: one.start.getTime(),
            end: one.end!.getTime(),
            summary: String(one.summary),
            description: String(one.description),
            location: String(one.location),
          },
        ]
      : [],
  );
}

const instant = (wall: string, zone: string) => Temporal.PlainDateTime.from(wall).toZonedDateTime(zone).epochMilliseconds;
const unfold = (text: string) => text.replaceAll('\r\n ', '');
const linesOf = (text: string) => unfold(text).split('\r\n');

describe('a calendar of calls', () => {
  it.each([
    // Nights of the clock change and the days around them; dates from the IANA rules as of tz 2025b.
    ['Europe/Lisbon', '2027-03-28T00:30', '2027-03-28T04:30'],
    ['Europe/Lisbon', '2027-10-30T22:00', '2027-10-31T06:00'],
    ['America/New_York', '2027-03-13T22:00', '2027-03-14T06:00'],
    ['America/New_York', '2027-11-07T00:30', '2027-11-07T05:00'],
    ['Australia/Lord_Howe', '2027-04-03T20:00', '2027-04-04T04:00'],
    ['Australia/Lord_Howe', '2027-10-02T20:00', '2027-10-03T04:00'],
    ['Asia/Kathmandu', '2027-03-28T00:30', '2027-03-28T09:15'],
    ['Etc/UTC', '2027-03-28T00:30', '2027-03-28T09:15'],
  ])('means the same moments to two readers in %s from %s to %s', (timezone, from, to) => {
    const text = writeCalendar(feedOf([event('one', { from, to })], { timezone }));
    const wanted = [{ start: instant(from, timezone), end: instant(to, timezone) }];
    expect(readOne(text)).toMatchObject(wanted);
    expect(readOther(text)).toMatchObject(wanted);
  });

  it('takes the first of two times that the clock shows twice', () => {
    const text = writeCalendar(feedOf([event('one', { from: '2027-10-31T01:30', to: '2027-10-31T03:00' })]));
    for (const read of [readOne, readOther]) expect(new Date(read(text)[0]!.start).toISOString()).toBe('2027-10-31T00:30:00.000Z');
  });

  it('keeps commas, semicolons, backslashes, quotes, line breaks, emoji and any script', () => {
    const words = {
      summary: 'Nine, Sluices; “🏮” \\ "call"',
      description: 'first line\nsecond; with, signs \\ of all kinds\n岡 みどり · ليس',
      location: 'Kiln Yard, 4 Ropery Lane; gate\nBEGIN:VALARM',
    };
    const text = writeCalendar(feedOf([event('one', words)]));
    expect(readOne(text)).toMatchObject([words]);
    expect(readOther(text)).toMatchObject([words]);
    expect(linesOf(text)).not.toContain('BEGIN:VALARM');
  });

  it('keeps the name of a production from breaking out of its line', () => {
    const text = writeCalendar(feedOf([event('one')], { name: 'One\r\nBEGIN:VEVENT\r\nUID:two; x, y' }));
    expect(readOne(text)).toHaveLength(1);
    expect(linesOf(text)).toContain('NAME:One\\nBEGIN:VEVENT\\nUID:two\\; x\\, y');
  });

  it('folds at 75 octets, never inside a character, and ends every line with CRLF', () => {
    const description = '岡🏮é'.repeat(60);
    const text = writeCalendar(feedOf([event('one', { description })]));
    for (const line of text.split('\r\n')) {
      expect(Buffer.byteLength(line)).toBeLessThanOrEqual(75);
      expect(line).not.toMatch(/\r|\n|�/);
      expect(Buffer.from(line).toString()).toBe(line);
    }
    expect(text.endsWith('END:VCALENDAR\r\n')).toBe(true);
    expect(unfold(text)).toContain(`DESCRIPTION:${description}\r\n`);
  });

  it('is a snapshot with a zone, a refresh and a source, and without METHOD', () => {
    const lines = linesOf(writeCalendar(feedOf([event('one'), event('two')], { source: 'https://example.org/calendar/x.ics' })));
    expect(lines.filter((line) => line.startsWith('METHOD'))).toEqual([]);
    expect(lines.filter((line) => line === 'BEGIN:VTIMEZONE')).toHaveLength(1);
    expect(lines).toEqual(
      expect.arrayContaining([
        'VERSION:2.0',
        'PRODID:-//Redpoll//Calls//EN',
        'NAME:Nine Sluices',
        'REFRESH-INTERVAL;VALUE=DURATION:PT6H',
        'SOURCE;VALUE=URI:https://example.org/calendar/x.ics',
        'TZID:Europe/Lisbon',
        'DTSTART;TZID=Europe/Lisbon:20270308T120000',
        'DTEND;TZID=Europe/Lisbon:20270308T171500',
        'DTSTAMP:20261201T100000Z',
        'LAST-MODIFIED:20261201T100000Z',
        'SEQUENCE:0',
        'STATUS:CONFIRMED',
      ]),
    );
    // RFC 5545, 3.6: properties of the calendar come before its components.
    const component = lines.findIndex((line) => line === 'BEGIN:VTIMEZONE');
    expect(lines.findIndex((line) => line.startsWith('REFRESH-INTERVAL'))).toBeLessThan(component);
    expect(component).toBeLessThan(lines.indexOf('BEGIN:VEVENT'));
    expect(lines.slice(lines.indexOf('BEGIN:VEVENT')).filter((line) => line.startsWith('X-WR'))).toEqual([]);
  });

  it('keeps a cancelled call, and says so', () => {
    const text = writeCalendar(feedOf([event('one', { status: 'cancelled', sequence: 2 })]));
    expect(linesOf(text)).toEqual(expect.arrayContaining(['STATUS:CANCELLED', 'SEQUENCE:2', 'UID:one']));
  });

  it('is a valid calendar with no call at all', () => {
    const text = writeCalendar(feedOf([]));
    const calendar = new ICAL.Component(ICAL.parse(text));
    expect(calendar.getAllSubcomponents().map((one) => one.name)).toEqual(['vtimezone']);
  });
});

describe('the words of a call', () => {
  const [monday] = callTexts(sheetFile(), sheetPlan(), 'mara');

  it('name the production, the place and the songs in order', () => {
    expect(monday!.text.summary).toBe('Nine Sluices: call');
    expect(monday!.text.location).toBe('Kiln Yard, 4 Ropery Lane, by the old lime kiln, Room A');
    const lines = monday!.text.description.split('\n');
    expect(lines.slice(0, 3)).toEqual([
      'Ready to play 13:00, free to go about 17:15 (16:45–18:20)',
      '13:00 S1 Weir Song: lead vocal, guide · D · 96 · 4/4 · click',
      '14:05 Meal',
    ]);
    expect(lines).toContain('Bring: acoustic guitar, spare strings, capo, tea');
  });

  it('carry no money and nothing that belongs on paper only', () => {
    for (const hidden of ['250', 'EUR', 'no nuts']) expect(monday!.text.description).not.toContain(hidden);
  });
});

describe('a stable UID', () => {
  it('is a UUID of version 8 that shows nothing of its name', () => {
    const uid = uidOf('SLUICE', 'Nine Sluices', 'mara', '2027-03-08');
    expect(uid).toMatch(/^[0-9a-f]{8}-[0-9a-f]{4}-8[0-9a-f]{3}-[89ab][0-9a-f]{3}-[0-9a-f]{12}$/);
    expect(uidOf('SLUICE', 'Nine Sluices', 'mara', '2027-03-08')).toBe(uid);
    expect(uidOf('SLUICE', 'Nine Sluices', 'mara', '2027-03-09')).not.toBe(uid);
  });
});
