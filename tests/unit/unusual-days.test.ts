import { describe, expect, it } from 'vitest';
import type { MadePlan } from '../../shared/contracts/plan';
import { readProductionFile } from '../../shared/file/read';
import { planProduction } from '../../shared/planner/plan';
import { checkPlan } from '../../shared/solver/check/check';
import { zoneClock } from '../../shared/time/wall';

/** A night or day of work with two players and three passes of an hour, in a zone and between two wall times. */
function session(zone: string, from: string, to: string, more = ''): string {
  return `redpoll: 1
production: { code: NIGHT, title: Night Ferry, timezone: ${zone} }
rules: { wrap: 15, reserve: 0, listen: 30, breakAfter: 0 }
rooms:
  - { id: hall, open: [{ from: ${from}, to: ${to} }] }
people:
  - { id: una, name: אוּנה 🎻, windows: [{ from: ${from}, to: ${to} }] }
  - { id: teo, name: 船の歌 }
passes:
  - { id: one, room: hall, people: [una, teo], minutes: 60 }
  - { id: two, room: hall, people: [una], minutes: 60, after: [{ pass: one }] }
  - { id: three, room: hall, people: [teo], minutes: 60, after: [{ pass: two }] }
${more}`;
}

function planOf(text: string): MadePlan {
  const read = readProductionFile(text);
  if (!read.ok) expect.fail(JSON.stringify(read.faults));
  const plan = planProduction(read.file, { seed: 1, iterations: 300, stop: () => false });
  if (plan.status !== 'optimal' && plan.status !== 'feasible') expect.fail(`${plan.status}: ${JSON.stringify(plan.conflicts)}`);
  expect(checkPlan(read.file, plan).violations).toEqual([]);
  return plan;
}
const passesOf = (plan: MadePlan) => plan.items.filter((item) => item.kind === 'pass');
const minutesBetween = (zone: string, from: string, to: string) => {
  const clock = zoneClock(zone);
  return Number(clock.minuteOf(to)) - Number(clock.minuteOf(from));
};

describe('days that are not like others', () => {
  it('a leap day is a day of work', () => {
    const plan = planOf(session('Europe/Lisbon', '2028-02-29T10:00', '2028-02-29T18:00'));
    expect(plan.calls.map((call) => call.date)).toEqual(['2028-02-29', '2028-02-29']);
  });

  it('a night past midnight is one room-day and carries the date on which it opens', () => {
    const plan = planOf(session('Europe/Lisbon', '2027-03-08T22:00', '2027-03-09T04:00', 'events: []\n'));
    expect(plan.cost.day).toBe(120);
    expect(plan.calls.map((call) => call.date)).toEqual(['2027-03-08', '2027-03-08']);
    expect(plan.items.some((item) => item.start.startsWith('2027-03-09'))).toBe(true);
  });

  it('a pin on the day means the day on which the night began', () => {
    const text = session('Europe/Lisbon', '2027-03-08T22:00', '2027-03-09T04:00').replace(
      'minutes: 60, after: [{ pass: two }]',
      'minutes: 60, after: [{ pass: two }], pin: { day: 2027-03-08 }',
    );
    expect(passesOf(planOf(text))).toHaveLength(3);
  });

  it('the night of the spring change has an hour less: three hours of passes no longer fit', () => {
    const fits = session('Europe/Lisbon', '2027-03-20T22:45', '2027-03-21T02:00');
    expect(passesOf(planOf(fits))).toHaveLength(3);
    const text = session('Europe/Lisbon', '2027-03-27T22:45', '2027-03-28T02:00');
    const read = readProductionFile(text);
    if (!read.ok) expect.fail(JSON.stringify(read.faults));
    expect(planProduction(read.file, { seed: 1, iterations: 300, stop: () => false }).status).not.toMatch(/optimal|feasible/);
  });

  it('the passes of that night are as long as asked, whatever the clock shows', () => {
    const plan = planOf(session('Europe/Lisbon', '2027-03-27T22:00', '2027-03-28T06:00'));
    for (const item of passesOf(plan)) expect(minutesBetween('Europe/Lisbon', item.start, item.end)).toBe(60);
  });

  it('the night of the autumn change has an hour more: half past midnight to two is two hours and a half', () => {
    const text = session('Europe/Lisbon', '2027-10-30T22:00', '2027-10-31T06:00').replace(
      'people: [una], minutes: 60, after: [{ pass: one }]',
      'people: [una], minutes: 150, after: [{ pass: one }], pin: { at: 2027-10-31T00:30 }',
    );
    const [, two] = passesOf(planOf(text));
    expect([two?.start, two?.end]).toEqual(['2027-10-31T00:30', '2027-10-31T02:00']);
    expect(minutesBetween('Europe/Lisbon', '2027-10-31T00:30', '2027-10-31T02:00')).toBe(150);
  });

  it('no plan uses the clock times of the hour that comes a second time, because they would be read as the first', () => {
    const plan = planOf(session('Europe/Lisbon', '2027-10-30T23:30', '2027-10-31T08:00'));
    for (const item of passesOf(plan)) expect(minutesBetween('Europe/Lisbon', item.start, item.end)).toBe(60);
  });

  it('half an hour is skipped at Lord Howe Island, and Nepal keeps three quarters', () => {
    for (const zone of ['Australia/Lord_Howe', 'Asia/Kathmandu']) {
      const plan = planOf(session(zone, '2027-10-02T22:00', '2027-10-03T06:00'));
      for (const item of passesOf(plan)) expect(minutesBetween(zone, item.start, item.end)).toBe(60);
    }
  });

  it('people keep their names in every script through file and plan', () => {
    const plan = planOf(session('Asia/Tokyo', '2027-03-08T10:00', '2027-03-08T18:00'));
    expect(new Set(plan.calls.map((call) => call.person))).toEqual(new Set(['una', 'teo']));
  });
});
