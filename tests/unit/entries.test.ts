import { describe, expect, it } from 'vitest';
import { readList, readMinutes, readNumber, readSize, readWhole, writeMinutes, writeSize } from '../../shared/domain/entries';

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
});
