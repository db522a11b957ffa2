import { describe, expect, it } from 'vitest';
import type { ProductionFile } from '../../shared/contracts/resources';
import { planProduction } from '../../shared/planner/plan';
import { toProblem } from '../../shared/planner/problem';
import { lowerBound } from '../../shared/solver/bound/bound';
import { leastBins } from '../../shared/solver/packing';
import { leastPauses, mostOfDay, mostOfRoomDay } from '../../shared/solver/pauses';
import { aPass, emptyProduction, hours } from '../factories/bare-production';

const bound = (file: ProductionFile) => lowerBound(toProblem(file));
const DAY = 120;
const CALL = 15;

describe('the bound of a plan’s cost', () => {
  it('is nothing where nothing is to be done', () => {
    expect(bound(emptyProduction())).toBe(0);
    expect(bound(emptyProduction([aPass('x', { priority: 'nice', minutes: 900 })]))).toBe(500);
  });
  it('lets a plan choose between placing a pass and paying for it', () => {
    const nice = aPass('x', { priority: 'nice', people: ['mara', 'tobin', 'lys', 'oka'] });
    expect(bound(emptyProduction([nice]))).toBe(DAY + 4 * CALL);
    const dear = emptyProduction([nice]);
    dear.production.weights = { nice: 100 };
    expect(bound(dear)).toBe(100);
    const both = emptyProduction([nice, aPass('y', { priority: 'should', people: ['mara'] })]);
    both.production.weights = { nice: 30 };
    expect(bound(both)).toBe(DAY + CALL + 30);
  });
  it('counts a room-day for each room and a call for each person', () => {
    const file = emptyProduction([aPass('x', { people: ['mara', 'tobin'] }), aPass('y', { room: 'b', people: ['tobin'] })]);
    expect(bound(file)).toBe(2 * DAY + 2 * CALL);
  });
  it('counts passes that a must needs as musts', () => {
    const file = emptyProduction([aPass('guide', { priority: 'nice', room: 'b' }), aPass('lead', { after: [{ pass: 'guide' }] })]);
    expect(bound(file)).toBe(2 * DAY);
  });
  it('counts as many days as passes pinned apart, as their minutes fill, and as too long passes take', () => {
    const pinned = ['08', '09', '10'].map((day) => aPass(`p${day}`, { people: ['mara'], pin: { day: `2027-03-${day}` } }));
    expect(bound(emptyProduction(pinned))).toBe(3 * DAY + 3 * CALL);
    const full = [300, 300, 100].map((minutes, i) => aPass(`x${i}`, { minutes, people: ['mara'] }));
    expect(bound(emptyProduction(full))).toBe(2 * DAY + 2 * CALL);
    const long = [350, 350].map((minutes, i) => aPass(`x${i}`, { minutes }));
    expect(bound(emptyProduction(long))).toBe(2 * DAY);
  });
  it('counts dates by the voice and by the longest day', () => {
    const passes = [30, 30, 30].map((voice, i) => aPass(`x${i}`, { minutes: 200, people: ['mara'], voice: { mara: voice } }));
    const file = emptyProduction(passes);
    file.people[0]!.limits = { voice: 40 };
    expect(bound(file)).toBe(DAY + 3 * CALL);
    file.people[0]!.limits = { day: 400 };
    expect(bound(file)).toBe(DAY + 2 * CALL);
  });
  it('counts calls for events, and none twice', () => {
    const events = [{ id: 'tea', people: ['mara'], ...hours('08', '12:00', '12:30') }];
    expect(bound(emptyProduction([], { events }))).toBe(CALL);
    expect(bound(emptyProduction([aPass('x', { people: ['mara'] })], { events }))).toBe(DAY + CALL);
    const later = aPass('x', { people: ['mara'], pin: { day: '2027-03-09' } });
    expect(bound(emptyProduction([later], { events }))).toBe(DAY + 2 * CALL);
  });
  it('counts the rig of the first set-up and the shortest way through the others', () => {
    const setups = [
      { id: 'kit', rig: 90 },
      { id: 'brushes', rig: 60 },
    ];
    const changeovers = [
      { from: 'kit', to: 'brushes', minutes: 45 },
      { from: 'brushes', to: 'kit', minutes: 80 },
    ];
    const passes = [aPass('x', { setup: 'kit' }), aPass('y', { setup: 'brushes' })];
    expect(bound(emptyProduction(passes, { setups, changeovers }))).toBe(DAY + 90 + 45);
  });
  it('changes back where the order of passes asks for it', () => {
    const setups = ['kit', 'brushes'].map((id) => ({ id, rig: 60 }));
    const changeovers = [
      { from: 'kit', to: 'brushes', minutes: 45 },
      { from: 'brushes', to: 'kit', minutes: 30 },
    ];
    const passes = [
      aPass('x', { setup: 'kit' }),
      aPass('y', { setup: 'brushes', after: [{ pass: 'x' }] }),
      aPass('elsewhere', { room: 'b', after: [{ pass: 'y' }] }),
      aPass('z', { setup: 'kit', after: [{ pass: 'elsewhere' }] }),
    ];
    expect(bound(emptyProduction(passes, { setups, changeovers }))).toBe(2 * DAY + 60 + 45 + 30);
  });
  it('rigs again each day in a room that is cleared', () => {
    const passes = ['08', '09'].map((day) => aPass(`p${day}`, { setup: 'kit', pin: { day: `2027-03-${day}` } }));
    const file = emptyProduction(passes, { setups: [{ id: 'kit', rig: 90 }] });
    expect(bound(file)).toBe(2 * DAY + 90);
    file.rooms[0]!.standing = false;
    expect(bound(file)).toBe(2 * (DAY + 90));
  });
  it('weighs overtime against another day', () => {
    const file = emptyProduction([aPass('x', { minutes: 200 }), aPass('y', { minutes: 200 })]);
    file.rooms[0]!.standard = 360;
    expect(bound(file)).toBe(DAY + 2 * 40);
    file.rooms[0]!.standard = 300;
    expect(bound(file)).toBe(2 * DAY);
  });
  it('counts minutes in windows that are only a maybe', () => {
    const file = emptyProduction([aPass('x', { people: ['lys'] })]);
    file.people[2]!.windows = [hours('08', '12:00', '12:40'), { ...hours('08', '12:40', '20:00'), sure: false }];
    expect(bound(file)).toBe(DAY + CALL + 2 * 20);
  });
  it('adds the price of what cannot be placed', () => {
    const file = emptyProduction([
      aPass('epic', { priority: 'should', minutes: 900 }),
      aPass('on-top', { priority: 'nice', after: [{ pass: 'epic' }] }),
      aPass('left', { priority: 'nice', leftOut: true }),
    ]);
    expect(bound(file)).toBe(2000 + 500 + 500);
  });
  it('is reached by a plan where nothing has to be weighed', () => {
    const file = emptyProduction([aPass('x', { people: ['mara'] }), aPass('y', { people: ['mara'] })]);
    const outcome = planProduction(file, { seed: 1, iterations: 50, stop: () => false });
    expect(outcome).toMatchObject({ status: 'optimal', bound: DAY + CALL, cost: { total: DAY + CALL } });
  });
});

