import type { ProductionFile } from '../contracts/resources';
import type { Presence } from '../contracts/values';
import type { WallDate } from '../domain/flavours';
import { daysFromEpoch } from '../time/wall';

/** The days of a production and who can be there on them, as stretches to draw. Wall-clock hours, as on the wall of the studio. */

export interface StudioDay {
  date: WallDate;
  /** Minutes after midnight of `date`: when the first room opens, when the last one closes (past 1440 after midnight). */
  opens: number;
  closes: number;
}

/** A stretch of a day as shares of its opening hours, 0 … 1. */
export interface PresenceStretch {
  from: number;
  to: number;
  sure: boolean;
}

const dayNumber = (date: string): number => {
  const [year = 1970, month = 1, day = 1] = date.split('-').map(Number);
  return daysFromEpoch(year, month, day);
};
/** Minutes of a wall time after the midnight of a day. */
const minutesAfter = (wall: string, days: number): number =>
  (dayNumber(wall.slice(0, 10)) - days) * 1440 + Number(wall.slice(11, 13)) * 60 + Number(wall.slice(14, 16));

/** The days on which a room opens, each from its first opening to its last closing. */
export function studioDays(file: Pick<ProductionFile, 'rooms'>): StudioDay[] {
  const days = new Map<WallDate, StudioDay>();
  for (const { from, to } of file.rooms.flatMap((room) => room.open)) {
    const date = from.slice(0, 10);
    const number = dayNumber(date);
    const opens = minutesAfter(from, number);
    const closes = minutesAfter(to, number);
    const known = days.get(date);
    days.set(date, known ? { date, opens: Math.min(known.opens, opens), closes: Math.max(known.closes, closes) } : { date, opens, closes });
  }
  return [...days.values()].sort((a, b) => (a.date < b.date ? -1 : 1));
}

/** The first day of a production, else the day given: what days typed without a year are near to. */
export const firstDay = (file: Pick<ProductionFile, 'rooms'>, otherwise: WallDate): WallDate => studioDays(file)[0]?.date ?? otherwise;

/** When somebody can be there on a day, as far as a room is open; without windows, all day. */
export function presenceOn(day: StudioDay, windows: readonly Presence[] | undefined): PresenceStretch[] {
  if (!windows) return [{ from: 0, to: 1, sure: true }];
  const number = dayNumber(day.date);
  const share = (minutes: number): number => (minutes - day.opens) / (day.closes - day.opens);
  return windows.flatMap((window) => {
    const from = Math.max(day.opens, minutesAfter(window.from, number));
    const to = Math.min(day.closes, minutesAfter(window.to, number));
    return from < to ? [{ from: share(from), to: share(to), sure: window.sure !== false }] : [];
  });
}

/** `10–20`, as the head of a day's column says it. */
export function dayHours({ opens, closes }: StudioDay): string {
  const clock = (minutes: number): string => {
    const rest = minutes % 60;
    const hours = String(Math.floor(minutes / 60) % 24);
    return rest === 0 ? hours : `${hours}:${String(rest).padStart(2, '0')}`;
  };
  return `${clock(opens)}–${clock(closes)}`;
}
