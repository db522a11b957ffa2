import type { ProductionFile, Room, SessionEvent } from '../contracts/resources';
import { DEFAULT_RULES, DEFAULT_WEIGHTS } from '../domain/defaults';
import type { Minutes, WallDate, WallTime } from '../domain/flavours';
import {
  merged,
  type EventModel,
  type GearModel,
  type PersonModel,
  type Problem,
  type RoomDay,
  type RoomModel,
  type SetupModel,
  type Span,
} from '../solver/model';
import { SkippedTimeError, zoneClock, type ZoneClock } from '../time/wall';
import { gridOf, hiddenStretches } from './calendars';
import { effectivePasses } from './derive';
import { passModels } from './passes';
import { indexOf, indices, type Reader } from './reader';

/**
 * The problem of a production file: defaults applied, wall clock turned into elapsed minutes, calendars merged, lengths rounded up to
 * the step. References to things that the file does not hold are passed over, but a pass without a room that exists cannot be placed.
 * @throws SkippedTimeError for a wall time that no clock of the zone shows; the file reader refuses such a file.
 */
export function toProblem(file: ProductionFile): Problem {
  const rules = { ...DEFAULT_RULES, ...given(file.production.rules) };
  const weights = { ...DEFAULT_WEIGHTS, ...given(file.production.weights) };
  const clock = zoneClock(file.production.timezone);
  const minute = (wall: WallTime) => {
    const at = clock.minuteOf(wall);
    if (at === 'gap') throw new SkippedTimeError(wall, clock.zone);
    return at;
  };
  const reader: Reader = {
    file,
    minute,
    span: ({ from, to }) => ({ from: minute(from), to: minute(to) }),
    room: indexOf(file.rooms),
    person: indexOf(file.people),
    setup: indexOf(file.setups),
    song: indexOf(file.songs),
    gear: indexOf(file.gear),
    event: indexOf(file.events),
    rounded: (minutes) => Math.ceil(minutes / rules.step) * rules.step,
  };
  const hidden = hiddenIn(reader, clock);
  const { days, dates } = roomDays(reader, clock, rules.step, hidden);
  const events = eventModels(reader, clock, days, dates);
  const rooms = roomModels(reader, days, events);
  const setups = setupModels(reader);
  const problem: Problem = {
    zone: clock.zone,
    rules,
    weights,
    lengths: {
      meal: reader.rounded(rules.meal),
      break: reader.rounded(rules.break),
      wrap: reader.rounded(rules.wrap),
      listen: reader.rounded(rules.listen),
    },
    rooms,
    days,
    dates,
    people: personModels(reader, weights.waiting, events),
    passes: [],
    setups,
    changeovers: changeoverMatrix(reader, rules.changeover),
    events,
    gear: gearModels(reader),
    hidden,
  };
  problem.passes = passModels(reader, effectivePasses(file), problem);
  problem.passes.forEach((pass, i) => {
    for (const person of pass.people) problem.people[person]!.passes.push(i);
    for (const { gear } of pass.uses) problem.gear[gear]!.passes.push(i);
  });
  return problem;
}

/** The fields that have a value, so that an explicit `undefined` does not hide a default. */
function given<Fields extends object>(fields: Fields | undefined): { [Name in keyof Fields]?: Exclude<Fields[Name], undefined> } {
  const kept = Object.entries(fields ?? {}).filter(([, value]) => value !== undefined);
  return Object.fromEntries(kept) as { [Name in keyof Fields]?: Exclude<Fields[Name], undefined> };
}

function hiddenIn(reader: Reader, clock: ZoneClock): Span[] {
  const spans = reader.file.rooms.flatMap((room) => room.open.map(reader.span));
  if (spans.length === 0) return [];
  const from = spans.reduce((least, span) => Math.min(least, span.from), Infinity);
  const to = spans.reduce((most, span) => Math.max(most, span.to), -Infinity);
  return hiddenStretches(clock, from, to);
}

const dateOf = (wall: WallTime): WallDate => wall.slice(0, 10);

