import type { MadePlan, PlanCall, PlanItem } from '../../shared/contracts/plan';
import type { Pass, Person, ProductionFile, Song } from '../../shared/contracts/resources';

/**
 * An invented production with everything that a sheet can show, and a plan of it written by hand: two rooms, a day with more rows than
 * one page takes, a night past midnight, names in three scripts, markup in a title. Each call gives fresh objects.
 */
export const SHEET_DAYS = { first: '2027-03-08', full: '2027-03-09', night: '2027-03-10' } as const;
const { first, full, night } = SHEET_DAYS;

const song = (id: string, code: string, title: string, rest: Partial<Song> = {}): Song => ({
  id,
  code,
  title,
  parts: [
    { id: 'drums', players: ['tobin'], mode: 'live' },
    { id: 'bass', players: ['dov'], mode: 'live' },
    { id: 'lead', name: 'lead vocal', players: ['mara'], mode: 'guide' },
    { id: 'horns', players: ['oka', 'lys'], mode: 'overdub', needs: ['chart'] },
    { id: 'keys', name: 'organ', players: ['petra'], mode: 'overdub' },
  ],
  ...rest,
});

const basics = (of: string, rest: Partial<Pass> = {}): Pass => ({
  id: `${of}-basics`,
  song: of,
  parts: ['drums', 'bass', 'lead'],
  people: ['tobin', 'dov', 'mara'],
  room: 'a',
  setup: 'full-kit',
  minutes: [50, 65, 100],
  loud: true,
  voice: { mara: 15 },
  ...rest,
});
const horns = (of: string): Pass => ({
  id: `${of}-horns`,
  song: of,
  parts: ['horns'],
  people: ['oka', 'lys'],
  room: 'a',
  minutes: [30, 40, 60],
});
const organ = (of: string): Pass => ({
  id: `${of}-organ`,
  song: of,
  parts: ['keys'],
  people: ['petra'],
  room: 'b',
  minutes: 45,
  uses: [{ gear: 'organ' }],
});

