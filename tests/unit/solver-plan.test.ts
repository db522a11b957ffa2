import { describe, expect, it } from 'vitest';
import type { MadePlan, PlanItem } from '../../shared/contracts/plan';
import type { Pass, ProductionFile } from '../../shared/contracts/resources';
import { planProduction, type PlanProgress } from '../../shared/planner/plan';
import { checkPlan } from '../../shared/solver/check/check';
import { aPass, emptyProduction, hours } from '../factories/bare-production';

/** Plans with the given rules on top of none, checks the plan, and gives it back. */
function planned(file: ProductionFile, rules: ProductionFile['production']['rules'] = {}, iterations = 600): MadePlan {
  file.production.rules = { ...file.production.rules, ...rules };
  const outcome = planProduction(file, { seed: 1, iterations, stop: () => false });
  if (outcome.cost === null) throw new Error(`no plan: ${outcome.status} ${outcome.conflicts.map(({ says }) => says).join(' ')}`);
  expect(checkPlan(file, outcome).violations).toEqual([]);
  return outcome;
}

const clock = (wall: string) => wall.slice(8).replace('T', ' ');
const line = (item: PlanItem) => `${clock(item.start)}–${item.end.slice(11)} ${item.kind} ${item.id ?? item.setup ?? ''}`.trim();
const passItem = (plan: MadePlan, id: string) => plan.items.find((item) => item.id === id)!;
const oneRoom = (passes: Pass[], more: Partial<ProductionFile> = {}) => {
  const file = emptyProduction(passes, more);
  file.rooms = [file.rooms[0]!];
  return file;
};

