import type { Pin, ProductionFile } from '../contracts/resources';
import { DEFAULT_RULES } from '../domain/defaults';
import type { Minute, PassId, WallDate } from '../domain/flavours';
import { clock, dayWords } from '../time/words';
import { zoneClock } from '../time/wall';
import type { DayItem, PlanDay } from './day';

/** A pass moved by hand: what it is pinned to from now on, in the form of the file and in words. */
export interface Move {
  pin: Pin;
  says: string;
}
/** Why a pass cannot be moved that way. */
export interface NoMove {
  refused: string;
}

export type Direction = 'earlier' | 'later' | 'dayBefore' | 'dayAfter';

const named = ({ code, label }: DayItem): string => (code === null ? label : `${code} ${label}`);

/** The pass as the plan has it, and its day. */
export function findPass(days: readonly PlanDay[], pass: PassId): { day: PlanDay; item: DayItem } | null {
  for (const day of days) {
    const item = day.items.find(({ kind, id }) => kind === 'pass' && id === pass);
    if (item) return { day, item };
  }
  return null;
}

/**
 * What a pass has to be pinned to so that it changes places with its neighbour in the same room, or goes to the day before or after.
 * The pin is as loose as it can be: earlier and later bound one side only, and a day leaves the time open.
 */
export function moveOf(file: ProductionFile, days: readonly PlanDay[], pass: PassId, direction: Direction): Move | NoMove {
  const found = findPass(days, pass);
  if (!found) return { refused: 'It is not in the plan; take it in first.' };
  return direction === 'earlier' || direction === 'later' ? swapped(file, found, direction) : onOtherDay(file, found, direction);
}

/**
 * What a pass dropped on a day at a minute is pinned to: that start, on the grid of `step`.
 * Refused where its room is not open for its whole length.
 */
export function dropOf(file: ProductionFile, days: readonly PlanDay[], pass: PassId, drop: { date: WallDate; at: Minute }): Move | NoMove {
  const found = findPass(days, pass);
  if (!found) return { refused: 'It is not in the plan; take it in first.' };
  const zone = zoneClock(file.production.timezone);
  const { item } = found;
  const at = onGrid(file, days, drop);
  const room = file.rooms.find(({ id }) => id === item.room);
  const inside = (room?.open ?? []).some(({ from, to }) => from <= zone.wallOf(at) && zone.wallOf(at + item.to - item.from) <= to);
  const wall = zone.wallOf(at);
  if (!inside)
    return { refused: `${room?.name ?? 'Its room'} is not open for ${named(item)} at ${clock(wall)} on ${dayWords(drop.date)}.` };
  return { pin: { at: wall }, says: `${named(item)} goes to ${clock(wall)} on ${dayWords(drop.date)}` };
}

/** The start on the grid of `step` that is nearest to a minute of a day. */
export function onGrid(file: ProductionFile, days: readonly PlanDay[], { date, at }: { date: WallDate; at: Minute }): Minute {
  const step = file.production.rules?.step ?? DEFAULT_RULES.step;
  // Days are drawn from a full hour, so that the grid of the clock is the grid from there.
  const from = days.find((day) => day.date === date)?.from ?? 0;
  return from + Math.round((at - from) / step) * step;
}

function swapped(file: ProductionFile, { day, item }: { day: PlanDay; item: DayItem }, direction: 'earlier' | 'later'): Move | NoMove {
  const zone = zoneClock(file.production.timezone);
  const own = day.items.filter(({ kind, room }) => kind === 'pass' && room === item.room);
  const neighbour = own[own.indexOf(item) + (direction === 'earlier' ? -1 : 1)];
  if (!neighbour) return { refused: `${named(item)} is the ${direction === 'earlier' ? 'first' : 'last'} pass of that day in its room.` };
  if (neighbour.pinned) return { refused: `${named(neighbour)} is pinned and stays. Unpin it first to change places with it.` };
  if (direction === 'earlier') {
    const notAfter = zone.wallOf(neighbour.from + item.to - item.from);
    return { pin: { day: day.date, notAfter }, says: `${named(item)} ends by ${clock(notAfter)}, before ${named(neighbour)}` };
  }
  const notBefore = zone.wallOf(neighbour.from);
  return { pin: { day: day.date, notBefore }, says: `${named(item)} starts from ${clock(notBefore)}, after ${named(neighbour)}` };
}

function onOtherDay(
  file: ProductionFile,
  { day, item }: { day: PlanDay; item: DayItem },
  direction: 'dayBefore' | 'dayAfter',
): Move | NoMove {
  const room = file.rooms.find(({ id }) => id === item.room);
  const dates = [...new Set((room?.open ?? []).map(({ from }) => from.slice(0, 10)))].sort();
  const other = direction === 'dayBefore' ? dates.filter((date) => date < day.date).at(-1) : dates.find((date) => date > day.date);
  if (other === undefined) {
    const which = direction === 'dayBefore' ? 'before' : 'after';
    return { refused: `${room?.name ?? 'The room'} is not open on any day ${which} ${day.title}.` };
  }
  return { pin: { day: other }, says: `${named(item)} goes to ${dayWords(other)}` };
}

/** A pin in words: `at 12:30 on Mon 8 March`. */
export function pinInWords(pin: Pin): string {
  const on = (wall: string): string => `${clock(wall)} on ${dayWords(wall.slice(0, 10))}`;
  const parts = [
    pin.at === undefined ? null : `at ${on(pin.at)}`,
    pin.day === undefined ? null : `on ${dayWords(pin.day)}`,
    pin.notBefore === undefined ? null : `not before ${pin.notBefore.slice(0, 10) === pin.day ? clock(pin.notBefore) : on(pin.notBefore)}`,
    pin.notAfter === undefined ? null : `over by ${pin.notAfter.slice(0, 10) === pin.day ? clock(pin.notAfter) : on(pin.notAfter)}`,
  ];
  return parts.filter((part) => part !== null).join(', ');
}