function roomDays(reader: Reader, clock: ZoneClock, step: Minutes, hidden: readonly Span[]): { days: RoomDay[]; dates: WallDate[] } {
  const { file } = reader;
  const found = new Set<WallDate>(file.events.map((event) => dateOf(event.from)));
  for (const room of file.rooms) for (const window of room.open) found.add(dateOf(window.from));
  const dates = [...found].sort();
  const dateIndex = new Map(dates.map((date, i) => [date, i]));

  const unordered = file.rooms.flatMap((room, roomIndex) => {
    const windows = room.open.map((window, written) => ({ ...reader.span(window), date: dateOf(window.from), written }));
    windows.sort((a, b) => a.from - b.from);
    return windows.map((window, i) => ({
      ...window,
      room: roomIndex,
      /** How many windows of the room open earlier on its date. */
      rank: i - windows.findIndex((other) => other.date === window.date),
      dateIndex: dateIndex.get(window.date)!,
      grid: gridOf(clock, step, window, hidden),
    }));
  });
  unordered.sort((a, b) => a.dateIndex - b.dateIndex || a.rank - b.rank || a.room - b.room);
  let layer = -1;
  const days = unordered.map(({ rank, ...day }, i): RoomDay => {
    const before = unordered[i - 1];
    if (!before || before.dateIndex !== day.dateIndex || before.rank !== rank) layer += 1;
    return { ...day, layer };
  });
  return { days, dates };
}

function eventModels(reader: Reader, clock: ZoneClock, days: readonly RoomDay[], dates: readonly WallDate[]): EventModel[] {
  return reader.file.events.map((event: SessionEvent): EventModel => {
    const span = reader.span(event);
    const room = reader.room(event.room);
    const around = days.find((day) => day.room === room && day.from <= span.from && span.to <= day.to);
    return {
      id: event.id,
      ...span,
      room,
      people: indices(event.people, reader.person),
      approves: event.kind === 'listen',
      dateIndex: around ? around.dateIndex : dates.indexOf(dateOf(event.from)),
    };
  });
}

function roomModels(reader: Reader, days: readonly RoomDay[], events: readonly EventModel[]): RoomModel[] {
  const { rooms } = reader.file;
  const hears = (a: Room, b: Room) => a !== b && (a.hears?.includes(b.id) === true || b.hears?.includes(a.id) === true);
  return rooms.map((room, index): RoomModel => ({
    id: room.id,
    standing: room.standing !== false,
    standard: room.standard ? room.standard : null,
    people: room.people ?? null,
    operators: indices(room.operators, reader.person),
    days: days.flatMap((day, i) => (day.room === index ? [i] : [])).sort((a, b) => days[a]!.from - days[b]!.from),
    loud: room.loud ? merged(room.loud.map(reader.span)) : null,
    hears: rooms.flatMap((other, i) => (hears(room, other) ? [i] : [])),
    events: byStart(events, (event) => event.room === index),
  }));
}

function byStart(events: readonly EventModel[], chosen: (event: EventModel) => boolean): number[] {
  return events.flatMap((event, i) => (chosen(event) ? [i] : [])).sort((a, b) => events[a]!.from - events[b]!.from);
}

function personModels(reader: Reader, weight: number, events: readonly EventModel[]): PersonModel[] {
  return reader.file.people.map((person, index): PersonModel => {
    const { windows, limits } = person;
    return {
      id: person.id,
      windows: windows ? merged(windows.map(reader.span)) : null,
      sure: windows ? merged(windows.filter((window) => window.sure !== false).map(reader.span)) : null,
      voice: limits?.voice ?? null,
      day: limits?.day ?? null,
      away: person.away ?? null,
      size: person.size ?? 1,
      waiting: weight * (person.fee?.waiting ?? 1),
      passes: [],
      events: byStart(events, (event) => event.people.includes(index)),
    };
  });
}

function setupModels(reader: Reader): SetupModel[] {
  return reader.file.setups.map((setup): SetupModel => {
    const rig = reader.rounded(setup.rig ?? 0);
    const ready = Object.entries(setup.ready ?? {})
      .map(([id, minutes]) => ({ person: reader.person(id), minutes: Math.min(minutes, rig) }))
      .filter(({ person, minutes }) => person >= 0 && minutes > 0)
      .sort((a, b) => a.person - b.person);
    return { id: setup.id, rig, ready, keepUntilApproved: setup.keepUntil === 'approved' };
  });
}

function changeoverMatrix(reader: Reader, otherwise: Minutes): Int32Array {
  const { setups, changeovers } = reader.file;
  const count = setups.length;
  const matrix = new Int32Array(count * count).fill(reader.rounded(otherwise));
  for (let i = 0; i < count; i++) matrix[i * count + i] = 0;
  for (const { from, to, minutes } of changeovers) {
    const a = reader.setup(from);
    const b = reader.setup(to);
    if (a >= 0 && b >= 0 && a !== b) matrix[a * count + b] = reader.rounded(minutes);
  }
  return matrix;
}

function gearModels(reader: Reader): GearModel[] {
  return reader.file.gear.map((gear) => ({
    id: gear.id,
    count: gear.count ?? 1,
    windows: gear.windows ? merged(gear.windows.map(reader.span)) : null,
    passes: [],
  }));
}
