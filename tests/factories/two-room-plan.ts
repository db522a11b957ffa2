import type { MadePlan, PlanCall, PlanItem } from '../../shared/contracts/plan';
import type { ProductionFile } from '../../shared/contracts/resources';

/** A small production and a valid plan of it, worked out by hand; each call gives fresh objects that a test may spoil. */

const MONDAY = '2027-03-08';
const TUESDAY = '2027-03-09';
const monday = (clock: string) => `${MONDAY}T${clock}`;
const tuesday = (clock: string) => `${TUESDAY}T${clock}`;

export function twoRoomFile(): ProductionFile {
  return {
    production: { code: 'KITE', title: 'Kite over Salt', timezone: 'Europe/Lisbon' },
    rooms: [
      {
        id: 'a',
        people: 6,
        standard: 240,
        open: [
          { from: monday('10:00'), to: monday('20:00') },
          { from: tuesday('10:00'), to: tuesday('20:00') },
        ],
        loud: [
          { from: monday('10:00'), to: monday('19:00') },
          { from: tuesday('10:00'), to: tuesday('19:00') },
        ],
        hears: ['b'],
        operators: ['jo'],
      },
      { id: 'b', standing: false, open: [{ from: tuesday('10:00'), to: tuesday('20:00') }] },
    ],
    people: [
      {
        id: 'mara',
        windows: [
          { from: monday('10:00'), to: monday('20:00') },
          { from: tuesday('10:00'), to: tuesday('20:00'), sure: false },
        ],
        limits: { voice: 60, day: 600 },
      },
      { id: 'tobin', away: 120 },
      { id: 'dov' },
      { id: 'lys', windows: [{ from: tuesday('13:00'), to: tuesday('17:00') }] },
      { id: 'jo', crew: true },
    ],
    gear: [{ id: 'organ', windows: [{ from: tuesday('12:00'), to: tuesday('18:00') }] }, { id: 'valve' }],
    setups: [
      { id: 'full-kit', room: 'a', rig: 90, ready: { tobin: 60 }, keepUntil: 'approved' },
      { id: 'brushes', room: 'a', rig: 60 },
      { id: 'booth', room: 'b', rig: 30 },
    ],
    changeovers: [{ from: 'full-kit', to: 'brushes', minutes: 45 }],
    songs: [
      { id: 's1', priority: 'must' },
      { id: 's2', priority: 'must' },
      { id: 's3', priority: 'nice' },
    ],
    passes: [
      {
        id: 's1-basics',
        song: 's1',
        people: ['tobin', 'mara', 'dov'],
        setup: 'full-kit',
        minutes: [50, 62, 100],
        loud: true,
        voice: { mara: 20 },
        pin: { day: MONDAY, notBefore: monday('11:00'), notAfter: monday('13:00') },
      },
      {
        id: 's2-basics',
        song: 's2',
        people: ['tobin', 'dov'],
        setup: 'brushes',
        minutes: 60,
        loud: true,
        after: [{ pass: 's1-basics', kind: 'approved' }],
        uses: [{ gear: 'valve' }],
      },
      {
        id: 's2-horn',
        song: 's2',
        people: ['lys'],
        room: 'a',
        minutes: 30,
        loud: true,
        together: ['s1-answer'],
        after: [{ event: 'tuner' }],
      },
      { id: 's1-answer', song: 's1', people: ['mara'], setup: 'booth', minutes: 30, voice: { mara: 10 } },
      {
        id: 's1-lead',
        song: 's1',
        people: ['mara'],
        setup: 'booth',
        minutes: 45,
        quiet: true,
        voice: { mara: 40 },
        after: [{ pass: 's1-basics', lag: 30 }],
        apart: ['s2-basics'],
        pin: { at: tuesday('13:45') },
      },
      {
        id: 's1-organ',
        song: 's1',
        people: ['dov'],
        setup: 'booth',
        minutes: 30,
        uses: [{ gear: 'organ', count: 1 }],
        before: [{ event: 'organ-collected' }],
        after: [{ pass: 's1-lead' }],
      },
      { id: 's3-hum', song: 's3', people: ['mara'], setup: 'booth', minutes: 30 },
      { id: 's3-left', priority: 'must', people: ['mara'], setup: 'booth', minutes: 30, leftOut: true },
    ],
    events: [
      { id: 'tuner', kind: 'tuner', from: monday('08:30'), to: monday('09:40'), room: 'a' },
      { id: 'organ-collected', kind: 'collection', from: tuesday('18:00'), to: tuesday('18:15'), room: 'b' },
      { id: 'supper', kind: 'party', from: tuesday('20:00'), to: tuesday('21:00'), people: ['tobin'] },
      { id: 'truck', kind: 'delivery', from: '2027-03-10T12:00', to: '2027-03-10T12:30', people: ['dov'] },
    ],
  };
}

