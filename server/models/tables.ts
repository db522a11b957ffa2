import type { ResourceName } from '../../shared/contracts/resources';
import {
  as,
  childNames,
  entries,
  flag,
  group,
  keys,
  minutes,
  number,
  record,
  reference,
  text,
  texts,
  whole,
  type ChildName,
  type ChildrenField,
  type Fields,
} from './fields';

/** How each kind of row stands in the database: the one mapping between the form of the file and tables. */

const span = { from: as('fromWall', text), to: as('toWall', text) };
const person = reference('people', 'personId');
const minutesOf = as('minutes', whole);
const use = { gear: reference('gear', 'gearId'), count: whole };
const lag = { lag: whole };
const event = reference('events', 'neededEventId');
const kind = as('relation', text);

export const resourceFields: Readonly<Record<ResourceName, Fields>> = {
  production: {
    code: text,
    title: text,
    timezone: text,
    currency: text,
    pitch: number,
    recording: group({ rate: whole, bits: whole }),
    paper: text,
    place: group({ name: text, address: text, door: text, parking: text, phone: text }),
    late: text,
    dress: text,
    note: text,
    rules: group({
      step: whole,
      mealAfter: whole,
      meal: whole,
      breakAfter: whole,
      break: whole,
      wrap: whole,
      listen: whole,
      reserve: number,
      turnaround: whole,
      changeover: whole,
      oneRoomPerSong: flag,
    }),
    weights: group({
      waiting: number,
      changeover: number,
      day: number,
      overtime: number,
      call: number,
      maybe: number,
      should: number,
      nice: number,
    }),
    passesByHand: flag,
  },
  rooms: {
    name: text,
    size: { kind: 'tuple', type: 'number', attributes: ['sizeLength', 'sizeWidth', 'sizeHeight'] },
    people: as('peopleLimit', whole),
    inputs: whole,
    phones: whole,
    standing: flag,
    standard: whole,
    open: entries('hours', 'roomId', span, 'open'),
    loud: entries('hours', 'roomId', span, 'loud'),
    hears: keys('roomHears', 'roomId', reference('rooms', 'heardRoomId')),
    operators: keys('roomOperators', 'roomId', person),
    price: group({ day: number, overtimeHour: number }),
    note: text,
  },
  people: {
    name: text,
    short: text,
    plays: texts,
    crew: flag,
    windows: entries('windows', 'personId', { ...span, sure: flag }),
    limits: group({ voice: whole, day: whole }),
    away: whole,
    size: whole,
    fee: group({ waiting: number, call: number, perHour: number }),
    email: text,
    phone: text,
    bring: texts,
    food: text,
    access: text,
    headphones: text,
    note: text,
  },
  gear: {
    name: text,
    count: whole,
    price: number,
    windows: entries('gearWindows', 'gearId', span),
    note: text,
  },
  setups: {
    name: text,
    room: reference('rooms', 'roomId'),
    rig: whole,
    ready: record('setupReady', 'setupId', person, minutesOf),
    keepUntil: text,
    note: text,
  },
  changeovers: { from: reference('setups', 'fromSetupId'), to: reference('setups', 'toSetupId'), minutes: whole },
  songs: {
    code: text,
    title: text,
    length: number,
    key: as('musicalKey', text),
    capo: whole,
    tuning: text,
    pitch: number,
    tempo: number,
    free: as('freeTempo', flag),
    meter: text,
    click: flag,
    form: text,
    priority: text,
    rehearsal: whole,
    minutes,
    room: reference('rooms', 'roomId'),
    setup: reference('setups', 'setupId'),
    note: text,
  },
  parts: {
    name: text,
    players: keys('partPlayers', 'partId', person),
    mode: text,
    instrument: text,
    minutes,
    takes: whole,
    room: reference('rooms', 'roomId'),
    setup: reference('setups', 'setupId'),
    priority: text,
    fallback: text,
    needs: texts,
    loud: flag,
    quiet: flag,
    voice: record('partVoice', 'partId', person, minutesOf),
    uses: entries('partUses', 'partId', use),
    // The passes a part waits for may be derived ones, which are no rows: they are kept by key.
    after: entries('dependencies', 'partId', { pass: as('neededPassKey', text), event, kind, ...lag }, 'after'),
    focus: whole,
    pan: number,
    width: number,
    note: text,
  },
  passes: {
    name: text,
    song: reference('songs', 'songId'),
    parts: keys('passParts', 'passId', reference('parts', 'partId', 'song')),
    people: keys('passPeople', 'passId', person),
    room: reference('rooms', 'roomId'),
    setup: reference('setups', 'setupId'),
    minutes,
    priority: text,
    loud: flag,
    quiet: flag,
    voice: record('passVoice', 'passId', person, minutesOf),
    uses: entries('passUses', 'passId', use),
    after: entries('dependencies', 'passId', { pass: reference('passes', 'neededPassId'), event, kind, ...lag }, 'after'),
    before: entries('dependencies', 'passId', { pass: reference('passes', 'neededPassId'), event }, 'before'),
    together: keys('passRelations', 'passId', reference('passes', 'otherPassId'), 'together'),
    apart: keys('passRelations', 'passId', reference('passes', 'otherPassId'), 'apart'),
    pin: group({ at: text, day: text, notBefore: text, notAfter: text }),
    leftOut: flag,
    note: text,
  },
  events: {
    name: text,
    kind: text,
    ...span,
    room: reference('rooms', 'roomId'),
    people: keys('eventPeople', 'eventId', person),
    note: text,
  },
};

/** Table of each kind of row, in the order in which they can be written: a row comes after those it names. */
export const resourceTables = {
  production: 'productions',
  rooms: 'rooms',
  people: 'people',
  gear: 'gear',
  setups: 'setups',
  changeovers: 'changeovers',
  events: 'events',
  songs: 'songs',
  parts: 'parts',
  passes: 'passes',
} as const satisfies Record<ResourceName, string>;

/** The lists of a kind of row, by field. */
export const listsOf = (resource: ResourceName): [string, ChildrenField][] =>
  Object.entries(resourceFields[resource]).filter((entry): entry is [string, ChildrenField] => entry[1].kind === 'children');

const allLists = Object.values(resourceFields).flatMap((fields) =>
  Object.values(fields).filter((field): field is ChildrenField => field.kind === 'children'),
);

/** The lists that are kept in each table of entries. */
export const childLists = Object.fromEntries(childNames.map((name) => [name, allLists.filter((list) => list.table === name)])) as Record<
  ChildName,
  ChildrenField[]
>;