describe('a plan', () => {
  it('of nothing is optimal and costs nothing', () => {
    expect(planned(emptyProduction([]))).toMatchObject({ status: 'optimal', items: [], calls: [], cost: { total: 0 } });
    expect(planned({ ...emptyProduction([]), people: [], rooms: [] })).toMatchObject({ status: 'optimal' });
  });

  it('of one pass with nobody in it costs its day', () => {
    const plan = planned(oneRoom([aPass('x')]));
    expect(plan.cost).toMatchObject({ total: 120, day: 120, call: 0 });
    expect(plan.status).toBe('optimal');
  });

  it('rounds lengths up to the step and starts on it', () => {
    const plan = planned(oneRoom([aPass('x', { minutes: [20, 37, 90] }), aPass('y', { minutes: 8 })]), { step: 15 });
    expect(plan.items.map(({ start, end }) => [start.slice(14), end.slice(14)])).toEqual(
      plan.items.map(() => [expect.stringMatching(/^(00|15|30|45)$/), expect.stringMatching(/^(00|15|30|45)$/)]),
    );
    expect(passItem(plan, 'x')).toMatchObject({ start: '2027-03-08T10:00', end: '2027-03-08T10:45' });
  });

  it('rigs once, changes by direction, and calls people early who must be ready', () => {
    const file = oneRoom([aPass('k', { people: ['tobin'], setup: 'kit' }), aPass('b', { people: ['tobin'], setup: 'brushes' })], {
      setups: [
        { id: 'kit', rig: 90, ready: { tobin: 30 } },
        { id: 'brushes', rig: 240 },
      ],
      changeovers: [
        { from: 'kit', to: 'brushes', minutes: 20 },
        { from: 'brushes', to: 'kit', minutes: 200 },
      ],
    });
    const plan = planned(file);
    expect(plan.items.map(line)).toEqual([
      '08 10:00–11:30 rig kit',
      '08 11:30–12:30 pass k',
      '08 12:30–12:50 changeover brushes',
      '08 12:50–13:50 pass b',
    ]);
    expect(plan.calls).toEqual([
      {
        person: 'tobin',
        date: '2027-03-08',
        arrive: '2027-03-08T11:00',
        ready: '2027-03-08T11:30',
        release: '2027-03-08T13:50',
        working: 150,
        waiting: 20,
      },
    ]);
  });

  it('rigs again each day where nothing stands overnight, and only once where it does', () => {
    const passes = [1, 2, 3].map((day) => aPass(`d${day}`, { setup: 'kit', pin: { day: `2027-03-${['08', '09', '10'][day - 1]}` } }));
    const file = oneRoom(passes, { setups: [{ id: 'kit', rig: 60 }] });
    const rigs = (plan: MadePlan) => plan.items.filter(({ kind }) => kind === 'rig').length;
    expect(rigs(planned(structuredClone(file)))).toBe(1);
    file.rooms[0]!.standing = false;
    expect(rigs(planned(file))).toBe(3);
  });

  it('listens first on a later date, and to a set-up that is kept before it is taken down', () => {
    const file = oneRoom([aPass('k', { setup: 'kit' }), aPass('b', { setup: 'bare', after: [{ pass: 'k' }] })], {
      setups: [{ id: 'kit', keepUntil: 'approved' }, { id: 'bare' }],
      changeovers: [{ from: 'kit', to: 'bare', minutes: 30 }],
    });
    expect(planned(file, { listen: 25 }).items.map(line)).toEqual([
      '08 10:00–11:00 pass k',
      '08 11:00–11:25 listen',
      '08 11:25–11:55 changeover bare',
      '08 11:55–12:55 pass b',
    ]);
  });

  it('waits for approval, also by an event', () => {
    const file = oneRoom([aPass('k'), aPass('b', { after: [{ pass: 'k', kind: 'approved', lag: 30 }] })], {
      events: [{ id: 'playback', kind: 'listen', ...hours('08', '12:00', '12:30') }],
    });
    const plan = planned(file);
    expect(passItem(plan, 'b').start >= '2027-03-08T12:30').toBe(true);
    expect(plan.items.some(({ kind }) => kind === 'listen')).toBe(false);
  });

  it('gives the crew meals and breaks, ends with the wrap and holds the reserve', () => {
    const passes = ['a', 'b', 'c', 'd', 'e', 'f'].map((id) => aPass(id, { minutes: 70, people: ['mara'] }));
    const plan = planned(oneRoom(passes), { meal: 45, mealAfter: 300, break: 15, breakAfter: 120, wrap: 45, reserve: 0.15 });
    const kinds = plan.items.map(({ kind }) => kind);
    expect(kinds.at(-1)).toBe('wrap');
    expect(kinds).toContain('meal');
    expect(kinds).toContain('break');
    const reserve = plan.items.filter(({ kind }) => kind === 'reserve').map(({ start, end }) => minutes(start, end));
    expect(reserve.reduce((sum, length) => sum + length, 0)).toBe(60);
  });

  it('starts two rooms together, and neither where one cannot be', () => {
    const file = emptyProduction([
      aPass('left', { together: ['right'], people: ['mara'], priority: 'should' }),
      aPass('right', { room: 'b', people: ['lys'], priority: 'should' }),
    ]);
    file.people[2]!.windows = [hours('09', '13:00', '14:30')];
    const plan = planned(structuredClone(file));
    expect(passItem(plan, 'left').start).toBe(passItem(plan, 'right').start);
    file.people[2]!.windows = [hours('09', '13:00', '13:30')];
    expect(planned(file).unplaced).toEqual(['left', 'right']);
  });

  it('brings a scarce guest early into the window and everybody else around it', () => {
    const file = oneRoom([aPass('band', { people: ['mara', 'tobin'], minutes: 120 }), aPass('guest', { people: ['mara', 'lys'] })]);
    file.people[2]!.windows = [hours('08', '12:00', '14:00')];
    const plan = planned(file);
    expect(plan.cost.waiting).toBe(0);
    expect(passItem(plan, 'guest').start).toBe('2027-03-08T12:00');
  });

  it('leaves out what is dearer than leaving it out, and what was left out by hand', () => {
    const passes = [
      aPass('must', { pin: { day: '2027-03-08' } }),
      aPass('nice', { priority: 'nice', pin: { day: '2027-03-09' } }),
      aPass('gone', { leftOut: true }),
    ];
    const file = oneRoom(passes);
    file.production.weights = { nice: 100 };
    const plan = planned(file);
    expect(plan.unplaced).toEqual(['nice', 'gone']);
    expect(plan.cost).toMatchObject({ unplaced: 100, day: 120 });
  });
});