/** An item in one room on one day, its times as clock times. */
function item(
  day: (clock: string) => string,
  room: string,
  kind: PlanItem['kind'],
  from: string,
  to: string,
  rest: Partial<PlanItem> = {},
): PlanItem {
  return { kind, room, start: day(from), end: day(to), people: [], ...rest };
}

function call(person: string, date: string, times: [string, string, string], working: number, waiting = 0): PlanCall {
  const [arrive, ready, release] = times.map((clock) => `${date}T${clock}`) as [string, string, string];
  return { person, date, arrive, ready, release, working, waiting };
}

/**
 * Points: Dov waits 75 (120 between two passes, 45 of them a meal); 90 + 45 + 30 of rig and changeover; three room-days; room A is
 * 280 min long on Tuesday, 40 over its standard; ten calls; Mara spends 75 min in her maybe window; one nice pass is left out.
 */
export function twoRoomPlan(): MadePlan {
  const cost = { waiting: 75, changeover: 165, day: 360, overtime: 80, call: 150, maybe: 150, unplaced: 500 };
  return {
    status: 'feasible',
    cost: { total: 1480, ...cost },
    bound: 0,
    seconds: 0,
    items: [
      { kind: 'event', id: 'tuner', room: 'a', start: monday('08:30'), end: monday('09:40'), people: [] },
      item(monday, 'a', 'rig', '10:00', '11:30', { setup: 'full-kit' }),
      item(monday, 'a', 'break', '11:30', '11:45'),
      item(monday, 'a', 'pass', '11:45', '12:50', { id: 's1-basics', setup: 'full-kit', people: ['tobin', 'mara', 'dov', 'jo'] }),
      item(monday, 'a', 'reserve', '12:50', '12:55'),
      item(monday, 'a', 'wrap', '12:55', '13:40'),
      item(tuesday, 'a', 'listen', '10:00', '10:30'),
      item(tuesday, 'a', 'changeover', '10:30', '11:15', { setup: 'brushes' }),
      item(tuesday, 'a', 'break', '11:15', '11:30'),
      item(tuesday, 'a', 'pass', '11:30', '12:30', { id: 's2-basics', setup: 'brushes', people: ['tobin', 'dov', 'jo'] }),
      item(tuesday, 'a', 'meal', '12:30', '13:15'),
      item(tuesday, 'a', 'pass', '13:15', '13:45', { id: 's2-horn', people: ['lys', 'jo'] }),
      item(tuesday, 'a', 'reserve', '13:45', '13:55'),
      item(tuesday, 'a', 'wrap', '13:55', '14:40'),
      item(tuesday, 'b', 'listen', '12:00', '12:30'),
      item(tuesday, 'b', 'rig', '12:30', '13:00', { setup: 'booth' }),
      item(tuesday, 'b', 'pass', '13:15', '13:45', { id: 's1-answer', setup: 'booth', people: ['mara'] }),
      item(tuesday, 'b', 'pass', '13:45', '14:30', { id: 's1-lead', setup: 'booth', people: ['mara'] }),
      item(tuesday, 'b', 'pass', '14:30', '15:00', { id: 's1-organ', setup: 'booth', people: ['dov'] }),
      item(tuesday, 'b', 'break', '15:00', '15:15'),
      item(tuesday, 'b', 'reserve', '15:15', '15:30'),
      item(tuesday, 'b', 'wrap', '15:30', '16:15'),
      { kind: 'event', id: 'organ-collected', room: 'b', start: tuesday('18:00'), end: tuesday('18:15'), people: [] },
      { kind: 'event', id: 'supper', start: tuesday('20:00'), end: tuesday('21:00'), people: ['tobin'] },
      { kind: 'event', id: 'truck', start: '2027-03-10T12:00', end: '2027-03-10T12:30', people: ['dov'] },
    ],
    calls: [
      call('tobin', MONDAY, ['10:30', '11:45', '12:50'], 125),
      call('mara', MONDAY, ['11:45', '11:45', '12:50'], 65),
      call('dov', MONDAY, ['11:45', '11:45', '12:50'], 65),
      call('jo', MONDAY, ['11:45', '11:45', '12:50'], 65),
      call('tobin', TUESDAY, ['11:30', '11:30', '21:00'], 120),
      call('mara', TUESDAY, ['13:15', '13:15', '14:30'], 75),
      call('dov', TUESDAY, ['11:30', '11:30', '15:00'], 90, 75),
      call('lys', TUESDAY, ['13:15', '13:15', '13:45'], 30),
      call('jo', TUESDAY, ['11:30', '11:30', '13:45'], 90),
      call('dov', '2027-03-10', ['12:00', '12:00', '12:30'], 30),
    ],
    unplaced: ['s3-hum', 's3-left'],
    odds: { musts: 1, days: [] },
    conflicts: [],
  };
}