describe('what the bounds rest on', () => {
  it('shares pieces out over the largest capacities, none of them split', () => {
    expect(leastBins([], [100])).toBe(0);
    expect(leastBins([60, 60], [100, 100])).toBe(2);
    expect(leastBins([50, 50], [100, 30])).toBe(1);
    expect(leastBins([60, 60, 60], [100, 100])).toBe(Infinity);
    expect(leastBins([40], [30, 30])).toBe(Infinity);
    expect(leastBins([50], [60, 60], 20)).toBe(2);
  });
  it('puts pauses between stretches of work', () => {
    const rules = { meal: 45, mealAfter: 300, break: 15, breakAfter: 120 };
    expect(leastPauses(rules, 120, 60, 1)).toBe(0);
    expect(leastPauses(rules, 121, 60, 1)).toBe(15);
    expect(leastPauses(rules, 301, 60, 1)).toBe(45 + 15);
    expect(leastPauses(rules, 301, 60, 3)).toBe(0);
    expect(leastPauses(rules, 200, 200, 1)).toBe(0);
    expect(leastPauses({ ...rules, meal: 0, breakAfter: 0 }, 2000, 60, 1)).toBe(0);
  });
  it('finds the most work of a day', () => {
    const rules = { meal: 45, mealAfter: 300, break: 15, breakAfter: 120 };
    expect([300, 345, 400, 645, 800].map((day) => mostOfDay(rules, day))).toEqual([300, 300, 355, 600, 710]);
    expect(mostOfRoomDay({ ...rules, breakAfter: 0 }, 600, 0, 60)).toBe(555);
    expect(mostOfRoomDay({ ...rules, breakAfter: 0 }, 600, 100, 60)).toBe(500);
    expect(mostOfRoomDay(rules, 600, 0, 60)).toBe(600 - 45 - 3 * 15);
  });
});
