import { describe, expect, it } from 'vitest';
import {
  readHours,
  readList,
  readMinutes,
  readMinutesByPerson,
  readNumber,
  readPresence,
  readSize,
  readSpan,
  readWhole,
  writeMinutes,
  writeMinutesByPerson,
  writeSize,
} from '../../shared/domain/entries';

describe('what is typed into a form', () => {
  it.each([
    ['45', 45],
    [' 45 min', 45],
    ['30 45 70', [30, 45, 70]],
    ['30 · 45 · 70', [30, 45, 70]],
    ['30–45–70', [30, 45, 70]],
    ['', null],
  ])('reads minutes: %s', (text, value) => expect(readMinutes(text)).toEqual({ value }));

  it.each(['0', '30 45', '70 45 30', 'an hour', '1.5', '-5 x'])('does not take for minutes: %s', (text) =>
    expect(readMinutes(text)).toHaveProperty('expected'),
  );

  it('writes minutes so that they read back', () => {
    expect(readMinutes(writeMinutes([30, 45, 70]))).toEqual({ value: [30, 45, 70] });
    expect(writeMinutes(undefined)).toBe('');
  });

  it('keeps numbers within their bounds', () => {
    expect(readWhole('4', 0, 4)).toEqual({ value: 4 });
    expect(readWhole('5', 0, 4)).toEqual({ expected: 'a whole number from 0 to 4' });
    expect(readWhole('2.5')).toHaveProperty('expected');
    expect(readNumber('−0,5', -1, 1)).toEqual({ value: -0.5 });
    expect(readNumber('1.2', -1, 1)).toEqual({ expected: 'a number from -1 to 1' });
  });

  it('reads lists and sizes', () => {
    expect(readList('chart, tempo map;\n tuner ')).toEqual({ value: ['chart', 'tempo map', 'tuner'] });
    expect(readList(' , ')).toEqual({ value: null });
    expect(readSize('9 x 7 x 3,2 m')).toEqual({ value: [9, 7, 3.2] });
    expect(readSize('9 7')).toHaveProperty('expected');
    expect(readSize(writeSize([9, 7, 3.2]))).toEqual({ value: [9, 7, 3.2] });
  });

  it('reads windows, and names the line it did not understand', () => {
    expect(readPresence('maybe 8 Mar 14–18', '2027-03-08')).toEqual({
      value: [{ from: '2027-03-08T14:00', to: '2027-03-08T18:00', sure: false }],
    });
    expect(readPresence('8 Mar 14–18\nsome day', '2027-03-08')).toEqual({
      expected: expect.stringContaining('(not “some day”)') as unknown,
    });
    expect(readPresence('always', '2027-03-08')).toEqual({ value: null });
    expect(readHours('maybe 8 Mar 14–18', '2027-03-08')).toHaveProperty('expected');
    expect(readSpan('10 Mar 18–18:15', '2027-03-08')).toEqual({ value: { from: '2027-03-10T18:00', to: '2027-03-10T18:15' } });
    expect(readSpan('8–9 Mar 18–19', '2027-03-08')).toHaveProperty('expected');
  });

  it('reads minutes by the names people have', () => {
    const people = [
      { id: 'tobin', name: 'Tobin Rush', short: 'Tobin' },
      { id: 'dov', name: 'Dov' },
    ];
    expect(readMinutesByPerson('tobin rush 75; Dov: 30 min', people)).toEqual({ value: { tobin: 75, dov: 30 } });
    expect(writeMinutesByPerson({ tobin: 75, dov: 30 }, people)).toBe('Tobin 75, Dov 30');
    expect(readMinutesByPerson('Nobody 5', people)).toEqual({ expected: expect.stringContaining('such as Tobin 30') as unknown });
  });
});
