import { aPass, emptyProduction, hours } from './bare-production';
import { edited, lysFree, shifts, withRules, type Impossible } from './impossible';

/** Productions in which a single pass has no place. */
export const impossibleAlone: Impossible[] = [
  [
    'a guest who is not there long enough',
    () => lysFree(emptyProduction([aPass('horns', { people: ['lys'], minutes: [60, 75, 90] })]), hours('09', '13:00', '14:00')),
    ['passes.horns', 'people.lys.windows'],
    /horns: .*Lys Marrow is free only Tue 9 March 13:00–14:00; horns takes 75 min in Room A with Lys Marrow/,
  ],
  [
    'a guest who comes on another day than the pin',
    () => lysFree(emptyProduction([aPass('horns', { people: ['lys'], pin: { day: '2027-03-08' } })]), hours('09', '13:00', '17:00')),
    ['passes.horns.pin', 'people.lys.windows'],
    /pinned on Mon 8 March/,
  ],
  [
    'two guests who never meet',
    () =>
      edited(
        lysFree(emptyProduction([aPass('horns', { people: ['lys', 'oka'] })]), hours('09', '13:00', '17:00')),
        (file) => (file.people[3]!.windows = [hours('08', '10:00', '20:00')]),
      ),
    ['passes.horns', 'people.lys.windows', 'people.oka.windows'],
    /Oka Dunne is free only Mon 8 March/,
  ],
  [
    'a pin outside the hours',
    () => emptyProduction([aPass('dawn', { pin: { at: '2027-03-08T06:00' } })]),
    ['passes.dawn.pin', 'rooms.a.open'],
    /pinned at Mon 8 March 06:00/,
  ],
  [
    'a pin off the grid',
    () => emptyProduction([aPass('odd', { pin: { at: '2027-03-08T12:02' } })]),
    ['passes.odd.pin', 'rules.step'],
    /steps of 5 min/,
  ],
  [
    'a pass longer than any window',
    () => emptyProduction([aPass('epic', { minutes: 640 })]),
    ['passes.epic', 'rooms.a.open'],
    /epic takes 640 min/,
  ],
  [
    'no time left for the wrap',
    () => withRules(emptyProduction([aPass('epic', { minutes: 590 })]), { wrap: 45 }),
    ['passes.epic', 'rooms.a.open', 'rules.wrap'],
    /wrap of 45 min/,
  ],
  [
    'no time left for the reserve',
    () => withRules(emptyProduction([aPass('epic', { minutes: 590 })]), { reserve: 0.15 }),
    ['passes.epic', 'rooms.a.open', 'rules.reserve'],
    /15 % of its pass minutes in reserve/,
  ],
  [
    'a pass that nobody can get through unfed',
    () => withRules(emptyProduction([aPass('epic', { minutes: 320 })]), { meal: 45, mealAfter: 300 }),
    ['passes.epic', 'rules.meal', 'rules.mealAfter'],
    /without a meal/,
  ],
  [
    'no time for the rig on the only day',
    () =>
      edited(
        emptyProduction([aPass('first', { setup: 'kit', minutes: 500 })], { setups: [{ id: 'kit', room: 'a', rig: 120 }] }),
        shifts('10:00', '20:00'),
      ),
    ['passes.first.setup', 'rooms.a.open'],
    /needs the set-up kit/,
  ],
  [
    'loud work out of hours',
    () =>
      edited(
        emptyProduction([aPass('crash', { loud: true, minutes: 120 })]),
        (file) => (file.rooms[0]!.loud = [hours('08', '10:00', '11:30')]),
      ),
    ['passes.crash.loud', 'rooms.a.loud'],
    /Room A may be loud Mon 8 March 10:00–11:30/,
  ],
  [
    'gear that is gone',
    () =>
      emptyProduction([aPass('organ', { uses: [{ gear: 'organ' }], pin: { day: '2027-03-10' } })], {
        gear: [{ id: 'organ', name: 'hired organ', windows: [hours('08', '10:00', '20:00')] }],
      }),
    ['gear.organ.windows', 'passes.organ.pin', 'passes.organ.uses'],
    /hired organ is there Mon 8 March/,
  ],
  [
    'more gear than there is',
    () => emptyProduction([aPass('valves', { uses: [{ gear: 'valve', count: 3 }] })], { gear: [{ id: 'valve', count: 2 }] }),
    ['gear.valve.count', 'passes.valves.uses'],
    /there is 2 of valve/,
  ],
  [
    'more people than the room holds',
    () => edited(emptyProduction([aPass('gang', { people: ['mara', 'tobin', 'lys'] })]), (file) => (file.rooms[0]!.people = 2)),
    ['passes.gang', 'rooms.a.people'],
    /Room A holds 2 people/,
  ],
  [
    'more voice than a day allows',
    () =>
      edited(
        emptyProduction([aPass('lead', { people: ['mara'], voice: { mara: 80 } })]),
        (file) => (file.people[0]!.limits = { voice: 75 }),
      ),
    ['passes.lead.voice', 'people.mara.limits'],
    /sings at most 75 min a day/,
  ],
  [
    'an event that takes the room',
    () =>
      edited(
        emptyProduction([aPass('long', { minutes: 200 })], {
          events: [{ id: 'fair', name: 'village fair', room: 'a', ...hours('08', '12:00', '14:00') }],
        }),
        shifts('10:00', '15:00'),
      ),
    ['events.fair', 'passes.long', 'rooms.a.open'],
    /village fair is Mon 8 March 12:00–14:00 in Room A/,
  ],
  [
    'after an event that comes too late',
    () =>
      emptyProduction([aPass('tuned', { after: [{ event: 'tuner' }] })], { events: [{ id: 'tuner', ...hours('11', '10:00', '11:00') }] }),
    ['events.tuner', 'passes.tuned.after', 'rooms.a.open'],
    /comes after tuner/,
  ],
  [
    'before an event that comes too early',
    () =>
      emptyProduction([aPass('organ', { before: [{ event: 'collected' }] })], {
        events: [{ id: 'collected', ...hours('08', '10:30', '10:45') }],
      }),
    ['events.collected', 'passes.organ.before', 'rooms.a.open'],
    /comes before collected/,
  ],
];
