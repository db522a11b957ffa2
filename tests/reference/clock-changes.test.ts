import { Temporal } from 'temporal-polyfill';
import { describe, expect, it } from 'vitest';
import { SkippedTimeError, toMinute, toWall, zoneClock } from '../../shared/time/wall';

/**
 * Clock changes of 2025 and 2027 by the IANA time zone database, release 2025b (files europe, northamerica, australasia, asia);
 * rows of 2027 are what its rules say will happen. Columns: zone, moment of the change in UTC, offset before, offset after (minutes).
 */
const CHANGES: [zone: string, utc: string, before: number, after: number][] = [
  ['Europe/Lisbon', '2027-03-28T01:00Z', 0, 60],
  ['Europe/Lisbon', '2027-10-31T01:00Z', 60, 0],
  ['Europe/London', '2025-03-30T01:00Z', 0, 60],
  ['Europe/London', '2027-03-28T01:00Z', 0, 60],
  ['Europe/London', '2027-10-31T01:00Z', 60, 0],
  ['Europe/Berlin', '2027-03-28T01:00Z', 60, 120],
  ['Europe/Berlin', '2027-10-31T01:00Z', 120, 60],
  ['America/New_York', '2027-03-14T07:00Z', -300, -240],
  ['America/New_York', '2027-11-07T06:00Z', -240, -300],
  ['Australia/Lord_Howe', '2027-04-03T15:00Z', 660, 630],
  ['Australia/Lord_Howe', '2027-10-02T15:30Z', 630, 660],
  ['America/Santiago', '2027-04-04T03:00Z', -180, -240],
  ['Pacific/Auckland', '2027-09-25T14:00Z', 720, 780],
];
const STEADY: [zone: string, offset: number][] = [
  ['Asia/Kathmandu', 345],
  ['Asia/Tokyo', 540],
  ['America/Phoenix', -420],
  ['Australia/Brisbane', 600],
];
const utcMinute = (text: string) => Date.parse(text) / 60_000;

describe('clock changes of the IANA database', () => {
  it.each(CHANGES)('%s changes at %s', (zone, utc, before, after) => {
    const at = utcMinute(utc);
    const clock = zoneClock(zone);
    expect([clock.offsetAt(at - 1), clock.offsetAt(at)]).toEqual([before, after]);
  });

  it.each(STEADY)('%s stays at %i minutes all through 2025 and 2027', (zone, offset) => {
    const clock = zoneClock(zone);
    for (const year of [2025, 2027])
      for (let month = 1; month <= 12; month++)
        expect(clock.offsetAt(utcMinute(`${year}-${String(month).padStart(2, '0')}-15T12:00Z`))).toBe(offset);
  });

  it('a night shift over the London spring change of 2025 lasts seven hours', () => {
    expect(toMinute('2025-03-30T06:00', 'Europe/London') - toMinute('2025-03-29T22:00', 'Europe/London')).toBe(420);
  });

  it('the Lord Howe gap is half an hour', () => {
    const clock = zoneClock('Australia/Lord_Howe');
    expect(clock.minuteOf('2027-10-03T01:59')).toBe(utcMinute('2027-10-02T15:29Z'));
    expect(clock.minuteOf('2027-10-03T02:00')).toBe('gap');
    expect(clock.minuteOf('2027-10-03T02:29')).toBe('gap');
    expect(clock.minuteOf('2027-10-03T02:30')).toBe(utcMinute('2027-10-02T15:30Z'));
  });
});

describe('the cases of RFC 5545 section 3.3.5 (form 3, local time with a zone)', () => {
  it('a repeated time is the first one: 01:30 in New York on 4 November 2007 is 05:30 UTC', () => {
    expect(toMinute('2007-11-04T01:30', 'America/New_York')).toBe(utcMinute('2007-11-04T05:30Z'));
  });

  it('02:30 in New York on 11 March 2007 is shown by no clock; the RFC reads it as 07:30 UTC, shown as 03:30', () => {
    expect(zoneClock('America/New_York').minuteOf('2007-03-11T02:30')).toBe('gap');
    expect(() => toMinute('2007-03-11T02:30', 'America/New_York')).toThrow(SkippedTimeError);
    expect(toWall(utcMinute('2007-03-11T07:30Z'), 'America/New_York')).toBe('2007-03-11T03:30');
  });

  it('both passes of a repeated hour are shown alike', () => {
    const clock = zoneClock('Europe/Lisbon');
    const first = toMinute('2027-10-31T01:30', 'Europe/Lisbon');
    expect(clock.wallOf(first)).toBe('2027-10-31T01:30');
    expect(clock.wallOf(first + 60)).toBe('2027-10-31T01:30');
  });
});

describe('agreement with Temporal', () => {
  const zones = [...new Set([...CHANGES, ...STEADY].map(([zone]) => zone)), 'UTC', 'Africa/Casablanca', 'Pacific/Apia', 'America/St_Johns'];
  it.each(zones)('%s: every 35 minutes from 2010 to 2012 and over 2027, in both directions', (zone) => {
    const clock = zoneClock(zone);
    for (const [from, to] of [
      ['2010-12-30T00:00Z', '2012-01-03T00:00Z'],
      ['2027-01-01T00:00Z', '2028-03-02T00:00Z'],
    ] as const) {
      for (let minute = utcMinute(from); minute < utcMinute(to); minute += 35) {
        const plain = Temporal.Instant.fromEpochMilliseconds(minute * 60_000)
          .toZonedDateTimeISO(zone)
          .toPlainDateTime();
        const wall = plain.toString({ smallestUnit: 'minute' });
        if (clock.wallOf(minute) !== wall) expect(clock.wallOf(minute)).toBe(wall);
        const earlier = plain.toZonedDateTime(zone, { disambiguation: 'earlier' }).epochMilliseconds / 60_000;
        if (clock.minuteOf(wall) !== earlier) expect(clock.minuteOf(wall)).toBe(earlier);
      }
    }
  });

  it.each(zones)('%s: a wall time is a gap exactly where Temporal rejects it', (zone) => {
    const clock = zoneClock(zone);
    const start = Temporal.PlainDateTime.from('2027-01-01T00:00');
    for (let step = 0; step < 366 * 48; step++) {
      const plain = start.add({ minutes: step * 30 });
      const exists = plain.toZonedDateTime(zone, { disambiguation: 'compatible' }).toPlainDateTime().equals(plain);
      const wall = plain.toString({ smallestUnit: 'minute' });
      if ((clock.minuteOf(wall) !== 'gap') !== exists)
        expect.fail(`${wall} in ${zone}: Temporal says it ${exists ? 'exists' : 'is skipped'}`);
    }
  });

  it('Samoa skipped the whole of 30 December 2011', () => {
    expect(zoneClock('Pacific/Apia').minuteOf('2011-12-30T12:00')).toBe('gap');
  });
});
