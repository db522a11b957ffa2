import type { ProductionFile } from '../contracts/resources';
import type { ItemKind, PlanCall, PlanItem } from '../contracts/plan';
import type { Minute, Minutes, PersonId, RoomId, WallDate } from '../domain/flavours';
import { eventName, passName } from '../domain/passes';
import { namesOf } from '../domain/sheets/names';
import { clock, dayWords } from '../time/words';
import { zoneClock, type ZoneClock } from '../time/wall';
import { besideOf, type DayRoom, minuteOf, notesOf, type Reading, roomsOf, type Window } from './dayNotes';
import { staysOf, type Stay, type TimedItem } from './threads';

/** One item of a day as it is drawn and read out. */
export interface DayItem {
  /** Unique within the plan. */
  key: string;
  kind: ItemKind;
  /** The pass or event. */
  id: string | null;
  room: RoomId | null;
  from: Minute;
  to: Minute;
  /** The same times on the wall clock, `12:30`. */
  starts: string;
  ends: string;
  /** The song's code, of a pass. */
  code: string | null;
  label: string;
  /** The label for a reader who does not see the code. */
  full: string;
  people: PersonId[];
  pinned: boolean;
  /** Said beside the day rather than drawn in it. */
  beside: boolean;
}

/** One person of a day: a thread, or only a name where they are not called. */
export interface DayThread {
  person: PersonId;
  short: string;
  name: string;
  crew: boolean;
  stays: Stay[];
}

export interface PlanDay {
  date: WallDate;
  title: string;
  rooms: DayRoom[];
  /** Events beside the day's work, and who comes later than its rooms open or has to leave before they close: `Lys leaves 17:00`. */
  notes: string[];
  /** What the drawing shows, the same stretch of the clock on every day of a plan. */
  from: Minute;
  to: Minute;
  /** Every full hour of the wall clock in between. */
  hours: { at: Minute; label: string }[];
  items: DayItem[];
  threads: DayThread[];
  /** Length of the shortest item of the whole plan that has to be named, so that all its days are drawn to one scale. */
  shortest: Minutes;
}

/** Kinds whose items cannot be told by their shape alone. */
const NAMED: ReadonlySet<ItemKind> = new Set(['pass', 'listen', 'rig', 'changeover', 'event']);
const HOUR: Minutes = 60;
/** How much of a room's idle hours is drawn before the first and after the last item. */
const MARGIN: Minutes = 60;
/** What a day without hours and items would show. */
const DEFAULT_SPAN: Minutes = 600;

/**
 * A plan, day by day: every date on which a room is open or something happens, in order, with its items, people and hours.
 * Pure and free of any drawing; the presence threads, the sheets and the words beside them are all made from it.
 */
export function planDays(file: ProductionFile, plan: { items: readonly PlanItem[]; calls: readonly PlanCall[] }): PlanDay[] {
  const zone = zoneClock(file.production.timezone);
  const windows: Window[] = file.rooms.flatMap((room) =>
    room.open.map((open) => ({
      room: room.id,
      from: minuteOf(zone, open.from),
      to: minuteOf(zone, open.to),
      date: open.from.slice(0, 10),
    })),
  );
  const reading: Reading = { file, zone, names: namesOf(file), windows };
  const timed = plan.items.map((item) => ({ ...item, from: minuteOf(zone, item.start), to: minuteOf(zone, item.end) }));
  const byDate = new Map<WallDate, TimedItem[]>(windows.map(({ date }) => [date, []]));
  for (const item of timed) {
    const date =
      windows.find(({ room, from, to }) => room === item.room && from <= item.from && item.from < to)?.date ?? item.start.slice(0, 10);
    const list = byDate.get(date);
    if (list) list.push(item);
    else byDate.set(date, [item]);
  }
  const dates = [...byDate.keys()].sort();
  const spans = dates.map((date) => spanOf(date, byDate.get(date)!, windows, zone));
  const used = spans.filter((_, index) => byDate.get(dates[index]!)!.length > 0);
  const first = Math.min(...(used.length > 0 ? used : spans).map(({ start }) => start));
  const length = Math.max(HOUR, ...(used.length > 0 ? used : spans).map(({ midnight, to }) => to - midnight - first));
  const shortest = Math.min(...timed.filter(({ kind, from, to }) => NAMED.has(kind) && from < to).map(({ from, to }) => to - from));

  return dates.map((date, index): PlanDay => {
    const items = byDate.get(date)!.sort((a, b) => a.from - b.from || a.to - b.to);
    const beside = besideOf(date, items, windows);
    const from = spans[index]!.midnight + first;
    const to = from + length;
    return {
      date,
      title: dayWords(date),
      rooms: roomsOf(date, items, reading),
      notes: notesOf(date, items, reading),
      from,
      to,
      hours: hoursBetween(from, to, zone),
      items: items.map((item) => dayItem(item, beside.has(item), reading)),
      threads: threadsOf(date, items, plan.calls, reading),
      shortest: Number.isFinite(shortest) ? shortest : HOUR,
    };
  });
}

