import type { Rules, Weights } from '../../contracts/head';
import type { Pass, Person, ProductionFile, Room, SessionEvent, Setup, Gear } from '../../contracts/resources';
import type { MadePlan, PlanItem } from '../../contracts/plan';
import { wallTime, type Priority, type ThreePoint } from '../../contracts/values';
import { DEFAULT_RULES, DEFAULT_WEIGHTS } from '../../domain/defaults';
import type { EventId, GearId, Minute, Minutes, PassId, PersonId, RoomId, SetupId, WallDate, WallTime } from '../../domain/flavours';
import { zoneClock, type ZoneClock } from '../../time/wall';
import { mergeSpans, type Span } from './spans';

/** The groups of rules that a plan can break. */
export type Rule =
  | 'times'
  | 'grid'
  | 'hours'
  | 'passes'
  | 'events'
  | 'rooms'
  | 'people'
  | 'windows'
  | 'set-ups'
  | 'order'
  | 'gear'
  | 'loud'
  | 'meals'
  | 'breaks'
  | 'wrap'
  | 'listen'
  | 'reserve'
  | 'turnaround'
  | 'limits'
  | 'musts'
  | 'calls'
  | 'unplaced'
  | 'cost';

export interface Violation {
  rule: Rule;
  /** A sentence with names and times. */
  says: string;
}
export type Say = (rule: Rule, says: string) => void;

/** What is checked. `cost`, `bound` and `status` are compared with the recomputed cost where they are given. */
export type StatedPlan = Pick<MadePlan, 'items' | 'calls' | 'unplaced'> & Partial<Pick<MadePlan, 'cost' | 'bound' | 'status'>>;

/** One `open` window of a room: a room-day. It carries the date on which it opens, past midnight too. */
export interface RoomDay extends Span {
  room: RoomId;
  date: WallDate;
}

/** An item of the plan with its times in elapsed minutes. */
export interface Item extends Span {
  kind: PlanItem['kind'];
  id?: string;
  room?: RoomId;
  setup?: SetupId;
  start: WallTime;
  people: readonly PersonId[];
  /** The room-day that it lies in; absent where it lies in none, and for events. */
  roomDay?: RoomDay;
}

export interface RoomReading {
  room: Room;
  days: RoomDay[];
  /** Loud hours, merged; absent = always. */
  loud?: Span[];
}
export interface PersonReading {
  person: Person;
  /** Windows, sure and maybe, merged; absent = always. */
  windows?: Span[];
  sure?: Span[];
}

/** File and plan as the checks read them: times in elapsed minutes, defaults applied, ids resolved. */
export interface Reading {
  file: ProductionFile;
  clock: ZoneClock;
  rules: Required<Rules>;
  weights: Required<Weights>;
  rooms: Map<RoomId, RoomReading>;
  people: Map<PersonId, PersonReading>;
  gear: Map<GearId, { gear: Gear; windows?: Span[] }>;
  setups: Map<SetupId, Setup>;
  passes: Map<PassId, Pass>;
  /** Events of the file, as items. */
  events: Map<EventId, Item>;
  /** The plan's items other than events whose times can be read, by start. */
  items: Item[];
  /** The first placement of each pass. */
  placed: Map<PassId, Item>;
  /** Listens of the plan and events of kind `listen`: what was captured before one of them is approved. */
  approvals: Span[];
  /** The minute of a wall time of the file, such as a pin. Null, and said once, where no clock shows it. */
  minuteOf(wall: WallTime): Minute | null;
}

/** The minutes that the schedule uses: the middle one of three, rounded up to the step. */
export function likelyMinutes(minutes: ThreePoint | Minutes, step: Minutes): Minutes {
  const likely = typeof minutes === 'number' ? minutes : minutes.length === 3 ? minutes[1] : minutes[0];
  return Math.ceil(likely / step) * step;
}

export function priorityOf(reading: Reading, pass: Pass): Priority {
  return pass.priority ?? reading.file.songs.find((song) => song.id === pass.song)?.priority ?? 'must';
}

/** Where a pass must be: its room, else that of its set-up. */
export function roomOf(reading: Reading, pass: Pass): RoomId | undefined {
  return pass.room ?? (pass.setup === undefined ? undefined : reading.setups.get(pass.setup)?.room);
}

/** Everybody of a pass: its people and the operators of the room. */
export function castOf(reading: Reading, pass: Pass, room: RoomId | undefined): PersonId[] {
  const operators = room === undefined ? [] : (reading.rooms.get(room)?.room.operators ?? []);
  return [...new Set([...(pass.people ?? []), ...operators])];
}

