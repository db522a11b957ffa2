import { describe, expect, it } from 'vitest';
import { gridOf, hiddenStretches } from '../../shared/planner/calendars';
import { toProblem } from '../../shared/planner/problem';
import { gridAtOrAfter, gridAtOrBefore, nameable } from '../../shared/solver/grid';
import { EVER } from '../../shared/solver/model';
import { zoneClock } from '../../shared/time/wall';
import { aPass, emptyProduction, hours } from '../factories/bare-production';

const lisbon = zoneClock('Europe/Lisbon');
const at = (wall: string) => lisbon.minuteOf(wall) as number;
const window = (from: string, to: string) => ({ from: at(from), to: at(to) });
const day = window('2027-03-08T10:00', '2027-03-08T20:00');

describe('the grid of a room-day', () => {
  it('counts steps from midnight by the wall clock', () => {
    const grid = gridOf(lisbon, 7, day, []);
    // 10:00 is minute 600 of the day; 602 = 86 × 7 is the first multiple of 7.
    expect(lisbon.wallOf(gridAtOrAfter(grid, 7, day.from))).toBe('2027-03-08T10:02');
    expect(gridAtOrBefore(grid, 7, at('2027-03-08T10:08'))).toBe(at('2027-03-08T10:02'));
    expect(gridAtOrAfter(grid, 7, day.to + 1)).toBe(EVER);
  });

  it('begins anew at midnight where the step does not divide the day', () => {
    const night = window('2027-03-08T22:00', '2027-03-09T02:00');
    const grid = gridOf(lisbon, 7, night, []);
    expect(lisbon.wallOf(gridAtOrAfter(grid, 7, at('2027-03-08T23:56')))).toBe('2027-03-09T00:00');
  });

  it('leaves out the hour that the clock shows twice, as its times could not be told apart', () => {
    const night = window('2027-10-30T23:00', '2027-10-31T04:00');
    const hidden = hiddenStretches(lisbon, night.from, night.to);
    expect(hidden).toHaveLength(1);
    const second = hidden[0]!.from + 20;
    expect(lisbon.wallOf(second)).toBe('2027-10-31T01:20');
    expect(second).not.toBe(at('2027-10-31T01:20'));
    const grid = gridOf(lisbon, 5, night, hidden);
    expect(lisbon.wallOf(gridAtOrAfter(grid, 5, second))).toBe('2027-10-31T02:00');
    expect(nameable(hidden, second)).toBe(at('2027-10-31T02:00'));
  });

  it('finds the half-hour change of Lord Howe Island', () => {
    const island = zoneClock('Australia/Lord_Howe');
    const from = island.minuteOf('2027-04-03T20:00') as number;
    const hidden = hiddenStretches(island, from, from + 900);
    expect(hidden.map((span) => span.to - span.from)).toEqual([30]);
  });
});

describe('the problem of a production', () => {
  it('knows where a pass may start by itself: hours less the wrap, windows of its people, events and pins', () => {
    const file = emptyProduction([aPass('x', { people: ['lys'], pin: { notAfter: '2027-03-08T18:30' } })]);
    file.production.rules = { ...file.production.rules, wrap: 45 };
    file.people[2]!.windows = [hours('08', '12:00', '15:00'), hours('08', '15:00', '19:00'), hours('09', '18:30', '20:00')];
    file.events = [{ id: 'tuner', ...hours('08', '13:30', '14:15'), room: 'a' }];
    const problem = toProblem(file);
    expect(problem.passes[0]!.starts.map(({ from, to }) => [lisbon.wallOf(from), lisbon.wallOf(to)])).toEqual([
      ['2027-03-08T12:00', '2027-03-08T12:30'],
      ['2027-03-08T14:15', '2027-03-08T17:30'],
    ]);
  });

  it('puts both halves of a date in layers one after the other, and side by side what opens in different rooms', () => {
    const file = emptyProduction([]);
    file.rooms[0]!.open = [hours('08', '15:00', '20:00'), hours('08', '10:00', '13:00'), hours('09', '10:00', '20:00')];
    const { days } = toProblem(file);
    expect(days.map(({ room, date, layer, written }) => [room, date.slice(8), layer, written])).toEqual([
      [0, '08', 0, 1],
      [1, '08', 0, 0],
      [0, '08', 1, 0],
      [0, '09', 2, 2],
      [1, '09', 2, 1],
      [1, '10', 3, 2],
    ]);
  });

  it('keeps apart one song in two rooms, and loud work from quiet work that hears it', () => {
    const passes = [
      aPass('one', { song: 's1' }),
      aPass('two', { song: 's1', room: 'b' }),
      aPass('loud', { loud: true }),
      aPass('quiet', { quiet: true, room: 'b' }),
    ];
    const file = emptyProduction(passes, { songs: [{ id: 's1' }] });
    file.rooms[1]!.hears = ['a'];
    expect(toProblem(file).passes.map(({ apart }) => apart)).toEqual([[1], [0], [3], [2]]);
    file.production.rules = { ...file.production.rules, oneRoomPerSong: false };
    file.rooms[1]!.hears = [];
    expect(toProblem(file).passes.map(({ apart }) => apart)).toEqual([[], [], [], []]);
  });
});
