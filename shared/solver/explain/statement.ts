import type { Rules } from '../../contracts/head';
import type { Gear, Pass, Person, ProductionFile, Room, SessionEvent, Setup } from '../../contracts/resources';
import type { Priority } from '../../contracts/values';
import { DEFAULT_RULES } from '../../domain/defaults';
import type { EventId, GearId, Minute, Minutes, PassId, PersonId, RoomId, SetupId, WallDate, WallTime } from '../../domain/flavours';
import { SkippedTimeError, zoneClock, type ZoneClock } from '../../time/wall';
import { merged, NEVER, type Span } from '../model';

/** One `open` window of a room. */
export interface OpenWindow extends Span {
  date: WallDate;
  /** Whether it is the first one of its room. */
  first: boolean;
}
export interface RoomFacts {
  room: Room;
  windows: OpenWindow[];
  loud: Span[] | null;
  events: EventFacts[];
}
export interface PersonFacts {
  person: Person;
  windows: Span[] | null;
  events: EventFacts[];
}
export interface GearFacts {
  gear: Gear;
  windows: Span[] | null;
}
export interface EventFacts extends Span {
  event: SessionEvent;
  /** The date of the call that it makes. */
  date: WallDate;
}
export interface CalendarDay extends Span {
  date: WallDate;
}
/** `to` comes after `from`; `fact` is the field of the file that says so. */
export interface Edge {
  from: PassId;
  to: PassId;
  approved: boolean;
  lag: Minutes;
  fact: string;
}
export interface Pair {
  one: PassId;
  other: PassId;
  fact: string;
}

/** A production file as what it states, its times in elapsed minutes. Nothing is derived that a dropped fact could change. */
export interface Statement {
  file: ProductionFile;
  clock: ZoneClock;
  rules: Required<Rules>;
  rooms: Map<RoomId, RoomFacts>;
  people: Map<PersonId, PersonFacts>;
  gear: Map<GearId, GearFacts>;
  setups: Map<SetupId, Setup>;
  events: Map<EventId, EventFacts>;
  passes: Map<PassId, Pass>;
  priorities: Map<PassId, Priority>;
  /** Everybody of a pass: its people and the operators of its room. */
  casts: Map<PassId, ReadonlySet<PersonId>>;
  /** Edges by the pass that comes first. */
  edgesFrom: Map<PassId, Edge[]>;
  /** Those that go together with a pass, named by either. */
  togetherWith: Map<PassId, Pair[]>;
  apartFrom: Map<PassId, Pair[]>;
  /** The calendar days on which room-days and events begin and end, from midnight to midnight. */
  calendar: CalendarDay[];
  minuteOf(wall: WallTime): Minute;
}

/**
 * @param file its passes written out
 * @throws SkippedTimeError for a wall time that no clock shows; the file reader refuses such a file
 */
export function stateFile(file: ProductionFile): Statement {
  const clock = zoneClock(file.production.timezone);
  const minuteOf = (wall: WallTime): Minute => {
    const minute = clock.minuteOf(wall);
    if (minute === 'gap') throw new SkippedTimeError(wall, clock.zone);
    return minute;
  };
  const spanOf = ({ from, to }: { from: WallTime; to: WallTime }): Span => ({ from: minuteOf(from), to: minuteOf(to) });
  const calendar = (windows: readonly { from: WallTime; to: WallTime }[] | undefined) => (windows ? merged(windows.map(spanOf)) : null);

  const opening = new Map(file.rooms.map((room) => [room.id, windowsOf(room, spanOf)]));
  const events = file.events.map((event): EventFacts => {
    const span = spanOf(event);
    const windows = event.room === undefined ? [] : (opening.get(event.room) ?? []);
    const around = windows.find((window) => window.from <= span.from && span.to <= window.to);
    return { event, ...span, date: around?.date ?? event.from.slice(0, 10) };
  });
  const passes = new Map((file.passes ?? []).map((pass) => [pass.id, pass]));
  const edges = [...passes.values()].flatMap((pass) => edgesOf(pass, passes));
  const priorities = new Map(file.songs.map((song) => [song.id, song.priority]));
  return {
    file,
    clock,
    rules: {
      ...DEFAULT_RULES,
      ...Object.fromEntries(Object.entries(file.production.rules ?? {}).filter(([, value]) => value !== undefined)),
    },
    rooms: new Map(
      file.rooms.map((room) => [
        room.id,
        {
          room,
          windows: opening.get(room.id) ?? [],
          loud: calendar(room.loud),
          events: events.filter(({ event }) => event.room === room.id),
        },
      ]),
    ),
    people: new Map(
      file.people.map((person) => [
        person.id,
        { person, windows: calendar(person.windows), events: events.filter(({ event }) => (event.people ?? []).includes(person.id)) },
      ]),
    ),
    gear: new Map(file.gear.map((gear) => [gear.id, { gear, windows: calendar(gear.windows) }])),
    setups: new Map(file.setups.map((setup) => [setup.id, setup])),
    events: new Map(events.map((facts) => [facts.event.id, facts])),
    passes,
    priorities: new Map(
      [...passes.values()].map((pass) => [
        pass.id,
        pass.priority ?? (pass.song === undefined ? undefined : priorities.get(pass.song)) ?? 'must',
      ]),
    ),
    casts: new Map([...passes.values()].map((pass) => [pass.id, castOf(pass, file)])),
    edgesFrom: grouped(edges, (edge) => [edge.from]),
    togetherWith: grouped(pairsOf(passes, 'together'), (pair) => [pair.one, pair.other]),
    apartFrom: grouped(pairsOf(passes, 'apart'), (pair) => [pair.one, pair.other]),
    calendar: calendarOf(clock, [...[...opening.values()].flat(), ...events]),
    minuteOf,
  };
}