describe('planning', () => {
  it('tells better plans as they come, each whole and valid', () => {
    const passes = Array.from({ length: 10 }, (_, i) =>
      aPass(`x${i}`, { people: i % 2 ? ['mara', 'lys'] : ['tobin', i % 3 ? 'oka' : 'lys'], setup: i % 2 ? 'kit' : 'bare' }),
    );
    const file = oneRoom(passes, {
      setups: [
        { id: 'kit', rig: 60 },
        { id: 'bare', rig: 10 },
      ],
    });
    file.production.rules = { ...file.production.rules, changeover: 25 };
    const told: PlanProgress[] = [];
    const outcome = planProduction(file, { seed: 3, iterations: 800, stop: () => false, onProgress: (progress) => told.push(progress) });
    expect(told.length).toBeGreaterThan(1);
    const totals = told.map((progress) => progress.outcome.cost.total);
    expect([...totals].sort((a, b) => b - a)).toEqual(totals);
    for (const progress of told) expect(checkPlan(file, progress.outcome).violations).toEqual([]);
    expect(outcome.cost!.total).toBeLessThanOrEqual(totals.at(-1)!);
  });

  it('leaves everything where a plan before had it, but for what a new pin moves', () => {
    const passes = Array.from({ length: 12 }, (_, i) => aPass(`x${i}`, { people: [['mara', 'tobin', 'lys', 'oka'][i % 4]!], minutes: 45 }));
    const before = planned(oneRoom(structuredClone(passes)));
    passes[5]!.pin = { day: '2027-03-10' };
    const file = oneRoom(passes);
    const after = planProduction(file, { seed: 9, iterations: 6000, stop: () => false, start: before.items });
    if (after.cost === null) throw new Error(after.status);
    expect(checkPlan(file, after).violations).toEqual([]);
    const moved = passes.filter(({ id }) => passItem(after, id).start !== passItem(before, id).start);
    expect(moved.map(({ id }) => id)).toContain('x5');
    expect(moved.length).toBeLessThanOrEqual(4);
  });

  it('has a plan even when it is told to stop at once', () => {
    const file = oneRoom(Array.from({ length: 12 }, (_, i) => aPass(`x${i}`, { people: ['mara'] })));
    const outcome = planProduction(file, { seed: 1, stop: () => true });
    expect(outcome.status).not.toBe('unsolved');
  });

  it('refuses what cannot be, with the facts that clash', () => {
    const file = oneRoom([aPass('x', { people: ['lys'] })]);
    file.people[2]!.windows = [hours('09', '21:00', '22:30')];
    const outcome = planProduction(file, { seed: 1, iterations: 10, stop: () => false });
    expect(outcome.status).toBe('impossible');
    expect(outcome.conflicts[0]!.facts).toContain('people.lys.windows');
  });

  it('of five hundred passes has a first plan soon and never hangs', () => {
    const days = Array.from({ length: 25 }, (_, i) => hours(String(i + 1).padStart(2, '0'), '10:00', '20:00'));
    const passes = Array.from({ length: 500 }, (_, i) =>
      aPass(`x${i}`, { room: i % 3 ? 'a' : 'b', minutes: 25, people: [['mara', 'tobin', 'lys', 'oka'][i % 4]!], priority: 'should' }),
    );
    const file = emptyProduction(passes);
    for (const room of file.rooms) room.open = days;
    const outcome = planProduction(file, { seed: 1, iterations: 30, stop: () => false });
    if (outcome.cost === null) throw new Error(outcome.status);
    expect(checkPlan(file, outcome).violations).toEqual([]);
    expect(outcome.unplaced).toEqual([]);
  });
});

function minutes(start: string, end: string): number {
  return (Date.parse(`${end}Z`) - Date.parse(`${start}Z`)) / 60_000;
}
