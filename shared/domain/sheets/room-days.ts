import type { PlanItem } from '../../contracts/plan';
import type { ProductionFile, Room } from '../../contracts/resources';
import type { Hours } from '../../contracts/values';
import { dateOfWall } from '../../time/words';
import type { WallDate } from '../flavours';

/** One `open` window of a room with what the plan puts into it, in order of time. It carries the date on which it opens. */
export interface RoomDay {
  room: Room;
  open: Hours;
  date: WallDate;
  items: PlanItem[];
}

const byStart = (a: PlanItem, b: PlanItem) => (a.start < b.start ? -1 : a.start > b.start ? 1 : a.end < b.end ? -1 : 1);

/** Every room-day that holds more than events, by date and then in the order of the rooms. */
export function usedRoomDays(file: ProductionFile, items: readonly PlanItem[]): RoomDay[] {
  const days = file.rooms.flatMap((room) =>
    room.open.map((open) => ({
      room,
      open,
      date: dateOfWall(open.from),
      items: items.filter((item) => item.room === room.id && open.from <= item.start && item.start < open.to).sort(byStart),
    })),
  );
  return days
    .filter((day) => day.items.some((item) => item.kind !== 'event'))
    .map((day, order) => ({ day, order }))
    .sort((a, b) => (a.day.date < b.day.date ? -1 : a.day.date > b.day.date ? 1 : a.order - b.order))
    .map(({ day }) => day);
}

/** The dates on which the plan uses a room, in order: day n of N counts these. */
export function usedDates(file: ProductionFile, items: readonly PlanItem[]): WallDate[] {
  return [...new Set(usedRoomDays(file, items).map((day) => day.date))];
}

/** `day 2 of 4`. */
export function dayCount(date: WallDate, dates: readonly WallDate[]): string {
  const index = dates.indexOf(date);
  return index < 0 ? '' : `day ${index + 1} of ${dates.length}`;
}