export function sheetFile(): ProductionFile {
  const people: Person[] = [
    {
      id: 'mara',
      name: 'Mara Quill',
      short: 'Mara',
      plays: ['lead vocal', 'acoustic guitar'],
      fee: { call: 250, perHour: 40 },
      bring: ['acoustic guitar', 'spare strings', 'capo', 'tea'],
      food: 'no nuts',
      headphones: 'one ear off',
    },
    { id: 'tobin', name: 'Tobin Ashdown', short: 'Tob', plays: ['drums'], bring: ['cymbals', 'two pairs of brushes', 'drum key'] },
    { id: 'dov', name: 'Dov Lindqvist', plays: ['electric bass', 'double bass'] },
    { id: 'petra', name: 'Petra Montalvo-Szymborska', short: 'Petra', plays: ['organ'], access: 'step-free entrance, chair with back' },
    { id: 'oka', name: '岡 みどり', short: '岡', plays: ['saxophone'] },
    { id: 'lys', name: 'ليس كارو', short: 'ليس', plays: ['trumpet'], windows: [{ from: `${full}T13:00`, to: `${full}T17:00` }] },
    { id: 'jo', name: 'Jo Fenn', crew: true, plays: ['engineer'] },
  ];
  return {
    production: {
      code: 'SLUICE',
      title: 'Nine Sluices',
      timezone: 'Europe/Lisbon',
      pitch: 440,
      paper: 'A4',
      place: {
        name: 'Kiln Yard',
        address: '4 Ropery Lane, by the old lime kiln',
        door: 'green door in the yard, bell marked “Studio”',
        parking: 'two spaces behind the kiln; vans may unload at the gate',
        phone: '+00 555 0100',
      },
      late: 'Jo, +00 555 0101',
    },
    rooms: [
      {
        id: 'a',
        name: 'Room A',
        open: [first, full].map((day) => ({ from: `${day}T10:00`, to: `${day}T20:00` })),
        loud: [first, full].map((day) => ({ from: `${day}T10:00`, to: `${day}T19:00` })),
        operators: ['jo'],
        price: { day: 550 },
      },
      {
        id: 'b',
        name: 'Room B',
        open: [
          { from: `${full}T10:00`, to: `${full}T20:00` },
          { from: `${night}T20:00`, to: '2027-03-11T03:00' },
        ],
        price: { day: 275 },
      },
    ],
    people,
    gear: [{ id: 'organ', name: 'hired organ', price: 180, windows: [{ from: `${full}T10:00`, to: `${full}T18:00` }] }],
    setups: [
      { id: 'full-kit', name: 'Full kit', room: 'a', rig: 150, ready: { tobin: 75, dov: 30 } },
      { id: 'brushes', name: 'Brushes and double bass', room: 'a', rig: 60 },
    ],
    changeovers: [],
    songs: [
      song('s1', 'S1', 'Weir Song', { key: 'D', tempo: 96, meter: '4/4', click: true }),
      song('s2', 'S2', 'Tallow', { key: 'Am', tempo: 72, meter: '6/8', click: false, pitch: 442 }),
      song('s3', 'S3', 'Half a Ferry', { key: 'G', capo: 2, tuning: 'DADGAD', tempo: 118 }),
      song('s4', 'S4', 'Ropewalk', { key: 'E♭', tempo: 84, free: true }),
      song('s5', 'S5', '<img src=x onerror=alert(1)> & Cinder Lane', { key: 'Em', tempo: 104 }),
      song('s6', 'S6', 'The Long Way Round to Low Lamps and, After All, Back Again by the Canal 🏮', {
        key: 'B♭',
        tempo: 66,
        meter: '3/4',
      }),
    ],
    passes: [
      basics('s1', { note: 'two takes, then listen' }),
      basics('s5'),
      basics('s3'),
      basics('s2', { setup: 'brushes', minutes: [40, 45, 75] }),
      basics('s6', { setup: 'brushes', minutes: [40, 45, 75] }),
      ...['s1', 's2', 's3', 's5'].map(horns),
      { ...horns('s6'), people: ['oka'] },
      organ('s3'),
      organ('s5'),
      { id: 'gang', name: 'gang vocal', song: 's4', people: ['mara', 'tobin', 'dov', 'petra', 'oka', 'lys'], room: 'a', minutes: 30 },
      { id: 'leads', name: 'Leads S3, S6', people: ['mara'], room: 'b', minutes: [60, 90, 120], voice: { mara: 40 } },
      { id: 'night-organ', song: 's2', parts: ['keys'], people: ['petra'], room: 'b', minutes: 60 },
    ],
    events: [
      { id: 'tuner', name: 'piano tuner', kind: 'tuner', from: `${first}T10:00`, to: `${first}T10:30`, room: 'a' },
      { id: 'supper', name: 'supper for all', kind: 'party', from: `${full}T19:30`, to: `${full}T20:00`, people: ['mara'] },
    ],
  };
}

function item(kind: PlanItem['kind'], room: string, start: string, end: string, rest: Partial<PlanItem> = {}): PlanItem {
  return { kind, room, start, end, people: [], ...rest };
}

/** A pass of the file at a time; its people are those of the file, and the room's operators. */
function placed(file: ProductionFile, id: string, date: string, from: string, to: string): PlanItem {
  const pass = file.passes!.find((one) => one.id === id)!;
  const operators = file.rooms.find((room) => room.id === pass.room)!.operators ?? [];
  return {
    kind: 'pass',
    id,
    room: pass.room,
    ...(pass.setup ? { setup: pass.setup } : {}),
    start: `${date}T${from}`,
    end: `${date}T${to}`,
    people: [...(pass.people ?? []), ...operators],
  };
}

function call(person: string, date: string, arrive: string, ready: string, release: string): PlanCall {
  return { person, date, arrive: `${date}T${arrive}`, ready: `${date}T${ready}`, release: `${date}T${release}`, working: 0, waiting: 0 };
}