function castOf(pass: Pass, file: ProductionFile): ReadonlySet<PersonId> {
  const room = pass.room ?? file.setups.find(({ id }) => id === pass.setup)?.room;
  const operators = file.rooms.find(({ id }) => id === room)?.operators ?? [];
  return new Set([...(pass.people ?? []), ...operators].filter((id) => file.people.some((person) => person.id === id)));
}

function calendarOf(clock: ZoneClock, spans: readonly Span[]): CalendarDay[] {
  const dates = [...new Set(spans.flatMap(({ from, to }) => [clock.dateOf(from), clock.dateOf(to)]))].sort();
  return dates.map((date) => ({ date, ...dayOf(clock, date) }));
}

/** A calendar day from midnight to midnight. */
export function dayOf(clock: ZoneClock, date: WallDate): Span {
  return { from: beginningOf(clock, date), to: beginningOf(clock, dayAfter(clock, date)) };
}

/** The first minute of a date. Some clocks are put forward at midnight, so that the day begins later, or by a whole day. */
function beginningOf(clock: ZoneClock, date: WallDate): Minute {
  for (const time of ['00:00', '01:00', '12:00']) {
    const begin = clock.minuteOf(`${date}T${time}`);
    if (begin !== 'gap') return begin;
  }
  return NEVER;
}

/** No clock is put forward or back by as much as half a day, so a day and a half after it begins, the next day is on. */
function dayAfter(clock: ZoneClock, date: WallDate): WallDate {
  return clock.dateOf(beginningOf(clock, date) + 1440 + 720);
}

function windowsOf(room: Room, spanOf: (window: { from: WallTime; to: WallTime }) => Span): OpenWindow[] {
  const windows = room.open.map((window) => ({ ...spanOf(window), date: window.from.slice(0, 10), first: false }));
  windows.sort((one, other) => one.from - other.from);
  if (windows[0]) windows[0].first = true;
  return windows;
}

function edgesOf(pass: Pass, passes: ReadonlyMap<PassId, Pass>): Edge[] {
  const after = (pass.after ?? []).flatMap((one): Edge[] => {
    if (!('pass' in one) || !passes.has(one.pass)) return [];
    return [{ from: one.pass, to: pass.id, approved: one.kind === 'approved', lag: one.lag ?? 0, fact: `passes.${pass.id}.after` }];
  });
  const before = (pass.before ?? []).flatMap((one): Edge[] => {
    if (!('pass' in one) || !passes.has(one.pass)) return [];
    return [{ from: pass.id, to: one.pass, approved: false, lag: 0, fact: `passes.${pass.id}.before` }];
  });
  return [...after, ...before];
}

function pairsOf(passes: ReadonlyMap<PassId, Pass>, field: 'together' | 'apart'): Pair[] {
  return [...passes.values()].flatMap((pass) =>
    (pass[field] ?? []).flatMap((other) => (passes.has(other) ? [{ one: pass.id, other, fact: `passes.${pass.id}.${field}` }] : [])),
  );
}

function grouped<Item>(items: readonly Item[], keysOf: (item: Item) => PassId[]): Map<PassId, Item[]> {
  const groups = new Map<PassId, Item[]>();
  for (const item of items)
    for (const key of keysOf(item)) {
      const group = groups.get(key);
      if (group) group.push(item);
      else groups.set(key, [item]);
    }
  return groups;
}
