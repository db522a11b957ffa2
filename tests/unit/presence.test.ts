import { describe, expect, it } from 'vitest';
import { dayHours, firstDay, presenceOn, studioDays } from '../../shared/planner/presence';

const rooms = [
  {
    id: 'a',
    open: [
      { from: '2027-03-09T10:00', to: '2027-03-09T20:00' },
      { from: '2027-03-08T12:00', to: '2027-03-09T02:00' },
    ],
  },
  { id: 'b', open: [{ from: '2027-03-08T10:30', to: '2027-03-08T18:00' }] },
];

describe('presence on the days of the studio', () => {
  it('takes each day from its first opening to its last closing, past midnight too', () => {
    const days = studioDays({ rooms });
    expect(days).toEqual([
      { date: '2027-03-08', opens: 630, closes: 1560 },
      { date: '2027-03-09', opens: 600, closes: 1200 },
    ]);
    expect(days.map(dayHours)).toEqual(['10:30–2', '10–20']);
    expect(firstDay({ rooms }, '2030-01-01')).toBe('2027-03-08');
    expect(firstDay({ rooms: [] }, '2030-01-01')).toBe('2030-01-01');
  });

  it('draws windows as far as a room is open', () => {
    const day = { date: '2027-03-09', opens: 600, closes: 1200 };
    expect(presenceOn(day, undefined)).toEqual([{ from: 0, to: 1, sure: true }]);
    expect(presenceOn(day, [])).toEqual([]);
    expect(
      presenceOn(day, [
        { from: '2027-03-08T00:00', to: '2027-03-09T15:00' },
        { from: '2027-03-09T17:30', to: '2027-03-09T23:00', sure: false },
        { from: '2027-03-10T10:00', to: '2027-03-10T12:00' },
      ]),
    ).toEqual([
      { from: 0, to: 0.5, sure: true },
      { from: 0.75, to: 1, sure: false },
    ]);
  });
});
