import { describe, expect, it } from 'vitest';
import { callChanges } from '../../shared/planner/callChanges';
import { planDays } from '../../shared/planner/day';
import { planSummary } from '../../shared/planner/summary';
import { sampleFile, samplePlan } from '../factories/plan-sample';

describe('a plan in a few figures', () => {
  it('counts musts, waiting with whose is worst, and changeovers without rigs', () => {
    const plan = samplePlan();
    plan.calls[1]!.waiting = 20;
    plan.calls[4]!.waiting = 55;
    const summary = planSummary(sampleFile(), plan);
    expect(summary.musts).toEqual({ placed: 5, all: 5 });
    expect(summary.waiting).toEqual({ total: 75, worst: { person: 'Mara', date: '2027-03-09', minutes: 55 } });
    expect(summary.changeovers).toBe(45);
    expect(summary.odds).toBe(0.83);
  });

  it('names what is left out, and tells what was left out by hand from what found no room', () => {
    const file = sampleFile();
    file.passes!.find(({ id }) => id === 's3-solo')!.leftOut = true;
    const plan = samplePlan();
    plan.items = plan.items.filter(({ id }) => id !== 's3-solo');
    plan.unplaced = ['s3-solo', 's2-shaker'];
    const summary = planSummary(file, plan);
    expect(summary.leftOut).toEqual([
      { pass: 's3-solo', words: 'S3 trumpet solo', byHand: true },
      { pass: 's2-shaker', words: 'S2 shaker', byHand: false },
    ]);
    expect(summary.warnings[0]).toEqual({ word: '1 left out', says: 'S2 shaker' });
    // A must that was left out by hand is no missing must.
    expect(summary.musts).toEqual({ placed: 4, all: 4 });
  });

  it('looks at who leaves soon after their last pass while the room stays open', () => {
    const plan = samplePlan();
    // Lys can stay until 17:00; her last pass ends at 16:00, and an hour is enough.
    expect(planSummary(sampleFile(), plan).warnings.map(({ word }) => word)).toEqual(['1 left out']);
    plan.calls.find(({ person }) => person === 'lys')!.release = '2027-03-09T16:40';
    expect(planSummary(sampleFile(), plan).warnings).toContainEqual({ word: 'reserve thin', says: 'Tue: 20 min before Lys leaves' });
  });

  it('looks at the day that one time in ten runs past its hours', () => {
    const plan = samplePlan();
    plan.odds.days = [
      { room: 'a', date: '2027-03-08', p50: '17:05', p90: '19:20' },
      { room: 'a', date: '2027-03-09', p50: '19:00', p90: '20:40' },
    ];
    expect(planSummary(sampleFile(), plan).warnings).toContainEqual({
      word: 'may run over',
      says: 'Tue: 1 in 10 ends past 20:40',
    });
  });

  it('takes an end before the room opens for one after midnight', () => {
    const plan = samplePlan();
    plan.odds.days = [{ room: 'a', date: '2027-03-09', p50: '19:00', p90: '00:20' }];
    expect(planSummary(sampleFile(), plan).warnings).toContainEqual({
      word: 'may run over',
      says: 'Tue: 1 in 10 ends past 00:20',
    });
  });
});

describe('the days of a plan', () => {
  it('says hours, loud hours and who cannot stay', () => {
    const [monday, tuesday] = planDays(sampleFile(), samplePlan());
    expect(monday!.title).toBe('Mon 8 March');
    expect(monday!.rooms).toMatchObject([{ name: 'Room A', open: '10:00–20:00', loudUntil: '19:00', used: true }]);
    expect(tuesday!.rooms.map(({ name, used }) => [name, used])).toEqual([
      ['Room A', true],
      ['Room B', true],
    ]);
    expect(tuesday!.notes).toEqual(['Lys 13:00–17:00']);
  });

  it('says beside the day what calls nobody before the rooms open or where nothing else goes on, and draws the day without it', () => {
    const file = sampleFile();
    file.events = [{ id: 'tuner', name: 'piano tuner', kind: 'tuner', room: 'a', from: '2027-03-08T08:00', to: '2027-03-08T09:30' }];
    const plan = samplePlan();
    plan.items = [{ kind: 'event', id: 'tuner', room: 'a', start: '2027-03-08T08:00', end: '2027-03-08T09:30', people: [] }, ...plan.items];
    const [monday] = planDays(file, plan);
    expect(monday!.notes).toEqual(['piano tuner 08:00–09:30']);
    expect(monday!.hours[0]!.label).toBe('10:00');
    expect(monday!.items.map(({ beside }) => beside).filter(Boolean)).toHaveLength(1);
    // Somebody who is called for it makes it part of the day.
    plan.items[0]!.people = ['petra'];
    expect(planDays(file, plan)[0]!.hours[0]!.label).toBe('08:00');
  });

  it('shows the same stretch of the clock on every day', () => {
    const days = planDays(sampleFile(), samplePlan());
    expect(days.map(({ hours }) => [hours[0]!.label, hours.at(-1)!.label])).toEqual([
      ['10:00', '20:00'],
      ['10:00', '20:00'],
    ]);
  });

  it('puts what happens past midnight on the day on which the room opened, and keeps its length across a clock change', () => {
    const file = sampleFile();
    // The clocks of Lisbon go forward at 01:00 on 28 March 2027 (IANA time zone data).
    file.rooms = [{ id: 'a', name: 'Room A', open: [{ from: '2027-03-27T20:00', to: '2027-03-28T04:00' }] }];
    const plan = samplePlan();
    plan.items = [{ kind: 'pass', id: 's1-basics', room: 'a', start: '2027-03-28T00:30', end: '2027-03-28T02:45', people: ['mara'] }];
    plan.calls = [];
    const [night, ...others] = planDays(file, plan);
    expect(others).toEqual([]);
    expect(night!.date).toBe('2027-03-27');
    expect(night!.items[0]!.to - night!.items[0]!.from).toBe(75);
    expect(night!.hours.map(({ label }) => label)).toEqual(expect.arrayContaining(['23:00', '00:00', '02:00', '03:00']));
    expect(night!.hours.map(({ label }) => label)).not.toContain('01:00');
  });
});

describe('calls compared with those published before', () => {
  it('tells new, moved, cancelled and unchanged calls apart', () => {
    const [mara, tobin, dov] = samplePlan().calls;
    const before = [mara!, { ...tobin!, arrive: '2027-03-08T10:00' }, dov!];
    const after = [{ ...mara!, waiting: 40 }, tobin!, { ...dov!, date: '2027-03-09' }];
    expect(callChanges(before, after).map(({ date, person, kind }) => [date, person, kind])).toEqual([
      ['2027-03-08', 'dov', 'cancelled'],
      ['2027-03-08', 'mara', 'same'],
      ['2027-03-08', 'tobin', 'moved'],
      ['2027-03-09', 'dov', 'new'],
    ]);
    expect(callChanges(null, [mara!])).toEqual([{ person: 'mara', date: '2027-03-08', kind: 'new', before: null, after: mara }]);
  });
});