/** The stretch of a date worth drawing, from a full hour; `start` counts from the date's midnight. */
function spanOf(date: WallDate, all: TimedItem[], windows: Window[], zone: ZoneClock): { midnight: Minute; start: Minutes; to: Minute } {
  const midnight = minuteOf(zone, `${date}T00:00`);
  const open = windows.filter((window) => window.date === date);
  const opens = Math.min(...open.map(({ from }) => from));
  const beside = besideOf(date, all, windows);
  const items = all.filter((item) => !beside.has(item));
  const first = Math.min(...items.map(({ from }) => from));
  const last = Math.max(...items.map(({ to }) => to));
  const closes = Math.max(...open.map(({ to }) => to));
  const from = items.length > 0 ? Math.min(first, Math.max(opens, first - MARGIN)) : opens;
  const until = items.length > 0 ? Math.max(last, Math.min(closes, last + MARGIN)) : closes;
  if (!Number.isFinite(from)) return { midnight, start: 0, to: midnight + DEFAULT_SPAN };
  const start = Math.floor((from - midnight) / HOUR) * HOUR;
  return { midnight, start, to: Math.max(until, midnight + start + HOUR) };
}

function hoursBetween(from: Minute, to: Minute, zone: ZoneClock): PlanDay['hours'] {
  const hours: PlanDay['hours'] = [];
  for (let at = from; at <= to; at++) {
    const wall = zone.wallOf(at);
    if (!wall.endsWith(':00')) continue;
    hours.push({ at, label: clock(wall) });
    // Clocks change by less than an hour only in a few zones; half an hour on, the next full hour is found from either side.
    at += HOUR / 2;
  }
  return hours;
}

function dayItem(item: TimedItem, beside: boolean, reading: Reading): DayItem {
  const pass = item.kind === 'pass' ? reading.names.pass(item.id) : undefined;
  return {
    key: `${item.kind} ${item.id ?? item.setup ?? ''} ${item.room ?? ''} ${item.start}`,
    kind: item.kind,
    id: item.id ?? null,
    room: item.room ?? null,
    from: item.from,
    to: item.to,
    starts: clock(item.start),
    ends: clock(item.end),
    ...nameOf(item, reading),
    people: item.people,
    pinned: pass?.pin !== undefined,
    beside,
  };
}

function nameOf(item: TimedItem, { file, names }: Reading): Pick<DayItem, 'code' | 'label' | 'full'> {
  const plain = (label: string) => ({ code: null, label, full: label });
  switch (item.kind) {
    case 'pass': {
      const pass = names.pass(item.id);
      return pass ? passName(file, pass) : plain(item.id ?? 'pass');
    }
    case 'event': {
      const event = file.events.find(({ id }) => id === item.id);
      return plain(event ? eventName(event) : (item.id ?? 'event'));
    }
    case 'rig':
      return plain(`Rig: ${names.setup(item.setup)}`);
    case 'changeover':
      return plain(`Change to ${names.setup(item.setup)}`);
    case 'meal':
      return plain('Meal');
    case 'break':
      return plain('Break');
    case 'listen':
      return plain('Listen');
    case 'reserve':
      return plain('Reserve');
    case 'wrap':
      return plain('Wrap: names, copies');
  }
}

function threadsOf(date: WallDate, items: TimedItem[], calls: readonly PlanCall[], { file, zone, names }: Reading): DayThread[] {
  const ever = new Set(calls.map(({ person }) => person));
  return file.people
    .filter((person) => !person.crew || ever.has(person.id))
    .map((person) => {
      const call = calls.find((one) => one.person === person.id && one.date === date);
      const times = call && { arrive: minuteOf(zone, call.arrive), release: minuteOf(zone, call.release) };
      return {
        person: person.id,
        short: names.short(person.id),
        name: person.name ?? names.short(person.id),
        crew: person.crew ?? false,
        stays: times ? staysOf(person, items, times, file) : [],
      };
    })
    .sort((a, b) => Number(a.crew) - Number(b.crew));
}
