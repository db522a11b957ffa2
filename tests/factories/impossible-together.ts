import type { Pass } from '../../shared/contracts/resources';
import { aPass, emptyProduction, hours } from './bare-production';
import { edited, lysFree, shifts, withRules, type Impossible } from './impossible';

/** Productions in which passes, events and people get in each other's way. */
export const impossibleTogether: Impossible[] = [
  [
    'a ring',
    () =>
      emptyProduction([
        aPass('x'),
        aPass('y', { after: [{ pass: 'x' }] }),
        aPass('z', { before: [{ pass: 'x' }], after: [{ pass: 'y' }] }),
      ]),
    ['passes.x', 'passes.y.after', 'passes.z.after', 'passes.z.before'],
    /x, y and z wait for each other in a ring/,
  ],
  [
    'a ring among passes that are no musts',
    () =>
      emptyProduction([aPass('x', { priority: 'nice', after: [{ pass: 'y' }] }), aPass('y', { priority: 'nice', after: [{ pass: 'x' }] })]),
    ['passes.x.after', 'passes.y.after'],
    /ring/,
  ],
  [
    'two events in one room',
    () =>
      emptyProduction([], {
        events: [
          { id: 'tuner', room: 'a', ...hours('08', '10:00', '12:00') },
          { id: 'bells', room: 'a', ...hours('08', '11:00', '11:30') },
        ],
      }),
    ['events.bells', 'events.tuner'],
    /tuner and bells both take Room A/,
  ],
  [
    'an event when its guest is away',
    () =>
      lysFree(
        emptyProduction([], { events: [{ id: 'party', people: ['lys'], ...hours('08', '18:00', '20:00') }] }),
        hours('09', '13:00', '17:00'),
      ),
    ['events.party', 'people.lys.windows'],
    /Lys Marrow is wanted by an event when they are not free/,
  ],
  [
    'a must after one that was left out by hand',
    () => emptyProduction([aPass('base', { leftOut: true }), aPass('lead', { after: [{ pass: 'base' }] })]),
    ['passes.base.leftOut', 'passes.lead.after'],
    /left out by hand/,
  ],
  [
    'two pins at one time in one room',
    () => emptyProduction([aPass('x', { pin: { at: '2027-03-08T12:00' } }), aPass('y', { pin: { at: '2027-03-08T12:30' } })]),
    ['passes.x.pin', 'passes.y.pin'],
    /x and y cannot both have a time/,
  ],
  [
    'two pins at one time for one person',
    () =>
      emptyProduction([
        aPass('x', { people: ['mara'], pin: { at: '2027-03-08T12:00' } }),
        aPass('y', { room: 'b', people: ['mara'], pin: { at: '2027-03-08T12:30' } }),
      ]),
    ['passes.x.pin', 'passes.y.pin'],
    /Mara Quill/,
  ],
  [
    'two together in one room',
    () => emptyProduction([aPass('x', { together: ['y'] }), aPass('y')]),
    ['passes.x.together', 'passes.y'],
    /x and y cannot start together/,
  ],
  [
    'two together and apart',
    () => emptyProduction([aPass('x', { together: ['y'] }), aPass('y', { room: 'b', apart: ['x'] })]),
    ['passes.x.together', 'passes.y.apart'],
    /kept apart from x/,
  ],
  [
    'two parts of one song together in two rooms',
    () =>
      withRules(
        emptyProduction([aPass('x', { song: 's', together: ['y'] }), aPass('y', { song: 's', room: 'b' })], {
          songs: [{ id: 's', title: 'Weir Song' }],
        }),
        {},
      ),
    ['passes.x.together', 'passes.y', 'rules.oneRoomPerSong'],
    /one song is never open in two rooms/,
  ],
  [
    'an order against the pins',
    () =>
      emptyProduction([
        aPass('x', { pin: { day: '2027-03-09' } }),
        aPass('y', { room: 'b', after: [{ pass: 'x' }], pin: { day: '2027-03-08' } }),
      ]),
    ['passes.x.pin', 'passes.y.after', 'passes.y.pin'],
    /y comes after x/,
  ],
  [
    'a lag that leads beyond the last day',
    () => emptyProduction([aPass('x'), aPass('y', { after: [{ pass: 'x', lag: 4000 }] })]),
    ['passes.x', 'passes.y.after', 'rooms.a.open'],
    /4000 min more/,
  ],
  [
    'approval where nothing is ever listened to',
    () => emptyProduction([aPass('x'), aPass('y', { after: [{ pass: 'x', kind: 'approved' }] })]),
    ['passes.x', 'passes.y.after', 'rules.listen'],
    /there are no listens/,
  ],
  [
    'a guest whose stay would span two visits',
    () =>
      lysFree(
        emptyProduction([
          aPass('x', { people: ['lys'], pin: { at: '2027-03-08T10:00' } }),
          aPass('y', { people: ['lys'], pin: { at: '2027-03-08T18:00' } }),
        ]),
        hours('08', '10:00', '12:00'),
        hours('08', '17:00', '20:00'),
      ),
    ['passes.x.pin', 'passes.y.pin', 'people.lys.windows'],
    /Lys Marrow is free only/,
  ],
  [
    'too short a night',
    () =>
      withRules(
        emptyProduction([
          aPass('x', { people: ['mara'], pin: { at: '2027-03-08T19:00' } }),
          aPass('y', { people: ['mara'], pin: { at: '2027-03-09T10:00' } }),
        ]),
        { turnaround: 900 },
      ),
    ['passes.x.pin', 'passes.y.pin', 'rules.turnaround'],
    /15 h lie between/,
  ],
  [
    'too long a day',
    () =>
      edited(
        emptyProduction([
          aPass('x', { people: ['mara'], pin: { at: '2027-03-08T10:00' } }),
          aPass('y', { people: ['mara'], pin: { at: '2027-03-08T19:00' } }),
        ]),
        (file) => (file.people[0]!.limits = { day: 480 }),
      ),
    ['passes.x.pin', 'passes.y.pin', 'people.mara.limits'],
    /at most 8 h a day/,
  ],
  [
    'three passes in a room that holds two',
    () =>
      edited(
        emptyProduction([aPass('x', { minutes: 250 }), aPass('y', { minutes: 250 }), aPass('z', { minutes: 250 })]),
        shifts('10:00', '20:00'),
      ),
    ['passes.x', 'passes.y', 'passes.z', 'rooms.a.open'],
    /Room A would need 12 h 30 of work on Mon 8 March and has 10 h at most/,
  ],
  [
    'two long passes pinned back to back without a break',
    () =>
      withRules(
        emptyProduction([
          aPass('x', { minutes: 75, pin: { at: '2027-03-08T12:00' } }),
          aPass('y', { minutes: 75, pin: { at: '2027-03-08T13:15' } }),
        ]),
        {
          breakAfter: 120,
          break: 15,
        },
      ),
    ['passes.x.pin', 'passes.y.pin', 'rules.break', 'rules.breakAfter'],
    /a room works at most 2 h without a pause/,
  ],
  [
    'a guest who is kept from a meal by two pins',
    () =>
      withRules(
        emptyProduction([
          aPass('x', { people: ['mara'], minutes: 180, pin: { at: '2027-03-08T12:00' } }),
          aPass('y', { people: ['mara'], room: 'b', minutes: 180, pin: { at: '2027-03-08T15:30' } }),
        ]),
        { meal: 45, mealAfter: 300 },
      ),
    ['passes.x.pin', 'passes.y.pin', 'rules.meal', 'rules.mealAfter'],
    /Mara Quill/,
  ],
  [
    'a set-up kept until approved where nothing is listened to',
    () =>
      edited(
        emptyProduction([aPass('x', { setup: 'kit' }), aPass('y', { setup: 'brushes' })], {
          setups: [
            { id: 'kit', room: 'a', keepUntil: 'approved' },
            { id: 'brushes', room: 'a', keepUntil: 'approved' },
          ],
        }),
        (file) => (file.production.rules!.listen = 0),
      ),
    ['passes.x.setup', 'passes.y.setup', 'rules.listen'],
    /there are no listens/,
  ],
  [
    'three set-ups in the two hours of a guest',
    () =>
      lysFree(
        emptyProduction(
          ['kit', 'brushes', 'aside'].map((setup) => aPass(`on-${setup}`, { setup, people: ['lys'], minutes: 30 })),
          {
            setups: ['kit', 'brushes', 'aside'].map((id) => ({ id, room: 'a', rig: 30 })),
            changeovers: ['kit', 'brushes', 'aside'].flatMap((from) =>
              ['kit', 'brushes', 'aside'].flatMap((to) => (from === to ? [] : [{ from, to, minutes: 20 }])),
            ),
          },
        ),
        hours('09', '13:00', '15:00'),
      ),
    ['passes.on-aside.setup', 'passes.on-brushes.setup', 'passes.on-kit.setup', 'people.lys.windows'],
    /Lys Marrow has too little time on Tue 9 March for the changeovers between their passes/,
  ],
  [
    'four passes of more than half a day on three days',
    () => emptyProduction(['w', 'x', 'y', 'z'].map((id): Pass => aPass(id, { minutes: 350 }))),
    ['passes.w', 'passes.x', 'passes.y', 'passes.z', 'rooms.a.open'],
    /The passes in Room A are too long to be shared out from Mon 8 March to Wed 10 March/,
  ],
  [
    'a room full with a changeover',
    () =>
      edited(
        emptyProduction([aPass('x', { minutes: 280, setup: 'kit' }), aPass('y', { minutes: 280, setup: 'brushes' })], {
          setups: [
            { id: 'kit', rig: 30 },
            { id: 'brushes', rig: 30 },
          ],
          changeovers: [
            { from: 'kit', to: 'brushes', minutes: 45 },
            { from: 'brushes', to: 'kit', minutes: 60 },
          ],
        }),
        shifts('10:00', '20:00'),
      ),
    ['passes.x.setup', 'passes.y.setup', 'rooms.a.open'],
    /x and y cannot both have a time: .* x needs the set-up kit/,
  ],
  [
    'a guest with more to do than time',
    () =>
      lysFree(
        emptyProduction(['w', 'x', 'y', 'z'].map((id, i): Pass => aPass(id, { people: ['lys'], room: i % 2 ? 'a' : 'b', minutes: 65 }))),
        hours('09', '13:00', '17:00'),
      ),
    ['passes.w', 'passes.x', 'passes.y', 'passes.z', 'people.lys.windows'],
    /Lys Marrow would have 4 h 20 of passes on Tue 9 March and time for 4 h at most/,
  ],
  [
    'a singer with more to sing than days',
    () =>
      edited(
        emptyProduction(['w', 'x', 'y', 'z'].map((id): Pass => aPass(id, { people: ['mara'], voice: { mara: 40 } }))),
        (file) => (file.people[0]!.limits = { voice: 75 }),
      ),
    ['passes.w.voice', 'passes.x.voice', 'passes.y.voice', 'passes.z.voice', 'people.mara.limits', 'rooms.a.open'],
    /would sing more/,
  ],
  [
    'a chain that runs out of days',
    () =>
      edited(
        emptyProduction([
          aPass('x', { minutes: 200 }),
          aPass('y', { room: 'b', minutes: 200, after: [{ pass: 'x' }] }),
          aPass('z', { minutes: 250, after: [{ pass: 'y' }] }),
        ]),
        shifts('10:00', '20:00'),
      ),
    ['passes.x', 'passes.y.after', 'passes.z.after', 'rooms.a.open'],
    /In the order that is asked for/,
  ],
  [
    'a pass that only a must makes needed',
    () =>
      lysFree(
        emptyProduction([aPass('guide', { priority: 'nice', people: ['lys'] }), aPass('lead', { after: [{ pass: 'guide' }] })]),
        hours('09', '21:00', '23:00'),
      ),
    ['passes.guide', 'passes.lead.after', 'people.lys.windows', 'rooms.a.open'],
    /lead comes after guide/,
  ],
];
