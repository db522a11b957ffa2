import { describe, expect, it } from 'vitest';
import { toMinute, toWall, zoneClock } from '../../shared/time/wall';
import { clock, dateOfWall, dayWords, length } from '../../shared/time/words';

describe('times in words', () => {
  it('a clock time drops the date', () => {
    expect(clock('2027-03-08T12:30')).toBe('12:30');
    expect(dateOfWall('2027-03-08T12:30')).toBe('2027-03-08');
  });

  it.each([
    ['2027-03-08', 'Mon 8 March'],
    ['2028-02-29', 'Tue 29 February'],
    ['2000-01-01', 'Sat 1 January'],
    ['1969-07-20', 'Sun 20 July'],
    ['2027-12-31', 'Fri 31 December'],
  ])('%s is %s', (date, words) => expect(dayWords(date)).toBe(words));

  it.each([
    [0, '0 min'],
    [45, '45 min'],
    [60, '1 h'],
    [75, '1 h 15'],
    [125, '2 h 05'],
    [-20, '−20 min'],
  ])('%i minutes are %s', (minutes, words) => expect(length(minutes)).toBe(words));
});

describe('the calendar', () => {
  it('agrees with the engine for every day of four centuries', () => {
    const utc = zoneClock('UTC');
    for (let day = -150_000; day <= 150_000; day += 1) {
      const expected = new Date(day * 86_400_000).toISOString().slice(0, 10);
      if (utc.dateOf(day * 1440) !== expected) expect(utc.dateOf(day * 1440)).toBe(expected);
    }
  });

  it('keeps leap days and the ends of the four-digit years', () => {
    for (const wall of ['2028-02-29T23:59', '2000-02-29T00:00', '0001-01-01T00:00', '9999-12-31T23:59'])
      expect(toWall(toMinute(wall, 'Europe/Lisbon'), 'Europe/Lisbon')).toBe(wall);
  });

  it('an unknown zone is refused', () => {
    expect(() => toMinute('2027-03-08T10:00', 'Europe/Atlantis')).toThrow(RangeError);
  });
});
