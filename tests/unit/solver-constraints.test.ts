import { describe, expect, it } from 'vitest';
import type { Pass, ProductionFile } from '../../shared/contracts/resources';
import { toProblem } from '../../shared/planner/problem';
import { Attempt } from '../../shared/solver/attempt';
import { Board } from '../../shared/solver/board';
import { OF_A_PERSON, OF_THE_PASS } from '../../shared/solver/constraints/all';
import { apart } from '../../shared/solver/constraints/apart';
import type { StartConstraint } from '../../shared/solver/constraints/constraint';
import { gearCount } from '../../shared/solver/constraints/gear-count';
import { dayLimit } from '../../shared/solver/constraints/limits';
import { onePlace } from '../../shared/solver/constraints/one-place';
import { ownMeals } from '../../shared/solver/constraints/own-meals';
import { stays } from '../../shared/solver/constraints/stays';
import { turnaround } from '../../shared/solver/constraints/turnaround';
import { voice } from '../../shared/solver/constraints/voice';
import { EVER } from '../../shared/solver/model';
import { layTail, reserveOf } from '../../shared/solver/tail';
import { toMinute, toWall } from '../../shared/time/wall';
import { aPass, emptyProduction, hours } from '../factories/bare-production';

const ZONE = 'Europe/Lisbon';
const at = (time: string, day = '08') => toMinute(`2027-03-${day}T${time}`, ZONE);
const MARA = 0;

/** What a constraint answers for Mara's pass `x` of an hour, beside work of hers from … to … on given days. */
function asked(
  constraint: StartConstraint,
  start: string,
  work: [string, string, string?][],
  change: (file: ProductionFile) => void = () => {},
) {
  const file = emptyProduction([aPass('x', { people: ['mara'] }), ...work.map((_, i) => aPass(`w${i}`, { people: ['mara'] }))]);
  change(file);
  const problem = toProblem(file);
  const board = new Board(problem);
  board.clear();
  work.forEach(([from, to, day = '08'], i) =>
    board.addEntry(MARA, at(from, day), at(to, day), i + 1, problem.dates.indexOf(`2027-03-${day}`)),
  );
  const attempt = new Attempt(problem);
  attempt.person = MARA;
  attempt.date = problem.dates.indexOf('2027-03-08');
  attempt.start = at(start);
  attempt.end = at(start) + 60;
  attempt.read(board);
  if (constraint !== onePlace) attempt.join();
  const next = constraint.next(board, attempt);
  return next === EVER ? 'never' : toWall(next, ZONE).slice(11);
}

const rules = (more: NonNullable<ProductionFile['production']['rules']>) => (file: ProductionFile) => {
  file.production.rules = { ...file.production.rules, ...more };
};
const person = (more: Partial<ProductionFile['people'][number]>) => (file: ProductionFile) => {
  Object.assign(file.people[MARA]!, more);
};

describe('a person', () => {
  it('is in one place at a time', () => {
    expect(asked(onePlace, '11:00', [['12:00', '13:00']])).toBe('11:00');
    expect(asked(onePlace, '11:30', [['12:00', '13:00']])).toBe('13:00');
  });

  it('stays within one window, waiting included, unless a long gap is time off', () => {
    const windows = [hours('08', '10:00', '13:00'), hours('08', '14:00', '18:00')];
    expect(asked(stays, '15:00', [], person({ windows }))).toBe('15:00');
    expect(asked(stays, '15:00', [['11:00', '12:00']], person({ windows }))).toBe('never');
    expect(asked(stays, '15:00', [['11:00', '12:00']], person({ windows, away: 180 }))).toBe('15:00');
    expect(asked(stays, '14:30', [['11:00', '12:00']], person({ windows, away: 180 }))).toBe('15:00');
  });

  it('has a longest day from arrival to release', () => {
    expect(asked(dayLimit, '15:00', [['10:00', '11:00']], person({ limits: { day: 360 } }))).toBe('15:00');
    expect(asked(dayLimit, '15:30', [['10:00', '11:00']], person({ limits: { day: 360 } }))).toBe('never');
    expect(asked(dayLimit, '10:00', [['16:00', '17:00']], person({ limits: { day: 360 } }))).toBe('11:00');
  });

  it('has a night between two dates, before and after', () => {
    expect(asked(turnaround, '10:00', [['20:00', '23:30', '07']], rules({ turnaround: 660 }))).toBe('10:30');
    expect(asked(turnaround, '21:00', [['09:00', '10:00', '09']], rules({ turnaround: 660 }))).toBe('21:00');
    expect(asked(turnaround, '21:05', [['09:00', '10:00', '09']], rules({ turnaround: 660 }))).toBe('never');
  });

  it('eats: works no longer than allowed without a gap of a meal', () => {
    const meals = rules({ meal: 45, mealAfter: 300 });
    expect(asked(ownMeals, '14:00', [['10:00', '13:30']], meals)).toBe('14:00');
    expect(asked(ownMeals, '14:05', [['10:00', '13:30']], meals)).toBe('14:15');
    expect(asked(ownMeals, '10:00', [['11:30', '16:00']], meals)).toBe('11:00');
  });

  it('sings no longer than the voice bears on one date', () => {
    const sung = (minutes: number) => (file: ProductionFile) => {
      person({ limits: { voice: 40 } })(file);
      for (const pass of file.passes!) pass.voice = { mara: minutes };
    };
    expect(asked(voice, '15:00', [['10:00', '11:00']], sung(20))).toBe('15:00');
    expect(asked(voice, '15:00', [['10:00', '11:00']], sung(21))).toBe('never');
  });
});