export function sheetPlan(): MadePlan {
  const file = sheetFile();
  const on = (date: string) => ({
    item: (kind: PlanItem['kind'], room: string, from: string, to: string, rest: Partial<PlanItem> = {}) =>
      item(kind, room, `${date}T${from}`, `${date}T${to}`, rest),
    pass: (id: string, from: string, to: string) => placed(file, id, date, from, to),
  });
  const one = on(first);
  const two = on(full);
  const three = on(night);
  return {
    status: 'feasible',
    cost: { total: 0, waiting: 0, changeover: 0, day: 0, overtime: 0, call: 0, maybe: 0, unplaced: 0 },
    bound: 0,
    seconds: 1,
    items: [
      one.item('event', 'a', '10:00', '10:30', { id: 'tuner' }),
      one.item('rig', 'a', '10:30', '13:00', { setup: 'full-kit' }),
      one.pass('s1-basics', '13:00', '14:05'),
      one.item('meal', 'a', '14:05', '14:50'),
      one.pass('s5-basics', '14:50', '15:55'),
      one.item('break', 'a', '15:55', '16:10'),
      one.pass('s3-basics', '16:10', '17:15'),
      one.item('reserve', 'a', '17:15', '18:00'),
      one.item('wrap', 'a', '18:00', '18:45'),

      two.item('listen', 'a', '10:00', '10:30'),
      two.item('changeover', 'a', '10:30', '11:15', { setup: 'brushes' }),
      two.pass('s6-basics', '11:15', '12:00'),
      two.pass('s2-basics', '12:00', '12:45'),
      two.item('meal', 'a', '12:45', '13:30'),
      two.pass('s1-horns', '13:30', '14:10'),
      two.pass('s2-horns', '14:10', '14:50'),
      two.item('break', 'a', '14:50', '15:05'),
      two.pass('s3-horns', '15:05', '15:45'),
      two.pass('s5-horns', '15:45', '16:25'),
      two.pass('gang', '16:25', '16:55'),
      two.item('break', 'a', '16:55', '17:10'),
      two.pass('s6-horns', '17:10', '17:50'),
      two.item('reserve', 'a', '17:50', '18:30'),
      two.item('wrap', 'a', '18:30', '19:15'),
      two.item('event', 'a', '19:30', '20:00', { id: 'supper', room: undefined, people: ['mara'] }),
      two.item('listen', 'b', '12:30', '13:00'),
      two.pass('s3-organ', '13:30', '14:15'),
      two.pass('s5-organ', '14:15', '15:00'),
      two.item('wrap', 'b', '15:00', '15:45'),

      three.item('listen', 'b', '20:00', '20:30'),
      three.pass('leads', '20:30', '22:00'),
      three.item('meal', 'b', '22:00', '22:45'),
      item('pass', 'b', `${night}T23:30`, '2027-03-11T00:30', { id: 'night-organ', people: ['petra'] }),
      item('wrap', 'b', '2027-03-11T00:30', '2027-03-11T01:15'),
    ],
    calls: [
      call('tobin', first, '11:45', '13:00', '17:15'),
      call('dov', first, '12:30', '13:00', '17:15'),
      call('mara', first, '13:00', '13:00', '17:15'),
      call('jo', first, '13:00', '13:00', '17:15'),
      call('mara', full, '11:15', '11:15', '20:00'),
      call('tobin', full, '11:15', '11:15', '16:55'),
      call('dov', full, '11:15', '11:15', '16:55'),
      call('jo', full, '11:15', '11:15', '17:50'),
      call('petra', full, '13:30', '13:30', '16:55'),
      call('oka', full, '13:30', '13:30', '17:50'),
      call('lys', full, '13:30', '13:30', '16:55'),
      call('mara', night, '20:30', '20:30', '22:00'),
      { ...call('petra', night, '23:30', '23:30', '23:30'), release: '2027-03-11T00:30' },
    ],
    unplaced: [],
    odds: {
      musts: 0.8,
      days: [
        { room: 'a', date: first, p50: '18:41', p90: '19:38' },
        { room: 'a', date: full, p50: '19:05', p90: '20:10' },
      ],
    },
    conflicts: [],
  };
}
