import { describe, expect, it } from 'vitest';
import type { MadePlan, PlanItem } from '../../shared/contracts/plan';
import type { ProductionFile } from '../../shared/contracts/resources';
import { simulateOdds } from '../../shared/planner/odds';
import { toProblem } from '../../shared/planner/problem';
import { aPass, emptyProduction, hours } from '../factories/bare-production';
import { twoRoomFile, twoRoomPlan } from '../factories/two-room-plan';

const odds = (file: ProductionFile, { items }: Pick<MadePlan, 'items'>, seed = 1, runs = 1000) =>
  simulateOdds(toProblem(file), items, seed, runs);

function item(id: string, from: string, to: string, people: string[] = []): PlanItem {
  return { kind: 'pass', id, room: 'a', start: `2027-03-08T${from}`, end: `2027-03-08T${to}`, people };
}
const reserve = (from: string, to: string): PlanItem => ({
  kind: 'reserve',
  room: 'a',
  start: `2027-03-08T${from}`,
  end: `2027-03-08T${to}`,
  people: [],
});

/** One song for Lys, who leaves at a given time. */
function untilLysLeaves(leaves: string): ProductionFile {
  const file = emptyProduction([aPass('song', { people: ['lys'], minutes: [40, 60, 120] })]);
  file.people[2]!.windows = [hours('08', '10:00', leaves)];
  return file;
}
const song = { items: [item('song', '12:00', '13:00', ['lys'])] };

describe('the odds of a plan', () => {
  it('are the same for the same seed', () => {
    expect(odds(twoRoomFile(), twoRoomPlan(), 7)).toEqual(odds(twoRoomFile(), twoRoomPlan(), 7));
  });

  it('differ a little between seeds', () => {
    const [one, other] = [7, 8].map((seed) => odds(untilLysLeaves('13:15'), song, seed).musts) as [number, number];
    expect(one).not.toBe(other);
    expect(Math.abs(one - other)).toBeLessThan(0.08);
  });

  it('name each room-day in use, with times on the grid and the half before the nine tenths', () => {
    const { days } = odds(twoRoomFile(), twoRoomPlan());
    expect(days.map(({ room, date }) => `${room} ${date}`)).toEqual(['a 2027-03-08', 'a 2027-03-09', 'b 2027-03-09']);
    for (const { p50, p90 } of days) {
      expect(p50).toMatch(/^\d\d:\d[05]$/);
      expect(p90 >= p50).toBe(true);
    }
  });

  it('grow with the time behind the last must', () => {
    const chances = ['13:00', '13:15', '13:30', '14:00', '15:00'].map((leaves) => odds(untilLysLeaves(leaves), song).musts);
    expect(chances).toEqual([...chances].sort((a, b) => a - b));
    expect(chances[0]).toBeLessThan(0.4);
    expect(chances.at(-1)).toBe(1);
  });

  it('take the room’s closing, the end of a hire and the loud hours as the end of time', () => {
    const room = emptyProduction([aPass('song', { minutes: [40, 60, 120] })]);
    room.rooms[0]!.open = [hours('08', '10:00', '13:05')];
    const hire = emptyProduction([aPass('song', { minutes: [40, 60, 120], uses: [{ gear: 'organ' }] })], {
      gear: [{ id: 'organ', windows: [hours('08', '10:00', '13:05')] }],
    });
    const loud = emptyProduction([aPass('song', { minutes: [40, 60, 120], loud: true })]);
    loud.rooms[0]!.loud = [hours('08', '10:00', '13:05')];
    const chances = [room, hire, loud, untilLysLeaves('13:05')].map(
      (file) => odds(file, { items: [item('song', '12:00', '13:00')] }).musts,
    );
    expect(new Set(chances.slice(0, 3)).size).toBe(1);
    expect(chances[0]).toBeLessThan(0.6);
  });

  it('are better with a reserve before what is scarce than after it', () => {
    const file = untilLysLeaves('15:00');
    file.passes!.unshift(aPass('band', { minutes: [50, 60, 100] }));
    file.passes!.find(({ id }) => id === 'song')!.minutes = [50, 60, 100];
    const before = odds(file, {
      items: [
        item('band', '12:00', '13:00'),
        reserve('13:00', '13:20'),
        item('song', '13:20', '14:20', ['lys']),
        reserve('14:20', '14:30'),
      ],
    });
    const after = odds(file, {
      items: [item('band', '12:40', '13:40'), item('song', '13:40', '14:40', ['lys']), reserve('14:40', '15:10')],
    });
    expect(before.musts).toBeGreaterThan(after.musts);
  });

  it('hand on only half of what is finished early, and never call people before they come', () => {
    const quick = emptyProduction([aPass('a1', { minutes: [10, 60, 60] }), aPass('a2', { people: ['lys'], minutes: 60 })]);
    const { days } = odds(quick, { items: [item('a1', '12:00', '13:00'), item('a2', '13:00', '14:00', ['lys'])] });
    expect(days[0]!.p50 >= '13:55').toBe(true);
  });

  it('fall together with the pass on which a must waits', () => {
    const file = untilLysLeaves('13:05');
    file.passes!.push(aPass('overdub', { minutes: 30, after: [{ pass: 'song' }] }));
    const alone = odds(untilLysLeaves('13:05'), song).musts;
    const both = odds(file, { items: [...song.items, item('overdub', '15:00', '15:30')] }).musts;
    expect(both).toBeLessThanOrEqual(alone + 0.05);
  });

  it('do not count what was not promised', () => {
    const file = untilLysLeaves('13:00');
    file.passes![0]!.priority = 'nice';
    expect(odds(file, song).musts).toBe(1);
    expect(odds(emptyProduction(), { items: [] })).toEqual({ musts: 1, days: [] });
  });
});