describe('a pass', () => {
  const beside = (
    passes: Pass[],
    more: Partial<ProductionFile>,
    constraint: StartConstraint,
    start: string,
    others: [number, string][],
  ) => {
    const problem = toProblem(emptyProduction(passes, more));
    const board = new Board(problem);
    board.clear();
    for (const [pass, from] of others) {
      board.start[pass] = at(from);
      board.end[pass] = at(from) + problem.passes[pass]!.minutes;
    }
    const attempt = new Attempt(problem);
    attempt.start = at(start);
    attempt.end = at(start) + problem.passes[0]!.minutes;
    return toWall(constraint.next(board, attempt), ZONE).slice(11);
  };

  it('runs after those it must not meet, one behind the other', () => {
    const passes = [aPass('x', { apart: ['y', 'z'] }), aPass('y', { room: 'b' }), aPass('z', { room: 'b' })];
    const others: [number, string][] = [
      [1, '10:30'],
      [2, '11:30'],
    ];
    expect(beside(passes, {}, apart, '10:00', others)).toBe('12:30');
    expect(beside(passes, {}, apart, '12:30', others)).toBe('12:30');
  });

  it('finds its gear free for as long as it lasts', () => {
    const uses = [{ gear: 'phones', count: 2 }];
    const passes = [aPass('x', { uses }), aPass('y', { room: 'b', uses }), aPass('z', { room: 'b', uses: [{ gear: 'phones' }] })];
    const others: [number, string][] = [
      [1, '10:30'],
      [2, '11:30'],
    ];
    expect(beside(passes, { gear: [{ id: 'phones', count: 4 }] }, gearCount, '10:00', others)).toBe('10:00');
    expect(beside(passes, { gear: [{ id: 'phones', count: 3 }] }, gearCount, '10:00', others)).toBe('11:30');
    expect(beside(passes, { gear: [{ id: 'phones', count: 2 }] }, gearCount, '10:00', others)).toBe('12:30');
  });
});

describe('every constraint', () => {
  it('is hard, and has a name of its own and a reason that ends a sentence', () => {
    const all = [onePlace, ...OF_THE_PASS, ...OF_A_PERSON];
    expect(new Set(all.map(({ name }) => name)).size).toBe(all.length);
    for (const { level, reason } of all) {
      expect(level).toBe('hard');
      expect(reason).toMatch(/^[a-z].*[^.]$/);
    }
  });
});

describe('the end of a room-day', () => {
  const tail = (last: string, reserve: number, more: NonNullable<ProductionFile['production']['rules']>, since = last) => {
    const file = emptyProduction([]);
    rules({ wrap: 45, ...more })(file);
    file.events = [{ id: 'bells', ...hours('08', '19:00', '19:15'), room: 'a' }];
    const said: string[] = [];
    const say = (kind: string) => (from: number, to: number) =>
      said.push(`${toWall(from, ZONE).slice(11)}–${toWall(to, ZONE).slice(11)} ${kind}`);
    const end = layTail(toProblem(file), 0, at(last), at(since), at(since), reserve, { reserve: say('reserve'), wrap: say('wrap') });
    return end === EVER ? 'does not fit' : said;
  };

  it('holds the reserve and then the wrap', () => {
    expect(tail('16:00', 30, {})).toEqual(['16:00–16:30 reserve', '16:30–17:15 wrap']);
  });
  it('goes around the events of the room', () => {
    expect(tail('18:30', 15, {})).toEqual(['18:30–18:45 reserve', '19:15–20:00 wrap']);
    expect(tail('18:50', 15, {})).toBe('does not fit');
  });
  it('makes the pauses that the work before asks for', () => {
    expect(tail('15:30', 0, { meal: 45, mealAfter: 300 }, '10:35')).toEqual(['16:15–17:00 wrap']);
    expect(tail('15:30', 90, { break: 15, breakAfter: 120 })).toEqual(['15:30–17:00 reserve', '17:15–18:00 wrap']);
    expect(tail('15:30', 30, { break: 15, breakAfter: 120 }, '14:30')).toEqual(['15:45–16:15 reserve', '16:15–17:00 wrap']);
  });
  it('asks for the share of the pass minutes, rounded down to the step', () => {
    const problem = toProblem(emptyProduction([]));
    problem.rules.reserve = 0.15;
    expect([100, 99, 700, 0].map((minutes) => reserveOf(problem, minutes))).toEqual([15, 10, 105, 0]);
  });
});
