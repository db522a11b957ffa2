import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readWindows } from '../../shared/time/windows';
import { windowLines, writeWindows } from '../../shared/time/windowWords';
import { daysFromEpoch, writeDate } from '../../shared/time/wall';

const AROUND = '2027-03-08';
const read = (text: string) => readWindows(text, AROUND);
const one = (text: string) => {
  const { windows, faults } = read(text);
  expect(faults).toEqual([]);
  return windows;
};
const span = (from: string, to: string, sure?: false) => ({ from, to, ...(sure === false ? { sure } : {}) });

describe('windows as they are typed', () => {
  it.each([
    ['8 Mar 14–18', [span('2027-03-08T14:00', '2027-03-08T18:00')]],
    ['8 mar 14-18', [span('2027-03-08T14:00', '2027-03-08T18:00')]],
    ['Mon 8 March 9.30 to 17', [span('2027-03-08T09:30', '2027-03-08T17:00')]],
    ['8–9 Mar', [span('2027-03-08T00:00', '2027-03-10T00:00')]],
    ['8–9 Mar 14–18', [span('2027-03-08T14:00', '2027-03-08T18:00'), span('2027-03-09T14:00', '2027-03-09T18:00')]],
    ['31 Mar – 1 Apr 10–12', [span('2027-03-31T10:00', '2027-03-31T12:00'), span('2027-04-01T10:00', '2027-04-01T12:00')]],
    ['8 Mar', [span('2027-03-08T00:00', '2027-03-09T00:00')]],
    ['8 Mar from 12:30', [span('2027-03-08T12:30', '2027-03-09T00:00')]],
    ['8 Mar until 17', [span('2027-03-08T00:00', '2027-03-08T17:00')]],
    ['8 Mar 14–24', [span('2027-03-08T14:00', '2027-03-09T00:00')]],
    ['8 Mar 20–02', [span('2027-03-08T20:00', '2027-03-09T02:00')]],
    ['8 Mar 14:00 – 10 Mar 02:00', [span('2027-03-08T14:00', '2027-03-10T02:00')]],
    ['maybe 10 Mar 10–20', [span('2027-03-10T10:00', '2027-03-10T20:00', false)]],
    ['10 Mar 10–20 (maybe)', [span('2027-03-10T10:00', '2027-03-10T20:00', false)]],
    ['2027-03-08 14:00–18:00', [span('2027-03-08T14:00', '2027-03-08T18:00')]],
    ['29 Feb 2028 10–11', [span('2028-02-29T10:00', '2028-02-29T11:00')]],
  ])('%s', (text, windows) => {
    expect(one(text)).toEqual(windows);
  });

  it('takes the year that lies nearest to the production', () => {
    expect(readWindows('2 Jan 10–12', '2027-12-30').windows?.[0]?.from).toBe('2028-01-02T10:00');
    expect(readWindows('30 Dec 10–12', '2028-01-02').windows?.[0]?.from).toBe('2027-12-30T10:00');
  });

  it('tells no limit from no window', () => {
    expect(read('')).toEqual({ windows: undefined, faults: [] });
    expect(read('  always ').windows).toBeUndefined();
    expect(read('never').windows).toEqual([]);
  });

  it.each([
    ['whenever she likes', /a day and hours/],
    ['31 Feb 10–12', /a date that exists/],
    ['8 Foo 10–12', /a month/],
    ['Tue 8 Mar 10–12', /8 Mar 2027 is a Mon/],
    ['8 Mar 14–25', /0:00 to 24:00/],
    ['8 Mar 14–14', /different times/],
    ['9–8 Mar', /a last day after/],
    ['9 Mar 14:00 – 8 Mar 15:00', /end after its beginning/],
    ['8 Mar 14–18 or so', /a day and hours/],
  ])('says what it expected instead of: %s', (text, expected) => {
    const { windows, faults } = read(`8 Mar 9–10\n\n${text}`);
    expect(windows).toHaveLength(1);
    expect(faults).toEqual([{ line: 3, text, expected: expect.stringMatching(expected) as unknown }]);
  });
});

describe('windows in words', () => {
  it('writes days that share their hours in one line', () => {
    const windows = [8, 9, 10].map((day) =>
      span(`2027-03-${String(day).padStart(2, '0')}T10:00`, `2027-03-${String(day).padStart(2, '0')}T20:00`),
    );
    expect(windowLines(windows, AROUND)).toEqual(['8–10 Mar 10–20']);
    expect(windowLines([span('2027-03-09T14:00', '2027-03-09T17:30', false)], AROUND)).toEqual(['maybe 9 Mar 14–17:30']);
    expect(writeWindows(undefined, AROUND)).toBe('');
    expect(writeWindows([], AROUND)).toBe('never');
  });

  it('reads back to the same windows, whatever they are', () => {
    const base = daysFromEpoch(2027, 3, 8);
    const stamp = (minutes: number) => {
      const days = Math.floor(minutes / 1440);
      const rest = minutes - days * 1440;
      return `${writeDate(base + days)}T${String(Math.floor(rest / 60)).padStart(2, '0')}:${String(rest % 60).padStart(2, '0')}`;
    };
    const window = fc
      .record({
        day: fc.integer({ min: -400, max: 400 }),
        start: fc.oneof(fc.constant(0), fc.integer({ min: 0, max: 1439 })),
        length: fc.oneof(fc.constantFrom(1440, 2880, 60, 1439, 1441), fc.integer({ min: 1, max: 4000 })),
        sure: fc.boolean(),
      })
      .map(({ day, start, length, sure }) => span(stamp(day * 1440 + start), stamp(day * 1440 + start + length), sure ? undefined : false));
    fc.assert(
      fc.property(fc.array(window, { minLength: 1, maxLength: 6 }), (windows) => {
        const back = readWindows(writeWindows(windows, AROUND), AROUND);
        expect(back.faults).toEqual([]);
        expect(back.windows).toEqual(windows);
      }),
      { numRuns: 500 },
    );
  });
});