/** The items of a room-day other than events, by start. */
export function itemsOf(reading: Reading, day: RoomDay): Item[] {
  return reading.items.filter((item) => item.roomDay === day);
}

/** How an item is called in a sentence: `pass s1-basics`, `meal in a at 2027-03-08T13:00`. */
export function nameOf(item: Item): string {
  if (item.id !== undefined) return `${item.kind} ${item.id}`;
  return `${item.kind} in ${item.room ?? 'no room'} at ${item.start}`;
}

/** Reads file and plan. Times that cannot be read are said and their items left out of every other check. */
export function readForCheck(file: ProductionFile, plan: StatedPlan, say: Say): Reading {
  const clock = zoneClock(file.production.timezone);
  const read = new Map<WallTime, Minute | null>();
  const minuteOf = (wall: WallTime): Minute | null => {
    const known = read.get(wall);
    if (known !== undefined) return known;
    const shape = wallTime.safeParse(wall);
    const minute = shape.success ? clock.minuteOf(wall) : 'gap';
    if (!shape.success) say('times', `${wall} is not a wall-clock time that exists.`);
    else if (minute === 'gap') say('times', `No clock in ${clock.zone} ever shows ${wall}.`);
    read.set(wall, minute === 'gap' ? null : minute);
    return minute === 'gap' ? null : minute;
  };
  const spanOf = (window: { from: WallTime; to: WallTime }): Span[] => {
    const from = minuteOf(window.from);
    const to = minuteOf(window.to);
    return from === null || to === null ? [] : [{ from, to }];
  };

  const rooms = new Map<RoomId, RoomReading>();
  for (const room of file.rooms) {
    const days = room.open.flatMap((window) => spanOf(window).map((span) => ({ ...span, room: room.id, date: window.from.slice(0, 10) })));
    rooms.set(room.id, {
      room,
      days: days.sort((one, other) => one.from - other.from),
      ...(room.loud && { loud: mergeSpans(room.loud.flatMap(spanOf)) }),
    });
  }
  const people = new Map<PersonId, PersonReading>();
  for (const person of file.people) {
    const windows = person.windows;
    people.set(person.id, {
      person,
      ...(windows && {
        windows: mergeSpans(windows.flatMap(spanOf)),
        sure: mergeSpans(windows.filter((window) => window.sure !== false).flatMap(spanOf)),
      }),
    });
  }
  const events = new Map<EventId, Item>();
  for (const event of file.events) for (const span of spanOf(event)) events.set(event.id, eventItem(event, span));

  const items: Item[] = [];
  for (const stated of plan.items) {
    if (stated.kind === 'event') continue;
    const start = minuteOf(stated.start);
    const end = minuteOf(stated.end);
    if (start === null || end === null) continue;
    const { kind, id, room, setup, people: cast } = stated;
    const day = room === undefined ? undefined : rooms.get(room)?.days.find((open) => open.from <= start && end <= open.to);
    items.push({ kind, id, room, setup, start: stated.start, people: cast, from: start, to: end, roomDay: day });
  }
  items.sort((one, other) => one.from - other.from || one.to - other.to);
  const placed = new Map<PassId, Item>();
  for (const item of items) if (item.kind === 'pass' && item.id !== undefined && !placed.has(item.id)) placed.set(item.id, item);
  const listens = [...events.values()].filter((event) => file.events.find(({ id }) => id === event.id)?.kind === 'listen');

  return {
    file,
    clock,
    rules: { ...DEFAULT_RULES, ...given(file.production.rules) },
    weights: { ...DEFAULT_WEIGHTS, ...given(file.production.weights) },
    rooms,
    people,
    gear: new Map(file.gear.map((gear) => [gear.id, { gear, ...(gear.windows && { windows: mergeSpans(gear.windows.flatMap(spanOf)) }) }])),
    setups: new Map(file.setups.map((setup) => [setup.id, setup])),
    passes: new Map((file.passes ?? []).map((pass) => [pass.id, pass])),
    events,
    items,
    placed,
    approvals: [...items.filter((item) => item.kind === 'listen'), ...listens],
    minuteOf,
  };
}

/** The fields of an object that have a value, so that an explicit `undefined` does not hide a default. */
function given<Fields extends object>(fields: Fields | undefined): { [Name in keyof Fields]?: Exclude<Fields[Name], undefined> } {
  const kept = Object.entries(fields ?? {}).filter(([, value]) => value !== undefined);
  return Object.fromEntries(kept) as { [Name in keyof Fields]?: Exclude<Fields[Name], undefined> };
}

function eventItem(event: SessionEvent, span: Span): Item {
  return { kind: 'event', id: event.id, room: event.room, start: event.from, people: event.people ?? [], ...span };
}
