import { describe, expect, it } from 'vitest';
import { checkPlan, type Rule } from '../../shared/solver/check/check';
import { callOf, drop, fresh, itemOf, MONDAY, move, open, passOf, TUESDAY, type Case } from '../factories/spoil-plan';

/** Each of these spoils one thing; the rule beside it must be among the broken ones. */
const spoilt: [string, Rule, (the: Case) => void][] = [
  ['a date that does not exist', 'times', (the) => (itemOf(the, 'wrap', `a ${MONDAY}T12:55`).end = '2027-02-30T13:40')],
  ['a time without its minutes', 'times', (the) => (itemOf(the, 'wrap', `a ${MONDAY}T12:55`).end = `${MONDAY}T13`)],
  ['an item that ends before it starts', 'times', (the) => move(itemOf(the, 'break', `a ${MONDAY}T11:30`), '11:45', '11:30')],
  ['an item of no length', 'times', (the) => move(itemOf(the, 'break', `a ${MONDAY}T11:30`), '11:30', '11:30')],
  ['a start off the grid', 'grid', (the) => move(itemOf(the, 'wrap', `a ${MONDAY}T12:55`), '12:57', '13:42')],
  ['a length off the grid', 'grid', (the) => move(itemOf(the, 'wrap', `a ${MONDAY}T12:55`), '12:55', '13:42')],
  ['an item after closing', 'hours', (the) => move(itemOf(the, 'wrap', `b ${TUESDAY}T15:30`), '19:45', '20:30')],
  ['an item on a closed day', 'hours', (the) => (the.file.rooms[1]!.open = [open('2027-03-12', '10:00', '20:00')])],
  ['an item in no room', 'rooms', (the) => delete itemOf(the, 'meal', `a ${TUESDAY}T12:30`).room],
  ['an unknown room', 'rooms', (the) => (itemOf(the, 'meal', `a ${TUESDAY}T12:30`).room = 'c')],
  ['an unknown person', 'people', (the) => (itemOf(the, 'meal', `a ${TUESDAY}T12:30`).people = ['nobody'])],
  ['an unknown pass', 'passes', (the) => (itemOf(the, 'pass', 's2-horn').id = 's9-horn')],
  [
    'a pass placed twice',
    'passes',
    (the) => the.plan.items.push({ ...itemOf(the, 'pass', 's2-horn'), start: `${TUESDAY}T17:00`, end: `${TUESDAY}T17:30` }),
  ],
  ['a pass cut short', 'passes', (the) => move(itemOf(the, 'pass', 's1-basics'), '11:45', '12:45')],
  ['a pass in another room', 'passes', (the) => (itemOf(the, 'pass', 's1-organ').room = 'a')],
  ['a pass on another set-up', 'passes', (the) => (itemOf(the, 'pass', 's1-organ').setup = 'brushes')],
  ['a pass without its drummer', 'passes', (the) => (itemOf(the, 'pass', 's1-basics').people = ['mara', 'dov', 'jo'])],
  ['a pass without the operator of the room', 'passes', (the) => (itemOf(the, 'pass', 's2-horn').people = ['lys'])],
  ['a pass with a guest who has no part', 'passes', (the) => itemOf(the, 'pass', 's2-horn').people.push('dov')],
  ['a pass that was left out by hand', 'passes', (the) => (passOf(the, 's2-horn').leftOut = true)],
  ['two things in a room', 'rooms', (the) => move(itemOf(the, 'meal', `a ${TUESDAY}T12:30`), '12:25', '13:15')],
  [
    'work during an event in the room',
    'rooms',
    (the) => {
      the.file.events[0]!.from = `${MONDAY}T09:00`;
      the.file.events[0]!.to = `${MONDAY}T10:10`;
    },
  ],
  [
    'a person in two passes',
    'people',
    (the) => {
      passOf(the, 's1-answer').people!.push('lys');
      itemOf(the, 'pass', 's1-answer').people.push('lys');
    },
  ],
  [
    'a person at an event and in a pass',
    'people',
    (the) => {
      the.file.events[2]!.from = `${TUESDAY}T12:00`;
    },
  ],
  ['a wrap that names somebody who plays', 'people', (the) => (itemOf(the, 'wrap', `a ${TUESDAY}T13:55`).people = ['mara'])],
  [
    'getting ready while playing elsewhere',
    'people',
    (the) => {
      the.file.setups[2]!.ready = { mara: 20 };
      the.file.events[3] = { id: 'truck', ...open(TUESDAY, '12:30', '12:45'), people: ['mara'] };
    },
  ],
  ['somebody outside their windows', 'windows', (the) => (the.file.people[3]!.windows = [open(TUESDAY, '13:30', '17:00')])],
  [
    'a stay across the gap of two windows',
    'windows',
    (the) =>
      (the.file.people[2]!.windows = [
        open(MONDAY, '10:00', '14:00'),
        open(TUESDAY, '10:00', '13:00'),
        open(TUESDAY, '14:00', '16:00'),
        open('2027-03-10', '10:00', '14:00'),
      ]),
  ],
  ['somebody who is never free', 'windows', (the) => (the.file.people[3]!.windows = [])],
  ['no rig', 'set-ups', (the) => drop(the, itemOf(the, 'rig', `a ${MONDAY}T10:00`))],
  ['a rig too short', 'set-ups', (the) => move(itemOf(the, 'rig', `a ${MONDAY}T10:00`), '10:05', '11:30')],
  ['a rig after the pass', 'set-ups', (the) => move(itemOf(the, 'rig', `a ${MONDAY}T10:00`), '14:00', '15:30')],
  ['a rig of another set-up', 'set-ups', (the) => (itemOf(the, 'rig', `a ${MONDAY}T10:00`).setup = 'brushes')],
  ['a rig of no set-up', 'set-ups', (the) => delete itemOf(the, 'rig', `a ${MONDAY}T10:00`).setup],
  ['a rig in place of a changeover', 'set-ups', (the) => (itemOf(the, 'changeover', `a ${TUESDAY}T10:30`).kind = 'rig')],
  ['a changeover too short', 'set-ups', (the) => (the.file.changeovers[0]!.minutes = 50)],
  [
    'a changeover that no entry gives',
    'set-ups',
    (the) => {
      the.file.changeovers = [];
      the.file.production.rules = { changeover: 60 };
    },
  ],
  [
    'a set-up struck unheard',
    'set-ups',
    (the) => {
      move(itemOf(the, 'changeover', `a ${TUESDAY}T10:30`), '10:00', '10:45');
      move(itemOf(the, 'listen', `a ${TUESDAY}T10:00`), '10:45', '11:15');
    },
  ],
  [
    'a rig of the day before in a room that is cleared',
    'set-ups',
    (the) => {
      the.file.rooms[1]!.open.push(open(MONDAY, '10:00', '20:00'));
      const rig = itemOf(the, 'rig', `b ${TUESDAY}T12:30`);
      rig.start = `${MONDAY}T12:30`;
      rig.end = `${MONDAY}T13:00`;
    },
  ],
  ['a pass before what it comes after', 'order', (the) => (passOf(the, 's1-answer').after = [{ pass: 's1-organ' }])],
  ['a lag not kept', 'order', (the) => (passOf(the, 's1-lead').after = [{ pass: 's1-answer', lag: 5 }])],
  ['a pass on something that is not placed', 'order', (the) => (passOf(the, 's1-lead').after = [{ pass: 's3-hum' }])],
  ['a pass on something not listened to', 'order', (the) => (passOf(the, 's1-lead').after = [{ pass: 's1-answer', kind: 'approved' }])],
  ['a pass before an event it comes after', 'order', (the) => (passOf(the, 's2-horn').after = [{ event: 'supper' }])],
  ['a pass after an event it comes before', 'order', (the) => (passOf(the, 's1-organ').before = [{ event: 'tuner' }])],
  ['a pass after the pass it comes before', 'order', (the) => (passOf(the, 's1-organ').before = [{ pass: 's1-answer' }])],
  ['a pass whose predecessor by `before` is missing', 'order', (the) => (passOf(the, 's3-hum').before = [{ pass: 's1-lead' }])],
  ['two together that start apart', 'order', (the) => (passOf(the, 's1-organ').together = ['s1-lead'])],
  ['one of two together missing', 'order', (the) => (passOf(the, 's1-lead').together = ['s3-hum'])],
  ['one of two together missing, said by the missing one', 'order', (the) => (passOf(the, 's3-hum').together = ['s1-lead'])],
  ['two apart that overlap', 'order', (the) => (passOf(the, 's1-answer').apart = ['s2-horn'])],
  ['another start than the pinned one', 'order', (the) => (passOf(the, 's1-lead').pin = { at: `${TUESDAY}T14:00` })],
  ['another day than the pinned one', 'order', (the) => (passOf(the, 's1-lead').pin = { day: MONDAY })],
  ['a start before the pin', 'order', (the) => (passOf(the, 's1-lead').pin = { notBefore: `${TUESDAY}T13:50` })],
  ['an end after the pin', 'order', (the) => (passOf(the, 's1-lead').pin = { notAfter: `${TUESDAY}T14:25` })],
  ['gear outside its hire', 'gear', (the) => (the.file.gear[0]!.windows = [open(TUESDAY, '12:00', '14:45')])],
  [
    'more gear than there is',
    'gear',
    (the) => {
      passOf(the, 's1-answer').uses = [{ gear: 'valve' }];
      passOf(the, 's2-horn').uses = [{ gear: 'valve' }];
    },
  ],
  ['gear named twice by one pass', 'gear', (the) => (passOf(the, 's2-basics').uses = [{ gear: 'valve' }, { gear: 'valve' }])],
  ['gear that the file does not have', 'gear', (the) => (passOf(the, 's2-basics').uses = [{ gear: 'harp' }])],
  ['more people than the room holds', 'rooms', (the) => (the.file.people[2]!.size = 4)],
  ['one song open in two rooms', 'rooms', (the) => (passOf(the, 's2-horn').song = 's1')],
  [
    'loud work after the loud hours',
    'loud',
    (the) => (the.file.rooms[0]!.loud = [open(MONDAY, '10:00', '12:00'), open(TUESDAY, '10:00', '19:00')]),
  ],
  ['loud work beside quiet work', 'loud', (the) => (passOf(the, 's1-answer').quiet = true)],
  [
    'loud work beside quiet work, heard the other way',
    'loud',
    (the) => {
      passOf(the, 's1-answer').quiet = true;
      the.file.rooms[0]!.hears = [];
      the.file.rooms[1]!.hears = ['a'];
    },
  ],
  ['a room without a meal', 'meals', (the) => (the.file.production.rules = { mealAfter: 120 })],
  [
    'a person without a meal',
    'meals',
    (the) => {
      the.file.production.rules = { mealAfter: 180, meal: 60 };
      passOf(the, 's2-horn').people!.push('dov');
      itemOf(the, 'pass', 's2-horn').people.push('dov');
    },
  ],
  ['an event without a meal', 'meals', (the) => (the.file.events[3]!.to = '2027-03-10T17:30')],
  ['a reserve instead of a break', 'breaks', (the) => (itemOf(the, 'break', `b ${TUESDAY}T15:00`).kind = 'reserve')],
  ['a pause too short', 'breaks', (the) => (the.file.production.rules = { break: 20 })],
  ['a room-day without its wrap', 'wrap', (the) => drop(the, itemOf(the, 'wrap', `a ${MONDAY}T12:55`))],
  ['a wrap too short', 'wrap', (the) => move(itemOf(the, 'wrap', `a ${MONDAY}T12:55`), '12:55', '13:35')],
  ['a reserve after the wrap', 'wrap', (the) => move(itemOf(the, 'reserve', `a ${MONDAY}T12:50`), '13:40', '13:45')],
  ['a room-day without its listen', 'listen', (the) => drop(the, itemOf(the, 'listen', `b ${TUESDAY}T12:00`))],
  [
    'a rig before the listen',
    'listen',
    (the) => {
      move(itemOf(the, 'rig', `b ${TUESDAY}T12:30`), '12:00', '12:30');
      move(itemOf(the, 'listen', `b ${TUESDAY}T12:00`), '12:30', '13:00');
    },
  ],
  ['a listen too short', 'listen', (the) => move(itemOf(the, 'listen', `b ${TUESDAY}T12:00`), '12:05', '12:30')],
  ['a listen where there are none', 'listen', (the) => (the.file.production.rules = { listen: 0 })],
  ['a reserve too short', 'reserve', (the) => move(itemOf(the, 'reserve', `a ${TUESDAY}T13:45`), '13:45', '13:50')],
  ['a night too short', 'turnaround', (the) => (the.file.production.rules = { turnaround: 1380 })],
  ['a day longer than the limit', 'limits', (the) => (the.file.people[2]!.limits = { day: 205 })],
  ['more voice than the limit', 'limits', (the) => (the.file.people[0]!.limits = { voice: 45 })],
  ['a must left out', 'musts', (the) => (the.file.songs[2]!.priority = 'must')],
  ['a must by default left out', 'musts', (the) => delete passOf(the, 's3-hum').song],
  ['a pass neither placed nor listed', 'unplaced', (the) => (the.plan.unplaced = ['s3-left'])],
  ['a placed pass listed as unplaced', 'unplaced', (the) => the.plan.unplaced.push('s1-lead')],
  ['an unknown pass listed as unplaced', 'unplaced', (the) => the.plan.unplaced.push('s9')],
  ['a call forgotten', 'calls', (the) => the.plan.calls.splice(2, 1)],
  ['a call for an event forgotten', 'calls', (the) => the.plan.calls.pop()],
  ['a call with nothing to do', 'calls', (the) => the.plan.calls.push({ ...callOf(the, 'lys', TUESDAY), date: MONDAY })],
  ['a call of a stranger', 'calls', (the) => the.plan.calls.push({ ...callOf(the, 'lys', TUESDAY), person: 'nobody' })],
  ['a call made twice', 'calls', (the) => the.plan.calls.push(callOf(the, 'lys', TUESDAY))],
  ['an arrival without getting ready', 'calls', (the) => (callOf(the, 'tobin', MONDAY).arrive = `${MONDAY}T11:45`)],
  ['an arrival too early', 'calls', (the) => (callOf(the, 'lys', TUESDAY).arrive = `${TUESDAY}T13:00`)],
  ['a wrong time to be ready', 'calls', (the) => (callOf(the, 'tobin', MONDAY).ready = `${MONDAY}T11:30`)],
  ['a release too late', 'calls', (the) => (callOf(the, 'lys', TUESDAY).release = `${TUESDAY}T14:00`)],
  ['wrong working minutes', 'calls', (the) => (callOf(the, 'tobin', MONDAY).working = 65)],
  ['wrong waiting minutes', 'calls', (the) => (callOf(the, 'dov', TUESDAY).waiting = 0)],
  ['an event forgotten', 'events', (the) => drop(the, itemOf(the, 'event', 'tuner'))],
  ['an event listed twice', 'events', (the) => the.plan.items.push(itemOf(the, 'event', 'tuner'))],
  ['an event that the file does not have', 'events', (the) => (itemOf(the, 'event', 'tuner').id = 'piano')],
  ['an event at another time', 'events', (the) => (itemOf(the, 'event', 'tuner').end = `${MONDAY}T10:00`)],
  ['an event in another room', 'events', (the) => (itemOf(the, 'event', 'tuner').room = 'b')],
  ['an event with other people', 'events', (the) => (itemOf(the, 'event', 'supper').people = ['dov'])],
  ['a cost that does not add up', 'cost', (the) => (the.plan.cost.waiting = 0)],
  ['a bound above the cost', 'cost', (the) => (the.plan.bound = 1481)],
  ['an optimum that is none', 'cost', (the) => (the.plan.status = 'optimal')],
];

describe('one thing spoilt', () => {
  it.each(spoilt)('%s breaks “%s”', (_name, rule, spoil) => {
    const the = fresh();
    spoil(the);
    const broken = checkPlan(the.file, the.plan).violations;
    expect(broken.map((violation) => violation.rule)).toContain(rule);
    for (const violation of broken) expect(violation.says).toMatch(/^\S.*\.$/);
  });

  it('is told beside everything else that is wrong', () => {
    const the = fresh();
    drop(the, itemOf(the, 'wrap', `a ${MONDAY}T12:55`));
    the.plan.unplaced = [];
    passOf(the, 's1-lead').pin = { day: MONDAY };
    const rules = checkPlan(the.file, the.plan).violations.map((violation) => violation.rule);
    expect(rules).toEqual(['unplaced', 'unplaced', 'order', 'wrap']);
  });
});
