import ICAL from 'ical.js';
import { Temporal } from 'temporal-polyfill';
import { describe, expect, it } from 'vitest';
import { writeCalendar } from '../../server/calendar/write';

/** The zone's rules as a reader of the calendar gets them. */
function zoneFromCalendar(timezone: string): ICAL.Timezone {
  const calendar = new ICAL.Component(ICAL.parse(writeCalendar({ name: 'zone', timezone, events: [] })));
  const component = calendar.getFirstSubcomponent('vtimezone');
  if (!component) throw new Error(`no zone for ${timezone}`);
  expect(component.getFirstPropertyValue('tzid')).toBe(timezone);
  return new ICAL.Timezone(component);
}

/** Seconds that the zone is ahead of UTC, as ical.js reckons it for a local time. */
function offsetIn(zone: ICAL.Timezone, local: Temporal.PlainDateTime): number {
  const { year, month, day, hour, minute } = local;
  return zone.utcOffset(new ICAL.Time({ year, month, day, hour, minute, second: 0, isDate: false }, zone));
}

describe('the zone rules that a calendar carries', () => {
  // Changes of 2027: IANA tz database, rules as of 2025b.
  it.each([
    ['Europe/London', '2027-03-28T01:00Z', '2027-10-31T01:00Z'],
    ['Europe/Berlin', '2027-03-28T01:00Z', '2027-10-31T01:00Z'],
    ['America/New_York', '2027-03-14T07:00Z', '2027-11-07T06:00Z'],
    ['America/Los_Angeles', '2027-03-14T10:00Z', '2027-11-07T09:00Z'],
    ['Australia/Sydney', '2027-04-03T16:00Z', '2027-10-02T16:00Z'],
    ['Australia/Lord_Howe', '2027-04-03T15:00Z', '2027-10-02T15:30Z'],
    ['Pacific/Auckland', '2027-04-03T14:00Z', '2027-09-25T14:00Z'],
    ['America/Santiago', '2027-04-04T03:00Z', '2027-09-05T04:00Z'],
  ])('change in %s at %s and %s', (timezone, ...changes) => {
    const zone = zoneFromCalendar(timezone);
    for (const change of changes) {
      const at = Temporal.Instant.from(change);
      for (const hours of [-3, 3]) {
        const moment = at.add({ hours }).toZonedDateTimeISO(timezone);
        expect(offsetIn(zone, moment.toPlainDateTime()) * 1e9).toBe(moment.offsetNanoseconds);
      }
      expect(at.subtract({ seconds: 1 }).toZonedDateTimeISO(timezone).offsetNanoseconds).not.toBe(
        at.toZonedDateTimeISO(timezone).offsetNanoseconds,
      );
    }
  });

  it.each(['America/Phoenix', 'Australia/Brisbane', 'Asia/Kathmandu', 'Asia/Tokyo', 'Etc/UTC'])('never change in %s', (timezone) => {
    const zone = zoneFromCalendar(timezone);
    for (let month = 1; month <= 12; month++) {
      const local = new Temporal.PlainDateTime(2027, month, 15, 12);
      expect(offsetIn(zone, local) * 1e9).toBe(local.toZonedDateTime(timezone).offsetNanoseconds);
    }
  });

  // The list of rules and the engine's tz data are of different age: Vancouver and Edmonton changed their law after 2025b, and Morocco
  // leaves its offset for a month that is announced anew each year. What a calendar shows there is the wall clock, which stays right.
  const OF_ANOTHER_AGE = new Set(['Africa/Casablanca', 'Africa/El_Aaiun', 'America/Edmonton', 'America/Vancouver']);

  it('agree with the engine for every other zone it knows, in the middle of each month of two years', () => {
    const strange: string[] = [];
    for (const timezone of Intl.supportedValuesOf('timeZone').filter((zone) => !OF_ANOTHER_AGE.has(zone))) {
      const zone = zoneFromCalendar(timezone);
      for (let month = 0; month < 24; month++) {
        const local = new Temporal.PlainDateTime(2027 + Math.floor(month / 12), (month % 12) + 1, 15, 12);
        if (offsetIn(zone, local) * 1e9 !== local.toZonedDateTime(timezone).offsetNanoseconds) strange.push(`${timezone} ${local}`);
      }
    }
    expect(strange).toEqual([]);
  });
});
