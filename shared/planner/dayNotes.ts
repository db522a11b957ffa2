import type { ProductionFile } from '../contracts/resources';
import type { Minute, RoomId, WallDate } from '../domain/flavours';
import { eventName } from '../domain/passes';
import type { Names } from '../domain/sheets/names';
import { clock } from '../time/words';
import type { ZoneClock } from '../time/wall';
import type { TimedItem } from './threads';

export interface DayRoom {
  id: RoomId;
  name: string;
  /** When it is open that day, `10:00–20:00`. */
  open: string;
  /** When loud work has to end, where that is before the room closes. */
  loudUntil: string | null;
  /** Whether the plan uses it that day. */
  used: boolean;
}

/** What every part of a day is read with. */
export interface Reading {
  file: ProductionFile;
  zone: ZoneClock;
  names: Names;
  windows: Window[];
}

/** A room-day: one open window of a room, with the date on which it opens. */
export interface Window {
  room: RoomId;
  from: Minute;
  to: Minute;
  date: WallDate;
}

/** A time that no clock shows is drawn where the clock goes on. */
export function minuteOf(zone: ZoneClock, wall: string): Minute {
  const minute = zone.minuteOf(wall);
  if (minute !== 'gap') return minute;
  const hour = Number(wall.slice(11, 13));
  return minuteOf(zone, `${wall.slice(0, 11)}${String(Math.min(23, hour + 1)).padStart(2, '0')}:00`);
}

/**
 * Events that call nobody and in which nothing else goes on, before the first room opens or in a room that is not used that day (a
 * tuner, a delivery): they are said beside the day, so that the drawing keeps to its work.
 */
export function besideOf(date: WallDate, items: TimedItem[], windows: Window[]): ReadonlySet<TimedItem> {
  const opens = Math.min(...windows.filter((window) => window.date === date).map(({ from }) => from));
  const used = new Set(items.filter(({ kind }) => kind !== 'event').map(({ room }) => room));
  return new Set(
    items.filter(
      (item) => item.kind === 'event' && item.people.length === 0 && used.size > 0 && (item.to <= opens || !used.has(item.room)),
    ),
  );
}

/** The rooms that are open on a date. */
export function roomsOf(date: WallDate, items: TimedItem[], { file, zone, windows }: Reading): DayRoom[] {
  return file.rooms.flatMap((room) => {
    const open = windows.filter((window) => window.room === room.id && window.date === date);
    if (open.length === 0) return [];
    const loud = (room.loud ?? [])
      .map((hours) => minuteOf(zone, hours.to))
      .filter((until) => open.some(({ from, to }) => from < until && until < to));
    return [
      {
        id: room.id,
        name: room.name ?? room.id,
        open: open.map(({ from, to }) => `${clock(zone.wallOf(from))}–${clock(zone.wallOf(to))}`).join(', '),
        loudUntil: loud.length > 0 ? clock(zone.wallOf(Math.max(...loud))) : null,
        used: items.some((item) => item.room === room.id && item.kind !== 'event'),
      },
    ];
  });
}

/** What is said beside a day: events beside its work, and who cannot be there for all of its hours. */
export function notesOf(date: WallDate, items: TimedItem[], reading: Reading): string[] {
  const beside = [...besideOf(date, items, reading.windows)].map((item) => {
    const event = reading.file.events.find(({ id }) => id === item.id);
    return `${event ? eventName(event) : item.id} ${clock(item.start)}–${clock(item.end)}`;
  });
  return [...beside, ...partly(date, items, reading)];
}

/** People who are called that day and come after the rooms they work in open, or have to leave before these close. */
function partly(date: WallDate, items: TimedItem[], { file, zone, names, windows }: Reading): string[] {
  const passes = items.filter(({ kind }) => kind === 'pass');
  const called = new Set(passes.flatMap(({ people }) => people));
  const rooms = new Set(passes.map(({ room }) => room));
  const open = windows.filter((window) => window.date === date && rooms.has(window.room));
  const opens = Math.min(...open.map(({ from }) => from));
  const closes = Math.max(...open.map(({ to }) => to));
  const at = (minute: Minute): string => clock(zone.wallOf(minute));
  return file.people.flatMap((person) => {
    if (!person.windows || !called.has(person.id)) return [];
    const mine = person.windows
      .map(({ from, to }) => ({ from: minuteOf(zone, from), to: minuteOf(zone, to) }))
      .filter(({ from, to }) => from < closes && opens < to);
    if (mine.length === 0) return [];
    const comes = Math.min(...mine.map(({ from }) => from));
    const leaves = Math.max(...mine.map(({ to }) => to));
    const short = names.short(person.id);
    if (comes > opens && leaves < closes) return [`${short} ${at(comes)}–${at(leaves)}`];
    if (comes > opens) return [`${short} from ${at(comes)}`];
    return leaves < closes ? [`${short} leaves ${at(leaves)}`] : [];
  });
}
