import type { MadePlan, PlanItem } from '../../shared/contracts/plan';
import type { Pass, ProductionFile } from '../../shared/contracts/resources';

/**
 * A small invented production with two rooms and a plan for it, written by hand, for tests of what is made from a plan. The second
 * day uses both rooms at once.
 */
const pass = (id: string, song: string, people: string[], minutes: Pass['minutes'], more: Partial<Pass> = {}): Pass => ({
  id,
  song,
  people,
  minutes,
  room: 'a',
  ...more,
});

export function sampleFile(): ProductionFile {
  const open = ['2027-03-08', '2027-03-09'].map((date) => ({ from: `${date}T10:00`, to: `${date}T20:00` }));
  return {
    production: { code: 'HOLLOW', title: 'Hollow Weir', timezone: 'Europe/Lisbon', currency: 'EUR' },
    rooms: [
      {
        id: 'a',
        name: 'Room A',
        open,
        loud: open.map(({ from }) => ({ from, to: `${from.slice(0, 10)}T19:00` })),
        standard: 480,
        price: { day: 550, overtimeHour: 70 },
      },
      { id: 'b', name: 'Room B', open: [open[1]!], operators: ['jo'], price: { day: 200 } },
    ],
    people: [
      { id: 'mara', name: 'Mara Quill', short: 'Mara', fee: { call: 50, perHour: 20 } },
      { id: 'tobin', name: 'Tobin Ashdown', short: 'Tob' },
      { id: 'dov', name: 'Dov Lindqvist' },
      { id: 'petra', name: 'Petra Montalvo-Szymborska', short: 'Petra Montalvo' },
      { id: 'lys', name: 'Lys Carrow', windows: [{ from: '2027-03-09T13:00', to: '2027-03-09T17:00' }], away: 60 },
      { id: 'jo', name: 'Jo Fenn', crew: true },
    ],
    gear: [{ id: 'organ', name: 'hired organ', price: 180 }],
    setups: [
      { id: 'full-kit', name: 'Full kit', room: 'a', rig: 150, ready: { tobin: 75, dov: 30 } },
      { id: 'brushes', name: 'Brushes and double bass', room: 'a', rig: 60 },
    ],
    changeovers: [{ from: 'full-kit', to: 'brushes', minutes: 45 }],
    songs: [
      {
        id: 's1',
        code: 'S1',
        title: 'Weir Song',
        parts: [
          { id: 'drums', mode: 'live' },
          { id: 'lead', mode: 'guide' },
          { id: 'horns', mode: 'overdub' },
        ],
      },
      { id: 's2', code: 'S2', title: 'The Long Way Round to Low Lamps and Back Again', parts: [{ id: 'drums', mode: 'live' }] },
      { id: 's3', code: 'S3', title: 'Half a Ferry', parts: [{ id: 'organ', name: 'organ', mode: 'overdub' }] },
    ],
    passes: [
      pass('s1-basics', 's1', ['mara', 'tobin', 'dov', 'petra'], [50, 75, 100], {
        parts: ['drums', 'lead'],
        setup: 'full-kit',
        pin: { at: '2027-03-08T12:30' },
      }),
      pass('s2-basics', 's2', ['tobin', 'dov'], 75, { parts: ['drums'], setup: 'full-kit' }),
      pass('s1-horns', 's1', ['lys'], 50, { parts: ['horns'] }),
      pass('s2-repair', 's2', ['tobin'], 15, { name: 'repairs', setup: 'brushes', priority: 'should' }),
      pass('s3-organ', 's3', ['petra'], 60, { parts: ['organ'], room: 'b', uses: [{ gear: 'organ' }] }),
      pass('s3-solo', 's3', ['lys'], 30, { name: 'trumpet solo' }),
      pass('s2-shaker', 's2', ['mara'], 20, { name: 'shaker', priority: 'nice' }),
    ],
    events: [],
  };
}

const at = (date: string, start: string, end: string) => ({ start: `${date}T${start}`, end: `${date}T${end}` });
const MON = '2027-03-08';
const TUE = '2027-03-09';

export function samplePlan(): MadePlan {
  const items: PlanItem[] = [
    { kind: 'rig', room: 'a', setup: 'full-kit', ...at(MON, '10:00', '12:30'), people: [] },
    {
      kind: 'pass',
      id: 's1-basics',
      room: 'a',
      setup: 'full-kit',
      ...at(MON, '12:30', '13:45'),
      people: ['mara', 'tobin', 'dov', 'petra'],
    },
    { kind: 'meal', room: 'a', ...at(MON, '13:45', '14:30'), people: [] },
    { kind: 'pass', id: 's2-basics', room: 'a', setup: 'full-kit', ...at(MON, '14:30', '15:45'), people: ['tobin', 'dov'] },
    { kind: 'break', room: 'a', ...at(MON, '15:45', '16:00'), people: [] },
    { kind: 'reserve', room: 'a', ...at(MON, '16:00', '16:20'), people: [] },
    { kind: 'wrap', room: 'a', ...at(MON, '16:20', '17:05'), people: [] },
    { kind: 'listen', room: 'a', ...at(TUE, '10:00', '10:30'), people: ['mara'] },
    { kind: 'changeover', room: 'a', setup: 'brushes', ...at(TUE, '10:30', '11:15'), people: ['tobin'] },
    { kind: 'pass', id: 's2-repair', room: 'a', setup: 'brushes', ...at(TUE, '11:15', '11:30'), people: ['tobin'] },
    { kind: 'pass', id: 's1-horns', room: 'a', ...at(TUE, '13:00', '13:50'), people: ['lys'] },
    { kind: 'pass', id: 's3-organ', room: 'b', ...at(TUE, '13:00', '14:00'), people: ['petra', 'jo'] },
    { kind: 'pass', id: 's3-solo', room: 'a', ...at(TUE, '15:30', '16:00'), people: ['lys'] },
    { kind: 'wrap', room: 'a', ...at(TUE, '16:00', '19:00'), people: [] },
    { kind: 'wrap', room: 'b', ...at(TUE, '14:00', '14:45'), people: [] },
  ];
  const call = (person: string, date: string, arrive: string, ready: string, release: string, working: number, waiting: number) => ({
    person,
    date,
    arrive: `${date}T${arrive}`,
    ready: `${date}T${ready}`,
    release: `${date}T${release}`,
    working,
    waiting,
  });
  return {
    status: 'feasible',
    cost: { total: 0, waiting: 0, changeover: 0, day: 0, overtime: 0, call: 0, maybe: 0, unplaced: 0 },
    bound: 0,
    seconds: 1,
    items,
    calls: [
      call('mara', MON, '12:30', '12:30', '13:45', 75, 0),
      call('tobin', MON, '11:15', '12:30', '15:45', 225, 0),
      call('dov', MON, '12:00', '12:30', '15:45', 180, 0),
      call('petra', MON, '12:30', '12:30', '13:45', 75, 0),
      call('mara', TUE, '10:00', '10:00', '10:30', 30, 0),
      call('tobin', TUE, '11:15', '11:15', '11:30', 15, 0),
      call('lys', TUE, '13:00', '13:00', '16:00', 80, 0),
      call('petra', TUE, '13:00', '13:00', '14:00', 60, 0),
      call('jo', TUE, '13:00', '13:00', '14:00', 60, 0),
    ],
    unplaced: ['s2-shaker'],
    odds: { musts: 0.83, days: [] },
    conflicts: [],
  };
}
