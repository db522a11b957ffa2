import { describe, expect, it } from 'vitest';
import type { MadePlan, PlanItem } from '../../shared/contracts/plan';
import type { ProductionFile } from '../../shared/contracts/resources';
import { checkPlan } from '../../shared/solver/check/check';
import { callOf, fresh, itemOf, MONDAY, TUESDAY, type Case } from '../factories/spoil-plan';

describe('a plan worked out by hand', () => {
  it('is free of violations and costs what was reckoned', () => {
    const { file, plan } = fresh();
    expect(checkPlan(file, plan)).toEqual({ violations: [], cost: plan.cost });
  });
});

/** A night in the mountains: one window past midnight over a clock change, one room, one player, nothing but passes and waits. */
function night(date: string, minutes: number): Case {
  const next = `${date.slice(0, 8)}${String(Number(date.slice(8)) + 1).padStart(2, '0')}`;
  const file: ProductionFile = {
    production: {
      code: 'OWL',
      title: 'Owl Hours',
      timezone: 'Europe/Berlin',
      rules: { wrap: 0, reserve: 0, breakAfter: 0, mealAfter: 600, turnaround: 0 },
    },
    rooms: [{ id: 'a', open: [{ from: `${date}T22:00`, to: `${next}T06:00` }] }],
    people: [{ id: 'ida', limits: { day: minutes } }],
    gear: [],
    setups: [],
    changeovers: [],
    songs: [],
    passes: [
      { id: 'early', people: ['ida'], room: 'a', minutes: 60, pin: { day: date } },
      { id: 'late', people: ['ida'], room: 'a', minutes: 60, pin: { day: date } },
    ],
    events: [{ id: 'tea', from: `${next}T05:00`, to: `${next}T05:30`, room: 'a', people: ['ida'] }],
  };
  const item = (id: string, start: string, end: string): PlanItem => ({ kind: 'pass', id, room: 'a', start, end, people: ['ida'] });
  const waiting = minutes - 150;
  const cost = { waiting, changeover: 0, day: 120, overtime: 0, call: 15, maybe: 0, unplaced: 0 };
  const plan: MadePlan = {
    status: 'feasible',
    cost: { total: waiting + 135, ...cost },
    bound: 0,
    seconds: 0,
    items: [
      item('early', `${date}T22:00`, `${date}T23:00`),
      item('late', `${next}T03:30`, `${next}T04:30`),
      { kind: 'event', id: 'tea', room: 'a', start: `${next}T05:00`, end: `${next}T05:30`, people: ['ida'] },
    ],
    calls: [{ person: 'ida', date, arrive: `${date}T22:00`, ready: `${date}T22:00`, release: `${next}T05:30`, working: 150, waiting }],
    unplaced: [],
    odds: { musts: 1, days: [] },
    conflicts: [],
  };
  return { file, plan };
}

describe('a night over a clock change', () => {
  it.each([
    ['an ordinary night', '2027-03-20', 450],
    ['the night that is an hour shorter', '2027-03-27', 390],
    ['the night that is an hour longer', '2027-10-30', 510],
  ])('%s is reckoned in elapsed minutes and is one call of the date on which it began', (_name, date, minutes) => {
    const { file, plan } = night(date, minutes);
    expect(checkPlan(file, plan)).toEqual({ violations: [], cost: plan.cost });
    file.people[0]!.limits = { day: minutes - 1 };
    expect(checkPlan(file, plan).violations.map(({ rule }) => rule)).toEqual(['limits']);
  });

  it('has no half past two in spring', () => {
    const { file, plan } = night('2027-03-27', 390);
    plan.items[1]!.start = '2027-03-28T02:30';
    expect(checkPlan(file, plan).violations.map(({ rule }) => rule)).toContain('times');
  });
});

describe('what a person waits', () => {
  it('leaves out a gap that is time off, and judges each stay on its own', () => {
    const the = fresh();
    the.file.people[2]!.away = 120;
    callOf(the, 'dov', TUESDAY).waiting = 0;
    the.plan.cost = { ...the.plan.cost, waiting: 0, total: 1405 };
    expect(checkPlan(the.file, the.plan).violations).toEqual([]);
    the.file.people[2]!.away = 121;
    expect(checkPlan(the.file, the.plan).violations.map(({ rule }) => rule)).toContain('calls');
  });

  it('counts no more rest than the length of the stay earns', () => {
    const the = fresh();
    the.file.production.rules = { meal: 30 };
    callOf(the, 'dov', TUESDAY).waiting = 90;
    callOf(the, 'jo', TUESDAY).waiting = 15;
    the.plan.cost = { ...the.plan.cost, waiting: 105, total: 1510 };
    expect(checkPlan(the.file, the.plan).violations).toEqual([]);
  });

  it('counts a meal only for those whom it names, where it names any', () => {
    const the = fresh();
    itemOf(the, 'meal', `a ${TUESDAY}T12:30`).people = ['jo'];
    callOf(the, 'dov', TUESDAY).waiting = 120;
    the.plan.cost = { ...the.plan.cost, waiting: 120, total: 1525 };
    expect(checkPlan(the.file, the.plan).violations).toEqual([]);
  });

  it('weighs minutes by the fee of the person and the weight of the production', () => {
    const the = fresh();
    the.file.people[2]!.fee = { waiting: 0.5 };
    the.file.production.weights = { waiting: 3 };
    the.plan.cost = { ...the.plan.cost, waiting: 112.5, total: 1517.5 };
    expect(checkPlan(the.file, the.plan).violations).toEqual([]);
  });
});

describe('a pass longer than work may go on', () => {
  const long = (): Case => {
    const the = fresh();
    the.file.production.rules = { breakAfter: 60 };
    return the;
  };

  it('excuses itself from the break, but not what follows it without a pause', () => {
    const the = long();
    const late = checkPlan(the.file, the.plan).violations.filter(({ rule }) => rule === 'breaks');
    expect(late.map(({ says }) => says).filter((says) => says.includes('s1-basics'))).toEqual([]);
    expect(late.some(({ says }) => says.includes(`reserve in a at ${MONDAY}T12:50`))).toBe(true);
  });
});
